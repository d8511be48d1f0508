import { useState } from 'react';
import type { KnownGoodJson } from '../../contract/areas/library.ts';
import { api, sentenceOf } from '../base/api.ts';
import { Button, type ButtonKind } from '../base/Button.tsx';
import { Field } from '../base/Field.tsx';
import { Message } from '../base/Message.tsx';

type Decision = KnownGoodJson['reviews'][number]['decision'];

interface ReviewFormProps {
  id: string;
  state: KnownGoodJson['state'];
}

interface Choice {
  readonly decision: Decision;
  readonly text: string;
  readonly kind: ButtonKind;
}

const CHOICES: Record<KnownGoodJson['state'], readonly Choice[]> = {
  proposed: [
    { decision: 'publish', text: 'Publish', kind: 'main' },
    { decision: 'return', text: 'Return to its author', kind: 'plain' },
  ],
  returned: [],
  published: [{ decision: 'retire', text: 'Retire', kind: 'plain' }],
  retired: [],
  superseded: [],
};

const ABOUT: Record<KnownGoodJson['state'], string> = {
  proposed:
    'Look at where it came from, at the trace and at its numbers. Published, its samples and values are frozen and others compare with them.',
  published: 'Retired, it is offered for no further comparison. Comparisons that were made stay as they are.',
  returned: '',
  retired: '',
  superseded: '',
};

/** Publish, return or retire, with a note; never by the author. A return without a reason helps nobody, so it asks for one. */
export function ReviewForm({ id, state }: ReviewFormProps) {
  const [note, setNote] = useState('');
  const [busy, setBusy] = useState<Decision | null>(null);
  const [trouble, setTrouble] = useState<string | null>(null);
  const [noteMissing, setNoteMissing] = useState(false);
  const choices = CHOICES[state];
  if (choices.length === 0) return null;
  const decide = async (decision: Decision) => {
    if (decision === 'return' && note.trim() === '') {
      setNoteMissing(true);
      return;
    }
    setBusy(decision);
    setTrouble(null);
    try {
      await api<KnownGoodJson>(`/known-goods/${id}/reviews`, {
        method: 'POST',
        body: { decision, note: note.trim() },
      });
      location.reload();
    } catch (thrown) {
      setTrouble(sentenceOf(thrown));
      setBusy(null);
    }
  };
  return (
    <div className="grid max-w-140 gap-3">
      <p className="text-soft">{ABOUT[state]}</p>
      <Field
        label="Note to the author"
        help="What you looked at, or what is missing."
        error={noteMissing && note.trim() === '' ? 'Say what is missing, so that it can be mended' : null}
      >
        <textarea
          className="box"
          maxLength={2000}
          value={note}
          onChange={(event) => setNote(event.target.value)}
        />
      </Field>
      {trouble !== null && (
        <Message verdict="bad" live="alert" title="The review was not kept" happened={trouble} />
      )}
      <div className="flex flex-wrap gap-2">
        {choices.map((choice) => (
          <Button
            key={choice.decision}
            kind={choice.kind}
            busy={busy === choice.decision}
            onClick={() => decide(choice.decision)}
          >
            {choice.text}
          </Button>
        ))}
      </div>
    </div>
  );
}
