import { useState } from 'react';
import type { CaptureJson } from '../../contract/areas/captures.ts';
import { ApiFailure, api, sentenceOf } from '../base/api.ts';
import { Button } from '../base/Button.tsx';
import { Message } from '../base/Message.tsx';
import { grouped } from '../base/numbers.ts';
import { Progress } from '../base/Progress.tsx';

const WORK: Partial<Record<CaptureJson['status'], string>> = {
  queued: 'Waiting for its turn',
  reading: 'Reading',
  measuring: 'Measuring',
};

/** A capture that is not there to be seen yet: how far it has come, or why it stopped. */
export function CaptureState({ capture, onChange }: { capture: CaptureJson; onChange: () => void }) {
  const [trouble, setTrouble] = useState<string | null>(null);
  const cancel = async () => {
    try {
      await api(`/captures/${capture.id}/cancel`, { method: 'POST' });
      onChange();
    } catch (thrown) {
      setTrouble(sentenceOf(thrown));
    }
  };
  const readingLink = (
    <a className="button" href={`/captures/${capture.id}/reading`}>
      See how the file was read
    </a>
  );
  if (capture.status === 'failed')
    return (
      <div className="capture-state">
        <Message
          verdict="bad"
          live="alert"
          title={capture.error?.message ?? 'The file could not be read.'}
          happened={
            capture.error?.line == null ? undefined : `It stopped at line ${grouped(capture.error.line)}.`
          }
          kept="The file as it came. Nothing in it was changed."
          todo={capture.error?.hint ?? 'Look at the first lines and say how they are to be read.'}
          actions={readingLink}
        />
      </div>
    );
  if (capture.status === 'cancelled')
    return (
      <div className="capture-state">
        <Message
          verdict="info"
          title="Reading was cancelled"
          kept="The file as it came."
          todo="Read it again from the page that shows how the file was understood."
          actions={readingLink}
        />
      </div>
    );
  const known = capture.status === 'reading' || capture.status === 'measuring';
  return (
    <div className="capture-state" role="status">
      <div className="capture-progress">
        <Progress
          label={WORK[capture.status] ?? 'Working'}
          {...(known ? { value: capture.progress, figure: `${Math.round(capture.progress * 100)} %` } : {})}
        />
        <Button small onClick={cancel}>
          Cancel
        </Button>
      </div>
      <p className="text-soft">You can leave this page: the work goes on, and the capture is in the list.</p>
      {trouble !== null && <Message verdict="bad" live="alert" title={trouble} />}
    </div>
  );
}

/** The capture could not be had at all. */
export function CaptureGone({ error }: { error: unknown }) {
  const missing = error instanceof ApiFailure && error.status === 404;
  return (
    <div className="capture-state">
      <Message
        verdict={missing ? 'info' : 'bad'}
        live="alert"
        title={missing ? 'This capture is not here' : 'The capture could not be loaded'}
        happened={missing ? 'It does not exist, was deleted, or is in another workshop.' : sentenceOf(error)}
        todo={
          missing
            ? 'Look in the list of captures; a deleted one can be brought back for 30 days.'
            : 'Reload the page.'
        }
        actions={
          <a className="button" href="/captures">
            All captures
          </a>
        }
      />
    </div>
  );
}

/** The shape that is coming. */
export function CaptureSkeleton() {
  return (
    <div className="capture-skeleton" role="status">
      <span className="sr-only">Loading the capture</span>
      <div aria-hidden="true">
        <div className="skeleton" />
        <div className="skeleton" />
        <div className="skeleton" />
      </div>
    </div>
  );
}
