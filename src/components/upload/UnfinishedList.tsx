import { useEffect, useState } from 'react';
import { Button } from '../base/Button.tsx';
import { Icon } from '../base/Icon.tsx';
import { bytesText } from '../base/numbers.ts';
import { type Unfinished, unfinishedUploads } from './unfinished.ts';

/** Files that this browser began to send and did not end: chosen again, they go on where they stopped. */
export function UnfinishedList({ onChoose }: { onChoose: () => void }) {
  const [unfinished, setUnfinished] = useState<readonly Unfinished[]>([]);
  useEffect(() => setUnfinished(unfinishedUploads(localStorage)), []);
  if (unfinished.length === 0) return null;
  const forget = (entry: Unfinished) => {
    localStorage.removeItem(entry.storageKey);
    setUnfinished(unfinishedUploads(localStorage));
  };
  return (
    <section className="grid gap-2 py-4">
      <h2 className="text-body">Just before</h2>
      <ul className="grid gap-3">
        {unfinished.map((entry) => (
          <li key={entry.storageKey} className="grid gap-1">
            <p className="flex items-baseline gap-2">
              <span className="self-center">
                <Icon name="file" small />
              </span>
              <span className="min-w-0 grow break-all">{entry.fileName}</span>
              {entry.bytes !== null && (
                <span className="figures text-dense text-soft">{bytesText(entry.bytes)}</span>
              )}
            </p>
            <p className="text-dense text-soft">
              Did not arrive whole. Choose the same file again and it goes on where it stopped.
            </p>
            <p className="flex gap-2">
              <Button small kind="quiet" onClick={onChoose}>
                Choose it again
              </Button>
              <Button small kind="quiet" onClick={() => forget(entry)}>
                Forget it
              </Button>
            </p>
          </li>
        ))}
      </ul>
    </section>
  );
}
