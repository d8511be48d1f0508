import { useState } from 'react';
import useSWR from 'swr';
import { api, fetcher, sentenceOf } from '../base/api.ts';
import { Button } from '../base/Button.tsx';
import { Dialog } from '../base/Dialog.tsx';
import { Message } from '../base/Message.tsx';
import { timeText } from '../base/numbers.ts';
import type { CaptureList } from '../captures/useCaptureList.ts';

interface LinkCaptureDialogProps {
  jobId: string;
  timeZone: string;
  onClose: () => void;
  onLinked: () => void;
}

/** Captures of the workshop that belong to no job yet, to be taken into this one. */
export function LinkCaptureDialog({ jobId, timeZone, onClose, onLinked }: LinkCaptureDialogProps) {
  const [search, setSearch] = useState('');
  const [trouble, setTrouble] = useState<string | null>(null);
  const [busy, setBusy] = useState<string | null>(null);
  const { data, error } = useSWR<CaptureList, Error>(
    `/captures?limit=30${search.trim() === '' ? '' : `&search=${encodeURIComponent(search.trim())}`}`,
    fetcher,
    { keepPreviousData: true },
  );
  const free = data?.items.filter((capture) => capture.jobId === null) ?? [];
  const link = async (id: string) => {
    setBusy(id);
    setTrouble(null);
    try {
      await api(`/captures/${id}`, { method: 'PATCH', body: { jobId } });
      onLinked();
    } catch (thrown) {
      setTrouble(sentenceOf(thrown));
      setBusy(null);
    }
  };
  return (
    <Dialog
      open
      title="Take a capture into the job"
      onClose={onClose}
      actions={<Button onClick={onClose}>Cancel</Button>}
    >
      <input
        className="box mt-3"
        type="search"
        aria-label="Search captures by title"
        placeholder="Title"
        maxLength={200}
        value={search}
        onChange={(event) => setSearch(event.target.value)}
      />
      {(trouble !== null || error !== undefined) && (
        <Message
          verdict="bad"
          live="alert"
          title="The capture was not taken in"
          happened={trouble ?? sentenceOf(error)}
        />
      )}
      <ul className="mt-3 max-h-80 overflow-y-auto">
        {free.map((capture) => (
          <li key={capture.id} className="flex items-center gap-3 border-b border-rule py-2">
            <span className="min-w-0 grow">
              <span className="block break-words">{capture.title}</span>
              <span className="figures text-caption text-soft">{timeText(capture.createdAt, timeZone)}</span>
            </span>
            <Button small busy={busy === capture.id} onClick={() => link(capture.id)}>
              Take in
            </Button>
          </li>
        ))}
        {data !== undefined && free.length === 0 && (
          <li className="py-2 text-soft">No capture without a job fits.</li>
        )}
      </ul>
    </Dialog>
  );
}
