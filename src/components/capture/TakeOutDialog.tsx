import { useState } from 'react';
import type { CaptureJson, MeasurementsJson } from '../../contract/areas/captures.ts';
import { fetcher, sentenceOf } from '../base/api.ts';
import { Button } from '../base/Button.tsx';
import { Dialog } from '../base/Dialog.tsx';
import { Icon } from '../base/Icon.tsx';
import { Message } from '../base/Message.tsx';
import { Segmented } from '../base/Segmented.tsx';
import { fixed } from '../plot/format.ts';
import { shownInAddress } from './address.ts';
import { numbersCsv } from './numbers-csv.ts';

/** Takes things out: samples, pictures, numbers, the file as it came, paper. The shown stretch is that of the address. */
export function TakeOutDialog({ capture, onClose }: { capture: CaptureJson; onClose: () => void }) {
  const { view, setup } = shownInAddress(
    location.search,
    capture.signals.map(({ index }) => index),
  );
  const [part, setPart] = useState<'shown' | 'whole'>(view === null ? 'whole' : 'shown');
  const [theme, setTheme] = useState<'paper' | 'dim'>('paper');
  const [trouble, setTrouble] = useState<string | null>(null);
  const base = `/api/v1/captures/${capture.id}`;
  const query = (more: Record<string, string>) => {
    const parameters = new URLSearchParams(more);
    if (part === 'shown' && view !== null) {
      parameters.set('from', String(view.from));
      parameters.set('to', String(view.to));
    }
    return parameters;
  };
  const shown = capture.signals.map(({ index }) => index).filter((index) => !setup.hidden.has(index));
  const picture = (format: string) =>
    `${base}/picture?${query({ format, theme, width: '1200', signals: shown.slice(0, 16).join() })}`;
  const numbers = async () => {
    try {
      const text = numbersCsv(
        capture,
        await fetcher<MeasurementsJson>(`/captures/${capture.id}/measurements`),
      );
      const link = document.createElement('a');
      link.href = URL.createObjectURL(new Blob([text], { type: 'text/csv' }));
      link.download = `${capture.title || 'capture'}, numbers.csv`;
      link.click();
      URL.revokeObjectURL(link.href);
    } catch (thrown) {
      setTrouble(sentenceOf(thrown));
    }
  };
  const ready = capture.samples > 0;
  return (
    <Dialog open title="Take out" onClose={onClose}>
      {trouble !== null && <Message verdict="bad" live="alert" title={trouble} />}
      {ready && (
        <>
          <div className="take-row">
            <Segmented
              label="Which stretch"
              value={part}
              onChange={setPart}
              options={[
                ...(view === null ? [] : [{ value: 'shown' as const, text: 'What is shown' }]),
                { value: 'whole' as const, text: 'Whole capture' },
              ]}
            />
            {part === 'shown' && view !== null && (
              <span className="figures text-soft">
                {fixed(view.from, 4)} to {fixed(view.to, 4)} s
              </span>
            )}
          </div>
          <section>
            <h3>Samples</h3>
            <p className="field-help">
              Times and recorded values to the last digit; reading the file again gives the same numbers.
            </p>
            <a className="button" href={`${base}/export?${query({ format: 'csv' })}`} download>
              <Icon name="out" small />
              CSV
            </a>
          </section>
          <section>
            <h3>Picture for a report</h3>
            <p className="field-help">With title, axes, units, marks and a caption.</p>
            <div className="take-row">
              <Segmented
                label="Theme of the picture"
                value={theme}
                onChange={setTheme}
                options={[
                  { value: 'paper', text: 'Paper' },
                  { value: 'dim', text: 'Dim' },
                ]}
              />
              <a className="button" href={picture('png')} download>
                <Icon name="out" small />
                PNG
              </a>
              <a className="button" href={picture('svg')} download>
                <Icon name="out" small />
                SVG
              </a>
            </div>
          </section>
        </>
      )}
      {capture.status === 'ready' && (
        <section>
          <h3>Numbers</h3>
          <div className="take-row">
            <Button icon="out" onClick={() => void numbers()}>
              CSV
            </Button>
            <a
              className="button"
              href={`${base}/measurements`}
              download={`${capture.title || 'capture'}, numbers.json`}
            >
              <Icon name="out" small />
              JSON
            </a>
          </div>
        </section>
      )}
      <section>
        <h3>The file as it came</h3>
        <div className="take-row">
          <a className="button" href={`${base}/original`} download>
            <Icon name="out" small />
            {capture.fileName || 'Original'}
          </a>
          <Button
            onClick={() => {
              onClose();
              setTimeout(() => print(), 100);
            }}
          >
            Print this page
          </Button>
        </div>
      </section>
      <div className="dialog-actions">
        <Button kind="main" onClick={onClose}>
          Done
        </Button>
      </div>
    </Dialog>
  );
}
