import type { NextJson } from '../../../contract/areas/path.ts';
import { CAUSES } from './data/causes.ts';
import { CHECKS, type CheckId } from './data/checks.ts';
import { effectOf } from './effect.ts';
import type { Proposal } from './next-checks.ts';
import { outcomeAt } from './outcomes.ts';
import type { Reasoned } from './reason.ts';
import { parseRef } from './ref.ts';

/** For each finding: which of the causes that are still open it rules out, points at, and would show. */
export function settlesOf(
  check: CheckId,
  { causes, complaint, known }: Reasoned,
): NextJson['checks'][number]['settles'] {
  const open = causes.filter(({ state }) => state !== 'ruled out');
  return Object.entries(CHECKS[check].findings).map(([finding, { says, result }]) => {
    const having = (effect: string) =>
      open
        .filter(({ cause }) => effectOf(check, finding, cause, complaint).effect === effect)
        .map(({ cause }) => CAUSES[cause].name);
    const shows = open.filter(({ cause }) =>
      CAUSES[cause].proof.some((line) => {
        const missing = line.filter((ref) => outcomeAt(known.outcomes, ref) === null).map(parseRef);
        return missing.length === 1 && missing[0]?.check === check && missing[0].finding === finding;
      }),
    );
    return {
      finding,
      says,
      result,
      rulesOut: having('rules out'),
      pointsAt: having('fits'),
      shows: shows.map(({ cause }) => CAUSES[cause].name),
    };
  });
}

/** Why this one now, in a sentence or two. */
export function whyOf(proposal: Proposal, reasoned: Reasoned): string {
  const { check, before, bits, codes, again } = proposal;
  if (before !== null)
    return `Has to come before "${CHECKS[before].title}", which would settle most for its cost.`;
  const parts: string[] = [];
  if (again === 'contradicted') parts.push('Its result contradicts another: take it again.');
  if (again === 'unclear') parts.push('It was unclear the last time.');
  if (codes.length > 0) parts.push(`${codes.join(', ')} points here.`);
  const settles = settlesOf(check, reasoned);
  const shows = [...new Set(settles.flatMap((one) => one.shows))];
  const most = Math.max(...settles.map(({ rulesOut }) => rulesOut.length));
  if (most > 0)
    parts.push(
      `Can rule out ${most} of ${reasoned.causes.filter(({ state }) => state !== 'ruled out').length} open causes.`,
    );
  if (shows.length > 0) parts.push(`Can show: ${shows.slice(0, 3).join('; ')}.`);
  const share = Math.round((1 - 0.5 ** bits) * 100);
  parts.push(
    `By the weights it is expected to take away about ${share} % of the doubt for ${CHECKS[check].minutes} min.`,
  );
  return parts.join(' ');
}
