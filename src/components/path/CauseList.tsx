import { useState } from 'react';
import type { NextJson } from '../../contract/areas/path.ts';
import { api, sentenceOf } from '../base/api.ts';
import { Button } from '../base/Button.tsx';
import { Verdict } from '../base/Verdict.tsx';
import { CAUSE_SHAPE } from './result-shape.ts';

interface CauseListProps {
  jobId: string;
  causes: NextJson['causes'];
  onChange: (next: NextJson) => void;
}

/** Beyond these the list is folded; the heaviest come first. */
const SHOWN = 6;

/** The causes, each with its state in a word and a shape, why, and a way for a person to say otherwise. */
export function CauseList({ jobId, causes, onChange }: CauseListProps) {
  const open = causes.filter(({ state }) => state !== 'ruled out');
  const out = causes.filter(({ state }) => state === 'ruled out');
  const rows = (list: NextJson['causes']) => (
    <ul className="path-causes">
      {list.map((one) => (
        <CauseRow key={one.cause} jobId={jobId} one={one} onChange={onChange} />
      ))}
    </ul>
  );
  return (
    <section aria-labelledby="path-causes">
      <h2 id="path-causes">
        Causes <small>{open.length} open</small>
      </h2>
      {rows(open.slice(0, SHOWN))}
      {open.length > SHOWN && (
        <details>
          <summary>{open.length - SHOWN} more, less weighty</summary>
          {rows(open.slice(SHOWN))}
        </details>
      )}
      {out.length > 0 && (
        <details>
          <summary>Ruled out: {out.length}</summary>
          {rows(out)}
        </details>
      )}
    </section>
  );
}

function CauseRow({
  jobId,
  one,
  onChange,
}: {
  jobId: string;
  one: NextJson['causes'][number];
  onChange: CauseListProps['onChange'];
}) {
  const [why, setWhy] = useState('');
  const [problem, setProblem] = useState('');
  const overruled = one.because.some(({ effect }) => effect === 'put back' || effect === 'set aside');
  const say = async (decision: 'put back' | 'set aside' | null) => {
    try {
      const { data } = await api<NextJson>(`/jobs/${jobId}/causes/${one.cause}`, {
        method: 'PUT',
        body: { decision, why },
      });
      setWhy('');
      setProblem('');
      onChange(data);
    } catch (thrown) {
      setProblem(sentenceOf(thrown));
    }
  };
  return (
    <li>
      <details>
        <summary>
          {one.name} <Verdict verdict={CAUSE_SHAPE[one.state]} word={one.state} />
        </summary>
        <ul>
          {one.because.map(({ effect, text }) => (
            <li key={effect + text}>
              {effect === 'against' ? 'does not fit' : effect}: {text}
            </li>
          ))}
          {one.because.length === 0 && <li>Nothing recorded says anything of it yet.</li>}
        </ul>
        <p>Proved by: {one.prove}</p>
        <label className="field">
          <span className="field-label">You know better? Say why</span>
          <input value={why} maxLength={1000} onChange={(event) => setWhy(event.target.value)} />
        </label>
        <Button
          small
          disabled={why.trim() === ''}
          onClick={() => say(one.state === 'ruled out' ? 'put back' : 'set aside')}
        >
          {one.state === 'ruled out' ? 'Put it back' : 'Set it aside'}
        </Button>
        {overruled && (
          <Button small kind="quiet" onClick={() => say(null)}>
            Take the word back
          </Button>
        )}
        {problem !== '' && <p role="alert">{problem}</p>}
      </details>
    </li>
  );
}
