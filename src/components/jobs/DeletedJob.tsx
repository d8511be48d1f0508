import { useState } from 'react';
import { api, sentenceOf } from '../base/api.ts';
import { Button, buttonClass } from '../base/Button.tsx';
import { Message } from '../base/Message.tsx';

/** What stands where a job was, right after somebody deleted it. */
export function DeletedJob({ id, name, onBack }: { id: string; name: string; onBack: () => void }) {
  const [trouble, setTrouble] = useState<string | undefined>(undefined);
  const undo = () =>
    api(`/jobs/${id}/restore`, { method: 'POST' }).then(onBack, (thrown: unknown) =>
      setTrouble(sentenceOf(thrown)),
    );
  return (
    <div className="max-w-160 p-(--margin)">
      <Message
        verdict="info"
        live="status"
        title={`${name} is deleted`}
        happened={trouble}
        kept="Its captures stay. The job itself can be brought back for 30 days."
        actions={
          <>
            <Button icon="undo" onClick={undo}>
              Undo
            </Button>
            <a className={buttonClass()} href="/jobs">
              To the jobs
            </a>
          </>
        }
      />
    </div>
  );
}
