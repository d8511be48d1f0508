import { useState } from 'react';
import type { NextJson } from '../../contract/areas/path.ts';
import { Button } from '../base/Button.tsx';
import { Verdict } from '../base/Verdict.tsx';

interface NextChecksProps {
  next: NextJson;
  onOpen: (check: string) => void;
}

const SHOWN = 5;
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
              <dt>Settles</dt>
              <dd>
                {one.settles
                  .filter(
                    ({ rulesOut, pointsAt, shows }) => rulesOut.length + pointsAt.length + shows.length > 0,
                  )
                  .map(({ finding, says, rulesOut, pointsAt, shows }) => (
                    <span key={finding} className="path-settles">
                      {says}:{' '}
                      {shows.length > 0
                        ? `shows ${shows.slice(0, 2).join('; ')}`
                        : rulesOut.length > 0
                          ? `rules out ${rulesOut.length}`
                          : `points at ${pointsAt.slice(0, 2).join('; ')}`}
                    </span>
                  ))}
              </dd>
              <dt>Cost</dt>
              <dd>
                {one.minutes} min, {RISKS[one.risk]}
                {one.needs.length > 0 && `, ${one.needs.join(', ')}`}
              </dd>
            </dl>
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
          {all ? 'Show the first five' : `Show all ${next.checks.length}`}
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
