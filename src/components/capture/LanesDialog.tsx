import { useState } from 'react';
import type { CaptureJson, DerivedJson } from '../../contract/areas/captures.ts';
import { ApiFailure, api, sentenceOf } from '../base/api.ts';
import { Button } from '../base/Button.tsx';
import { circuitWords } from '../base/circuits.ts';
import { Dialog } from '../base/Dialog.tsx';
import { Icon } from '../base/Icon.tsx';
import { LineSample } from '../base/LineSample.tsx';
import { Message } from '../base/Message.tsx';
import { inOrder, type LaneSetup, PLAIN_SETUP } from '../plot/lane-setup.ts';
import { parseFactor } from '../reading/parse-factor.ts';
import { DerivedForm } from './DerivedForm.tsx';

interface LanesDialogProps {
  capture: CaptureJson;
  etag: string | null;
  setup: LaneSetup;
  onSetup: (setup: LaneSetup) => void;
  /** Factor or unit was saved: the capture is measured again. */
  onChanged: () => void;
  onClose: () => void;
}

/** Which lanes stand, in what order, which way up and on whose scale; a signal's factor and unit. */
export function LanesDialog({ capture, etag, setup, onSetup, onChanged, onClose }: LanesDialogProps) {
  const [trouble, setTrouble] = useState<string | null>(null);
  const ordered = inOrder(capture.signals, setup);
  const indices = ordered.map(({ index }) => index);
  const move = (place: number, by: -1 | 1) => {
    const order = [...indices];
    const [taken] = order.splice(place, 1);
    if (taken !== undefined) order.splice(place + by, 0, taken);
    onSetup({ ...setup, order });
  };
  const flip = (of: 'hidden' | 'inverted', index: number) => {
    const next = new Set(setup[of]);
    if (!next.delete(index)) next.add(index);
    onSetup({ ...setup, [of]: next });
  };
  const save = (column: number, change: { factor?: number; unit?: string }) =>
    patch({ signals: [{ column, ...change }] });
  const patch = async (body: { signals: unknown[] } | { derived: DerivedJson[] }) => {
    setTrouble(null);
    try {
      await api(`/captures/${capture.id}`, {
        method: 'PATCH',
        etag,
        body,
      });
      onChanged();
    } catch (thrown) {
      const stale = thrown instanceof ApiFailure && thrown.status === 412;
      setTrouble(
        stale
          ? 'Somebody changed this capture meanwhile. Nothing was overwritten; look again and save once more.'
          : sentenceOf(thrown),
      );
      if (stale) onChanged();
    }
  };
  return (
    <Dialog open title="Lanes" onClose={onClose}>
      {trouble !== null && <Message verdict="bad" live="alert" title={trouble} />}
      <ol className="lanes-list">
        {ordered.map((signal, place) => {
          const { index, name, circuit } = signal;
          return (
            <li key={index}>
              <label className="lanes-name">
                <input
                  type="checkbox"
                  className="tick"
                  checked={!setup.hidden.has(index)}
                  onChange={() => flip('hidden', index)}
                />
                <LineSample role={circuitWords(circuit).role} />
                <b>{name}</b>
              </label>
              <span className="lanes-moves">
                <button
                  type="button"
                  className="button button-icon button-small"
                  aria-label={`Move ${name} up`}
                  disabled={place === 0}
                  onClick={() => move(place, -1)}
                >
                  <Icon name="up" small />
                </button>
                <button
                  type="button"
                  className="button button-icon button-small"
                  aria-label={`Move ${name} down`}
                  disabled={place === ordered.length - 1}
                  onClick={() => move(place, 1)}
                >
                  <Icon name="down" small />
                </button>
                <button
                  type="button"
                  className="button button-small"
                  aria-pressed={setup.inverted.has(index)}
                  aria-label={`${name} upside down`}
                  onClick={() => flip('inverted', index)}
                >
                  <Icon name="flip" small />
                  Upside down
                </button>
              </span>
              {signal.made === null ? (
                <FactorForm key={`${signal.factor} ${signal.unit}`} signal={signal} onSave={save} />
              ) : (
                <p className="lanes-made">
                  <span className="text-soft">{signal.made}</span>
                  <Button
                    small
                    kind="quiet"
                    onClick={() =>
                      void patch({
                        derived: capture.derived.filter(({ column }) => column !== signal.column),
                      })
                    }
                  >
                    Remove
                  </Button>
                </p>
              )}
            </li>
          );
        })}
      </ol>
      <DerivedForm key={capture.revision} capture={capture} onSave={(derived) => patch({ derived })} />
      <label className="lanes-common">
        <input
          type="checkbox"
          className="tick"
          checked={setup.common}
          onChange={() => onSetup({ ...setup, common: !setup.common })}
        />
        Lanes of one unit share one scale
      </label>
      <p className="field-help">
        Order, heights and turning over change only this view. Factor and unit belong to the capture: its
        numbers are measured again.
      </p>
      <div className="dialog-actions">
        <Button onClick={() => onSetup(PLAIN_SETUP)}>As it was</Button>
        <Button kind="main" onClick={onClose}>
          Done
        </Button>
      </div>
    </Dialog>
  );
}

interface FactorFormProps {
  signal: CaptureJson['signals'][number];
  onSave: (column: number, change: { factor?: number; unit?: string }) => Promise<void>;
}

function FactorForm({ signal, onSave }: FactorFormProps) {
  const [factor, setFactor] = useState(String(signal.factor));
  const [unit, setUnit] = useState(signal.unit);
  const [busy, setBusy] = useState(false);
  const parsed = parseFactor(factor);
  const changed = parsed !== signal.factor || unit.trim() !== signal.unit;
  return (
    <form
      className="lanes-factor"
      onSubmit={(event) => {
        event.preventDefault();
        if (parsed === null || busy) return;
        setBusy(true);
        void onSave(signal.column, {
          ...(parsed === signal.factor ? {} : { factor: parsed }),
          ...(unit.trim() === signal.unit ? {} : { unit: unit.trim() }),
        }).finally(() => setBusy(false));
      }}
    >
      <label>
        Factor
        <input
          className="box box-figures"
          aria-label={`Factor of ${signal.name}`}
          aria-invalid={parsed === null || undefined}
          value={factor}
          onChange={(event) => setFactor(event.target.value)}
        />
      </label>
      <label>
        Unit
        <input
          className="box"
          aria-label={`Unit of ${signal.name}`}
          maxLength={20}
          value={unit}
          onChange={(event) => setUnit(event.target.value)}
        />
      </label>
      {changed && (
        <Button type="submit" small busy={busy} disabled={parsed === null}>
          Save
        </Button>
      )}
      {parsed === null && <span className="field-error">Needs a number: 20 or 20:1</span>}
    </form>
  );
}
