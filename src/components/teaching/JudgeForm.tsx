import { useState } from 'react';
import type { AttemptOfJson } from '../../contract/areas/teaching.ts';
import { api, sentenceOf } from '../base/api.ts';
import { Button } from '../base/Button.tsx';
import { Field } from '../base/Field.tsx';
import { Message } from '../base/Message.tsx';

const MARKS = [
  { mark: 'right', text: 'Right' },
  { mark: 'partly', text: 'Partly' },
  { mark: 'wrong', text: 'Not right' },
] as const;

/** Judges the free text of one answer, with a word to its learner. */
export function JudgeForm({
  id,
  etag,
  comment: before,
  name,
}: {
  id: string;
  etag: string;
  comment: string;
  name: string;
}) {
  const [comment, setComment] = useState(before);
  const [busy, setBusy] = useState<string | null>(null);
  const [trouble, setTrouble] = useState<string | null>(null);
  const judge = async (mark: (typeof MARKS)[number]['mark']) => {
    setBusy(mark);
    setTrouble(null);
    try {
      await api<AttemptOfJson>(`/attempts/${id}`, { method: 'PATCH', body: { mark, comment }, etag });
      location.reload();
    } catch (thrown) {
      setTrouble(sentenceOf(thrown));
      setBusy(null);
    }
  };
  return (
    <div className="grid max-w-140 gap-3">
      <Field label={`A word to ${name}`}>
        <textarea
          className="box"
          maxLength={2000}
          value={comment}
          onChange={(event) => setComment(event.target.value)}
        />
      </Field>
      {trouble !== null && (
        <Message verdict="bad" live="alert" title="The judgement was not kept" happened={trouble} />
      )}
      <div className="flex flex-wrap gap-2">
        {MARKS.map(({ mark, text }) => (
          <Button key={mark} busy={busy === mark} onClick={() => judge(mark)}>
            {text}
          </Button>
        ))}
      </div>
    </div>
  );
}
