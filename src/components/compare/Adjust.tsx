import { type FormEvent, useState } from 'react';
import type { ComparisonJson } from '../../contract/areas/library.ts';
import { api, sentenceOf } from '../base/api.ts';
import { Button } from '../base/Button.tsx';
import { Field } from '../base/Field.tsx';
import { Message } from '../base/Message.tsx';

interface AdjustProps {
  comparison: ComparisonJson;
  etag: string | null;
  onChanged: () => void;
}

/** Moves the reference by hand and says how many teeth the crank's sprocket has; both are kept with the comparison. */
export function Adjust({ comparison, etag, onChanged }: AdjustProps) {
  const [busy, setBusy] = useState(false);
  const [trouble, setTrouble] = useState<string | null>(null);
  const { adjustment, overlay, here } = comparison;
  const axis = overlay?.axis ?? 's';
  const scale = axis === 's' ? 1e3 : 1;
  const cam = here?.circuit.startsWith('cam-') ?? false;
  const save = async (event: FormEvent<HTMLFormElement>) => {
    event.preventDefault();
    const form = new FormData(event.currentTarget);
    const number = (name: string) => {
      const text = String(form.get(name) ?? '').trim();
      return text === '' ? null : Number(text);
    };
    const shift = number('shift');
    setBusy(true);
    setTrouble(null);
    try {
      await api(`/comparisons/${comparison.id}`, {
        method: 'PATCH',
        etag,
        body: {
          shift: shift === null || shift === 0 ? null : shift / scale,
          axis: shift === null || shift === 0 ? null : axis,
          ...(cam ? { sprocketTeeth: number('teeth') } : {}),
        },
      });
      onChanged();
    } catch (thrown) {
      setTrouble(sentenceOf(thrown));
    } finally {
      setBusy(false);
    }
  };
  return (
    <form className="comparison-adjust-form" onSubmit={save} key={etag}>
      {trouble !== null && <Message verdict="bad" live="alert" title={trouble} />}
      <div className="comparison-adjust">
        <Field label={axis === 'deg' ? 'Reference later by, degrees' : 'Reference later by, ms'}>
          <input
            className="box box-figures"
            name="shift"
            type="number"
            step="any"
            defaultValue={
              adjustment?.axis === axis && adjustment.shift !== null ? adjustment.shift * scale : ''
            }
          />
        </Field>
        {cam && (
          <Field label="Teeth of the crank sprocket">
            <input
              className="box box-figures"
              name="teeth"
              type="number"
              min={8}
              max={80}
              defaultValue={adjustment?.sprocketTeeth ?? comparison.camShift?.sprocketTeeth ?? ''}
            />
          </Field>
        )}
        <Button type="submit" busy={busy}>
          Set and keep
        </Button>
      </div>
    </form>
  );
}
