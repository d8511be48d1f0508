import { type FormEvent, useState } from 'react';
import type { SharedCaptureJson } from '../../contract/areas/sharing.ts';
import { api, sentenceOf } from '../base/api.ts';
import { Message } from '../base/Message.tsx';
import type { MarkPlace } from '../plot/Plot.tsx';

type Answer = SharedCaptureJson['answers'][number];

interface AnswerFormProps {
  secret: string;
  /** A place that was marked for this answer. */
  place: MarkPlace | null;
  /** Where that is, in words. */
  placeWords: string;
  marking: boolean;
  onMark: () => void;
  onForgetPlace: () => void;
  onSent: (answer: Answer) => void;
}

/** Name, answer, and a mark if wanted. What was typed stays until it was taken. Plain buttons: each part counts here. */
export function AnswerForm({
  secret,
  place,
  placeWords,
  marking,
  onMark,
  onForgetPlace,
  onSent,
}: AnswerFormProps) {
  const [name, setName] = useState('');
  const [text, setText] = useState('');
  const [busy, setBusy] = useState(false);
  const [trouble, setTrouble] = useState<string | null>(null);
  const [sent, setSent] = useState(false);

  const send = async (event: FormEvent) => {
    event.preventDefault();
    if (busy) return;
    if (name.trim() === '') return setTrouble('Please say who you are: a first name will do.');
    if (text.trim() === '') return setTrouble('The answer is empty. What would you do?');
    setBusy(true);
    setTrouble(null);
    try {
      const mark = place === null ? null : { ...place, text: text.trim() };
      const { data } = await api<Answer>(`/shared/${secret}/answers`, {
        method: 'POST',
        body: { name, text, mark },
      });
      setText('');
      setSent(true);
      onSent(data);
    } catch (thrown) {
      setTrouble(`${sentenceOf(thrown)} What you typed is still here.`);
    } finally {
      setBusy(false);
    }
  };

  return (
    <form className="answer-form" onSubmit={send} noValidate>
      {trouble !== null && <Message verdict="bad" live="alert" title={trouble} />}
      {sent && trouble === null && (
        <p className="answer-sent" role="status">
          Your answer is sent. You can send another.
        </p>
      )}
      <label>
        <span className="sr-only">Your name</span>
        <input
          className="box"
          placeholder="Your name"
          autoComplete="name"
          maxLength={80}
          value={name}
          onChange={(event) => setName(event.target.value)}
        />
      </label>
      <label className="answer-text">
        <span className="sr-only">Your answer</span>
        <textarea
          className="box"
          rows={1}
          placeholder="Your answer"
          maxLength={2000}
          value={text}
          onChange={(event) => {
            setText(event.target.value);
            setSent(false);
          }}
        />
      </label>
      {place === null ? (
        <button type="button" className="button" aria-pressed={marking} onClick={onMark}>
          {marking ? 'Tap the trace' : 'Mark'}
        </button>
      ) : (
        <button
          type="button"
          className="button"
          onClick={onForgetPlace}
          aria-label={`Take the mark at ${placeWords} away`}
        >
          {placeWords} ×
        </button>
      )}
      <button type="submit" className="button button-main" aria-busy={busy || undefined}>
        {busy ? 'Sending …' : 'Send answer'}
      </button>
    </form>
  );
}
