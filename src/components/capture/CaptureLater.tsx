import './capture.css';
import { Message } from '../base/Message.tsx';
import { CaptureActions } from './CaptureActions.tsx';
import { CaptureHead, type Tab } from './CaptureHead.tsx';
import { CaptureGone, CaptureSkeleton } from './CaptureState.tsx';
import { useCapture } from './use-capture.ts';

const WORDS = {
  turns: {
    title: 'Turns are not drawn yet',
    happened:
      'Here each crank turn will be a row, stacked, so that what repeats at one angle stands as a column.',
    todo: 'Until then, step through the turns in the trace with n and p.',
  },
  spectrum: {
    title: 'The spectrum is not drawn yet',
    happened:
      'Here the shown window will be split into frequencies, with its peaks listed and orders of crank speed.',
    todo: 'Until then, measure a period with Span in the trace: it shows length and frequency.',
  },
} as const;

/** A tab whose work is not there yet: says what will be here and what serves until then. */
export function CaptureLater({ id, tab }: { id: string; tab: Extract<Tab, keyof typeof WORDS> }) {
  const loaded = useCapture(id);
  const capture = loaded.data?.data;
  if (capture === undefined)
    return loaded.error === undefined ? <CaptureSkeleton /> : <CaptureGone error={loaded.error} />;
  return (
    <div className="capture-flow">
      <CaptureHead capture={capture} tab={tab} actions={<CaptureActions capture={capture} />} />
      <div className="capture-state">
        <Message
          verdict="info"
          {...WORDS[tab]}
          actions={
            <a className="button" href={`/captures/${id}`}>
              To the trace
            </a>
          }
        />
      </div>
    </div>
  );
}
