import { useState } from 'react';
import type { NextJson } from '../../contract/areas/path.ts';
import { Button } from '../base/Button.tsx';
import { Verdict } from '../base/Verdict.tsx';

interface NextChecksProps {
  next: NextJson;
  onOpen: (check: string) => void;
}

const SHOWN = 3;
const RISKS = ['no risk', 'some risk', 'raised risk', 'high risk'];

/** The checks left, best first: why, what it settles, cost, and its cautions beside it. */
export function NextChecks({ next, onOpen }: NextChecksProps) {
  const [all, setAll] = useState(false);
  const shown = all ? next.checks : next.checks.slice(0, SHOWN);
  return (
    <section className="path-next" aria-labelledby="path-next">
      <h2 id="path-next">
        Next best checks <small>{next.checks.length} left, best first</small>
      </h2>
      <ol>
        {shown.map((one) => (
          <li key={one.check}>
            <h3>{one.title}</h3>
            <dl>
              <dt>Why</dt>
              <dd>{one.why}</dd>
              <dt>Cost</dt>
              <dd>
                {one.minutes} min, {RISKS[one.risk]}
                {one.needs.length > 0 && `, ${one.needs.join(', ')}`}
              </dd>
            </dl>
            <Settles settles={one.settles} />
            {one.cautions.length > 0 && (
              <ul className="path-cautions">
                {one.cautions.map((caution) => (
                  <li key={caution}>
                    <Verdict verdict="watch" word={caution} />
                  </li>
                ))}
              </ul>
            )}
            <Button kind={one === shown[0] ? 'main' : 'plain'} onClick={() => onOpen(one.check)}>
              Record this check
            </Button>
          </li>
        ))}
      </ol>
      {next.checks.length > SHOWN && (
        <Button kind="quiet" onClick={() => setAll(!all)}>
          {all ? 'Show the first three' : `Show all ${next.checks.length}`}
        </Button>
      )}
      {next.held.length > 0 && (
        <details>
          <summary>Held back for safety: {next.held.length}</summary>
          <ul>
            {next.held.map(({ check, title, why }) => (
              <li key={check}>
                {title}: {why}
              </li>
            ))}
          </ul>
        </details>
      )}
    </section>
  );
}

/** What each finding would do, folded away: the why above says how much it settles. */
function Settles({ settles }: { settles: NextJson['checks'][number]['settles'] }) {
  const telling = settles.filter(
    ({ rulesOut, pointsAt, shows }) => rulesOut.length + pointsAt.length + shows.length > 0,
  );
  if (telling.length === 0) return null;
  return (
    <details>
      <summary>What it would settle</summary>
      <ul className="path-settles">
        {telling.map(({ finding, says, rulesOut, pointsAt, shows }) => (
          <li key={finding}>
            {says}:{' '}
            {shows.length > 0
              ? `shows ${shows.slice(0, 2).join('; ')}`
              : rulesOut.length > 0
                ? `rules out ${rulesOut.length}`
                : `points at ${pointsAt.slice(0, 2).join('; ')}`}
          </li>
        ))}
      </ul>
    </details>
  );
}
