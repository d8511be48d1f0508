import { Button } from '../base/Button.tsx';
import { Icon } from '../base/Icon.tsx';
import { Message } from '../base/Message.tsx';
import { bytesText } from '../base/numbers.ts';
import { Verdict } from '../base/Verdict.tsx';
import { CaptureProgress } from './CaptureProgress.tsx';
import { Step } from './Step.tsx';
import type { UploadItem } from './types.ts';
import type { Uploads } from './useUploads.ts';

interface UploadRowProps {
  item: UploadItem;
  uploads: Uploads;
  onChange: () => void;
}

/** One file: on its way, paused, refused, or arrived and being read. */
export function UploadRow({ item, uploads, onChange }: UploadRowProps) {
  const part = item.file.size === 0 ? 0 : item.sentBytes / item.file.size;
  const percent = `${Math.floor(part * 100)} %`;
  return (
    <li className="grid gap-3 border-b border-rule py-4">
      <p className="flex items-baseline gap-2">
        <span className="self-center">
          <Icon name="file" small />
        </span>
        <strong className="min-w-0 grow break-all">{item.file.name}</strong>
        <span className="figures shrink-0 text-dense text-soft">{bytesText(item.file.size)}</span>
      </p>
      {item.phase === 'received' && item.captureId !== null && (
        <CaptureProgress id={item.captureId} onClose={() => uploads.remove(item.key)} onChange={onChange} />
      )}
      {item.phase === 'waiting' && (
        <div className="flex items-center justify-between gap-2">
          <p className="text-soft">Waits for the file before it.</p>
          <Button small onClick={() => uploads.remove(item.key)}>
            Cancel
          </Button>
        </div>
      )}
      {item.phase === 'sending' && (
        <>
          <ol className="grid gap-2">
            <Step
              name="Sending"
              state="now"
              part={part}
              figure={`${bytesText(item.sentBytes)}, ${percent}`}
            />
            <Step name="Reading rows" state="waits" figure="waits" />
            <Step name="Measuring" state="waits" figure="waits" />
          </ol>
          <div className="flex items-center justify-between gap-2">
            <p className="text-dense text-soft">Keep this page open until it has arrived.</p>
            <Button small onClick={() => uploads.giveUp(item.key)}>
              Cancel
            </Button>
          </div>
        </>
      )}
      {item.phase === 'paused' && (
        <div className="grid gap-2" role="status">
          <p className="flex flex-wrap items-baseline justify-between gap-2">
            <Verdict verdict="watch" word={`paused at ${percent}`} />
            <span className="text-dense text-soft">
              {bytesText(item.sentBytes)} of {bytesText(item.file.size)} sent
            </span>
          </p>
          <p className="text-dense text-soft">
            {item.happened} What was sent is kept, and it goes on by itself when the connection is back.
          </p>
          <div className="flex gap-2">
            <Button small kind="main" onClick={() => uploads.goOn(item.key)}>
              Go on
            </Button>
            <Button small onClick={() => uploads.giveUp(item.key)}>
              Cancel
            </Button>
          </div>
        </div>
      )}
      {item.phase === 'refused' && (
        <Message
          verdict="bad"
          live="alert"
          title="This file was not taken"
          happened={item.happened ?? undefined}
          kept="Nothing of it, and your file is as it was."
          todo={item.todo ?? undefined}
          actions={
            <Button small onClick={() => uploads.remove(item.key)}>
              Put away
            </Button>
          }
        />
      )}
    </li>
  );
}
