import { Button } from '../base/Button.tsx';
import { Mark } from '../base/Mark.tsx';
import { bytesText } from '../base/numbers.ts';
import { Verdict } from '../base/Verdict.tsx';
import type { PhotoQueue, QueuedPhoto } from './usePhotoQueue.ts';

const WORDS: Record<QueuedPhoto['phase'], string> = {
  waiting: 'waits its turn',
  sending: 'on its way',
  paused: 'not sent yet, goes on when the connection is back',
  refused: 'not taken',
};

/** Photos that are not on the server yet, each with its state. */
export function PhotoQueueList({ queue }: { queue: PhotoQueue }) {
  if (queue.items.length === 0) return null;
  return (
    <ul aria-label="Photos on their way" className="border-b border-rule">
      {queue.items.map((item) => (
        <li key={item.key} className="flex flex-wrap items-center gap-x-3 gap-y-1 px-(--margin) py-2">
          {item.phase === 'sending' ? (
            <Mark size={18} turning />
          ) : (
            <Verdict verdict={item.phase === 'refused' ? 'bad' : 'undecided'} word={WORDS[item.phase]} />
          )}
          <span className="min-w-0 grow break-all">
            {item.file.name} <span className="figures text-dense text-soft">{bytesText(item.file.size)}</span>
          </span>
          {item.happened !== null && (
            <p className="basis-full text-dense" role="alert">
              {item.happened}
            </p>
          )}
          {item.phase === 'paused' && (
            <Button small onClick={() => queue.again(item.key)}>
              Send again
            </Button>
          )}
          {item.phase !== 'sending' && (
            <Button small onClick={() => queue.remove(item.key)}>
              Leave out
            </Button>
          )}
        </li>
      ))}
    </ul>
  );
}
