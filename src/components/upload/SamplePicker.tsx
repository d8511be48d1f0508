import { useState } from 'react';
import useSWR from 'swr';
import { Button } from '../base/Button.tsx';
import { Dialog } from '../base/Dialog.tsx';
import { Message } from '../base/Message.tsx';
import type { FileToSend } from './types.ts';

export interface SampleEntry {
  readonly file: string;
  readonly title: string;
  readonly text: string;
  readonly cylinders?: number;
}

const loadIndex = async (address: string): Promise<SampleEntry[]> => {
  const response = await fetch(address);
  if (!response.ok) throw new Error(`samples: ${response.status}`);
  return response.json();
};

async function loadSample(sample: SampleEntry): Promise<FileToSend> {
  const response = await fetch(`/samples/${sample.file}`);
  if (!response.ok) throw new Error(`sample: ${response.status}`);
  const file = new File([await response.blob()], sample.file, { type: 'text/csv' });
  return {
    file,
    title: sample.title,
    ...(sample.cylinders === undefined ? {} : { cylinders: sample.cylinders }),
  };
}

export const useSamples = (wanted: boolean) =>
  useSWR<SampleEntry[], Error>(wanted ? '/samples/index.json' : null, loadIndex, {
    revalidateOnFocus: false,
  });

interface SamplePickerProps {
  open: boolean;
  onClose: () => void;
  onChosen: (file: FileToSend) => void;
}

/** The project's own simulated captures: chosen, they go the same way as any file. */
export function SamplePicker({ open, onClose, onChosen }: SamplePickerProps) {
  const { data: samples, error } = useSamples(open);
  const [busy, setBusy] = useState<string | null>(null);
  const [trouble, setTrouble] = useState(false);
  const choose = async (sample: SampleEntry) => {
    setBusy(sample.file);
    setTrouble(false);
    try {
      onChosen(await loadSample(sample));
      onClose();
    } catch {
      setTrouble(true);
    }
    setBusy(null);
  };
  return (
    <Dialog
      open={open}
      title="Try a sample"
      onClose={onClose}
      actions={<Button onClick={onClose}>Close</Button>}
    >
      <p className="mt-1 text-soft">
        Made by a program, from no vehicle. A sample is added like any file of yours.
      </p>
      {(error !== undefined || trouble) && (
        <div className="mt-3">
          <Message
            verdict="bad"
            live="alert"
            title="The samples did not come"
            happened="The server did not answer."
            todo="Check the connection, then try again."
          />
        </div>
      )}
      <ul className="mt-3">
        {samples?.map((sample) => (
          <li key={sample.file} className="flex items-center gap-3 border-t border-rule py-3">
            <div className="min-w-0 grow">
              <p className="font-semibold">{sample.title}</p>
              <p className="text-dense text-soft">{sample.text}</p>
            </div>
            <Button
              small
              busy={busy === sample.file}
              aria-label={`Add the sample ${sample.title}`}
              onClick={() => choose(sample)}
            >
              Add
            </Button>
          </li>
        ))}
      </ul>
    </Dialog>
  );
}
