import { useState } from 'react';
import type { JobJson } from '../../contract/areas/jobs.ts';
import { api, sentenceOf } from '../base/api.ts';
import { Button } from '../base/Button.tsx';
import { Dialog } from '../base/Dialog.tsx';
import { Message } from '../base/Message.tsx';
import { jobName, vehicleText } from './words.ts';

interface DeleteJobDialogProps {
  job: JobJson;
  onClose: () => void;
  onDeleted: () => void;
}

/** Names what goes and what stays. */
export function DeleteJobDialog({ job, onClose, onDeleted }: DeleteJobDialogProps) {
  const [busy, setBusy] = useState(false);
  const [trouble, setTrouble] = useState<string | null>(null);
  const remove = async () => {
    setBusy(true);
    try {
      await api(`/jobs/${job.id}`, { method: 'DELETE', etag: job.etag });
      onDeleted();
    } catch (thrown) {
      setTrouble(sentenceOf(thrown));
      setBusy(false);
    }
  };
  return (
    <Dialog
      open
      title={`Delete ${jobName(job.number)}?`}
      onClose={onClose}
      actions={
        <>
          <Button onClick={onClose}>Cancel</Button>
          <Button kind="bad" busy={busy} onClick={remove}>
            Delete {jobName(job.number)}
          </Button>
        </>
      }
    >
      <p className="mt-2 break-words">
        {vehicleText(job.vehicle)}: its notes, readings, photos, checks and outcome go. Its captures stay in
        the list of captures. It can be brought back for 30 days.
      </p>
      {trouble !== null && (
        <Message verdict="bad" live="alert" title="The job was not deleted" happened={trouble} />
      )}
    </Dialog>
  );
}
