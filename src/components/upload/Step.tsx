import { Icon } from '../base/Icon.tsx';
import { Mark } from '../base/Mark.tsx';
import { VerdictShape } from '../base/Verdict.tsx';

interface StepProps {
  name: string;
  state: 'done' | 'now' | 'waits' | 'stopped';
  figure: string;
  /** 0 to 1 of the step that runs. */
  part?: number | undefined;
}

const STATE_WORDS = { done: 'done', now: 'now', waits: 'waits', stopped: 'stopped' } as const;

/** One line of "Received, Reading rows, Measuring". */
export function Step({ name, state, figure, part }: StepProps) {
  return (
    <li className="grid grid-cols-[20px_1fr] gap-x-3 gap-y-1">
      <span className="grid place-items-center">
        {state === 'done' && (
          <span className="grid size-4 place-items-center rounded-full bg-good text-sheet">
            <Icon name="check" small />
          </span>
        )}
        {state === 'now' && (
          <span className="text-accent">
            <Mark size={20} {...(part === undefined ? { turning: true } : { progress: part })} />
          </span>
        )}
        {state === 'waits' && <span className="size-4 rounded-full border-2 border-line" />}
        {state === 'stopped' && (
          <span className="text-bad">
            <VerdictShape verdict="bad" />
          </span>
        )}
      </span>
      <span className="flex flex-wrap items-baseline justify-between gap-x-3">
        <span className={state === 'now' ? 'font-semibold' : state === 'waits' ? 'text-soft' : ''}>
          {name}
          <span className="sr-only"> ({STATE_WORDS[state]})</span>
        </span>
        <span className="figures text-dense text-soft">{figure}</span>
      </span>
      {part !== undefined && (
        <progress className="bar-progress col-start-2" aria-label={name} max={1} value={part} />
      )}
    </li>
  );
}
