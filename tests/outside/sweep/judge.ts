import type { Trial, Truth } from './trial.ts';

export interface Tally {
  right: number;
  silent: number;
  wrong: number;
}

export interface Fault {
  readonly key: string;
  readonly said: string;
  readonly truth: string;
}

/** Right, silent (null where there is a truth) or wrong. A number where nothing can be known is wrong. */
export function judge(trial: Trial): {
  readonly faults: Fault[];
  readonly verdicts: Map<string, keyof Tally>;
} {
  const faults: Fault[] = [];
  const verdicts = new Map<string, keyof Tally>();
  for (const truth of trial.truths) {
    const found = trial.findings.values.find((value) => value.key === truth.key);
    if (!found) throw new Error(`no value ${truth.key}`);
    const verdict =
      found.value === null
        ? truth.value === null
          ? 'right'
          : 'silent'
        : agrees(found.value, truth)
          ? 'right'
          : 'wrong';
    if (found.value === null && !found.reason) throw new Error(`${truth.key} is null without a reason`);
    verdicts.set(truth.key, verdict);
    if (verdict === 'wrong')
      faults.push({ key: truth.key, said: JSON.stringify(found.value), truth: JSON.stringify(truth.value) });
  }
  const codes = trial.findings.notices.map((notice) => notice.code);
  for (const code of trial.notices ?? []) {
    verdicts.set(`notice ${code}`, codes.includes(code) ? 'right' : 'wrong');
    if (!codes.includes(code)) faults.push({ key: `notice ${code}`, said: codes.join(), truth: 'there' });
  }
  for (const code of trial.noNotices ?? []) {
    verdicts.set(`no notice ${code}`, codes.includes(code) ? 'wrong' : 'right');
    if (codes.includes(code))
      faults.push({ key: `no notice ${code}`, said: codes.join(), truth: 'not there' });
  }
  return { faults, verdicts };
}

function agrees(said: unknown, { value, within = 0, anyTurn = false }: Truth): boolean {
  const near = (a: unknown, b: unknown) =>
    typeof a === 'number' && typeof b === 'number' && Math.abs(a - b) <= within;
  if (typeof value === 'number') return near(said, value);
  if (Array.isArray(value)) {
    if (!Array.isArray(said) || said.length !== value.length) return false;
    const turns = anyTurn ? value.length : 1;
    return Array.from({ length: turns }, (_, turn) =>
      value.every((_, k) => near(said[k], value[(k + turn) % value.length])),
    ).some(Boolean);
  }
  return said === value;
}
