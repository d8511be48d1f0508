import { type FormEvent, useState } from 'react';
import useSWR from 'swr';
import type { CaptureJson } from '../../contract/areas/captures.ts';
import type { AnswerJson, ShareLinkJson } from '../../contract/areas/sharing.ts';
import { api, fetcher, sentenceOf } from '../base/api.ts';
import { Button } from '../base/Button.tsx';
import { Dialog } from '../base/Dialog.tsx';
import { Field } from '../base/Field.tsx';
import { Message } from '../base/Message.tsx';
import { timeText } from '../base/numbers.ts';
import { LinkList } from './LinkList.tsx';

const DAYS = [3, 14, 90] as const;

/** Makes a link that opens the capture without an account, and keeps those that were made. */
export function ShareDialog({ capture, onClose }: { capture: CaptureJson; onClose: () => void }) {
  const links = useSWR(`/captures/${capture.id}/share-links`, fetcher<{ items: ShareLinkJson[] }>);
  const answers = useSWR(`/captures/${capture.id}/answers`, fetcher<{ items: AnswerJson[] }>);
  const [made, setMade] = useState<{ id: string; url: string } | null>(null);
  const [mailedTo, setMailedTo] = useState('');
  const [copied, setCopied] = useState(false);
  const [busy, setBusy] = useState(false);
  const [trouble, setTrouble] = useState<string | null>(null);

  const make = async (event: FormEvent<HTMLFormElement>) => {
    event.preventDefault();
    const form = new FormData(event.currentTarget);
    const days = Number(form.get('days'));
    const email = String(form.get('email') ?? '').trim();
    setBusy(true);
    setTrouble(null);
    try {
      const { data } = await api<{ id: string; url: string }>(`/captures/${capture.id}/share-links`, {
        method: 'POST',
        body: {
          question: String(form.get('question') ?? ''),
          mayAnswer: form.get('mayAnswer') === 'on',
          ...(email === '' ? {} : { email }),
          expiresAt: new Date(Date.now() + days * 86_400_000).toISOString(),
        },
      });
      setMade(data);
      setMailedTo(email);
      setCopied(false);
      await links.mutate();
    } catch (thrown) {
      setTrouble(sentenceOf(thrown));
    } finally {
      setBusy(false);
    }
  };
  const copy = async () => {
    if (made === null) return;
    await navigator.clipboard.writeText(made.url).then(
      () => setCopied(true),
      () => setTrouble('The browser did not allow copying. Select the address and copy it by hand.'),
    );
  };
  const withdraw = async (link: ShareLinkJson) => {
    setTrouble(null);
    try {
      await api(`/share-links/${link.id}`, { method: 'DELETE' });
      if (made?.id === link.id) setMade(null);
      await links.mutate();
    } catch (thrown) {
      setTrouble(sentenceOf(thrown));
    }
  };
  const hide = async (answer: AnswerJson) => {
    setTrouble(null);
    await api(`/answers/${answer.id}`, { method: 'DELETE' }).catch((thrown) =>
      setTrouble(sentenceOf(thrown)),
    );
    await answers.mutate();
  };

  return (
    <Dialog open title="Share this trace" onClose={onClose}>
      <p className="mt-1 text-soft">
        Whoever has the address sees the trace, its numbers and marks, without an account. No vehicle papers,
        no file name, no people but your name.
      </p>
      {trouble !== null && <Message verdict="bad" live="alert" title={trouble} />}
      {made !== null && (
        <Message
          verdict="good"
          live="status"
          title="The link is made"
          {...(mailedTo === '' ? {} : { happened: `It is on its way to ${mailedTo}, with your question.` })}
          todo="Copy it now: the address is shown only this once."
          actions={
            <Button kind="main" onClick={copy}>
              {copied ? 'Copied' : 'Copy the address'}
            </Button>
          }
        >
          <input
            className="box box-figures"
            readOnly
            aria-label="Address of the link"
            value={made.url}
            onFocus={(event) => event.target.select()}
          />
        </Message>
      )}
      {made === null && (
        <form className="dialog-form" onSubmit={make}>
          <Field label="Your question" help="It stands under the trace. May stay empty.">
            <textarea className="box" name="question" rows={2} maxLength={1000} />
          </Field>
          <Field
            label="Mail it to"
            help="A colleague's address. May stay empty: then you send the link yourself."
          >
            <input className="box" type="email" name="email" maxLength={254} autoComplete="off" />
          </Field>
          <div className="dialog-row">
            <Field label="Ends after">
              <select className="choice" name="days" defaultValue={14}>
                {DAYS.map((days) => (
                  <option key={days} value={days}>
                    {days} days
                  </option>
                ))}
              </select>
            </Field>
            <label className="dialog-tick">
              <input className="tick" type="checkbox" name="mayAnswer" defaultChecked />
              Holders may answer
            </label>
          </div>
          <div className="dialog-actions">
            <Button onClick={onClose}>Close</Button>
            <Button kind="main" type="submit" busy={busy}>
              Make the link
            </Button>
          </div>
        </form>
      )}
      <LinkList links={links.data?.items ?? []} onWithdraw={withdraw} />
      {(answers.data?.items.length ?? 0) > 0 && (
        <section className="share-answers" aria-labelledby="answers-title">
          <h3 id="answers-title">Answers</h3>
          <ul>
            {answers.data?.items.map((answer) => (
              <li key={answer.id}>
                <p>
                  <b>{answer.name}</b> <span className="text-soft">{timeText(answer.createdAt)}</span>
                </p>
                <p>{answer.text}</p>
                <button type="button" className="button button-quiet" onClick={() => hide(answer)}>
                  Hide
                </button>
              </li>
            ))}
          </ul>
        </section>
      )}
      {made !== null && (
        <div className="dialog-actions">
          <Button onClick={() => setMade(null)}>Make another</Button>
          <Button onClick={onClose}>Close</Button>
        </div>
      )}
    </Dialog>
  );
}
