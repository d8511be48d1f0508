import { type FormEvent, useState } from 'react';
import type { PhotoJson } from '../../contract/areas/jobs.ts';
import { api, sentenceOf } from '../base/api.ts';
import { Button } from '../base/Button.tsx';
import { Dialog } from '../base/Dialog.tsx';
import { Field } from '../base/Field.tsx';

interface CaptionDialogProps {
  photo: PhotoJson;
  onClose: () => void;
  onSaved: () => void;
}

/** What a photo shows: read out to those who cannot see it, and printed under it. */
export function CaptionDialog({ photo, onClose, onSaved }: CaptionDialogProps) {
  const [caption, setCaption] = useState(photo.caption);
  const [busy, setBusy] = useState(false);
  const [trouble, setTrouble] = useState<string | null>(null);
  const save = async (event: FormEvent) => {
    event.preventDefault();
    setBusy(true);
    try {
      await api(`/photos/${photo.id}`, { method: 'PATCH', body: { caption }, etag: photo.etag });
      onSaved();
    } catch (thrown) {
      setTrouble(sentenceOf(thrown));
      setBusy(false);
    }
  };
  return (
    <Dialog open title="What the photo shows" onClose={onClose}>
      <form className="mt-3 grid gap-4" onSubmit={save}>
        <Field label="Caption" error={trouble}>
          <input
            className="box"
            maxLength={500}
            value={caption}
            onChange={(event) => setCaption(event.target.value)}
          />
        </Field>
        <div className="flex justify-end gap-2">
          <Button onClick={onClose}>Cancel</Button>
          <Button type="submit" kind="main" busy={busy}>
            Keep
          </Button>
        </div>
      </form>
    </Dialog>
  );
}
