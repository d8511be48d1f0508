import { describe, expect, it } from 'vitest';
import { CHECK_IDS, CHECKS, type CheckId } from './data/checks.ts';
import type { CheckRecord, Facts } from './facts.ts';
import { type Reasoned, reason } from './reason.ts';

/** Deterministic numbers in [0, 1): mulberry32, public domain. */
function random(seed: number): () => number {
  let state = seed;
  return () => {
    state = (state + 0x6d2b79f5) | 0;
    let t = Math.imul(state ^ (state >>> 15), 1 | state);
    t = (t + Math.imul(t ^ (t >>> 7), 61 | t)) ^ t;
    return ((t ^ (t >>> 14)) >>> 0) / 4294967296;
  };
}

/** Written out by hand, apart from the conditions in the data: what turns the engine over, whoever turns the key. */
const TURNS_THE_ENGINE: readonly CheckId[] = [
  'cranking',
  'supply-cranking',
  'cable-drop',
  'starter-current',
  'starter-feed',
  'ignition-switch',
  'spark',
  'plugs-dried',
  'coil-feed-cranking',
  'coil-command',
  'coil-command-wire',
  'coil-primary',
  'coil-current',
  'crank-trace',
  'crank-at-sensor',
  'crank-wiggle',
  'crank-heat',
  'cam-trace',
  'cam-at-sensor',
  'cam-phase',
  'starting-fluid',
  'rail-pressure',
  'pump-supply',
  'pump-relay',
  'pump-current',
  'fuel-flow',
  'injector-pulse',
  'injector-delivery',
  'rhythm',
  'compression',
  'exhaust',
  'which-cylinder',
  'charging',
];
const OPENS_FUEL: readonly CheckId[] = ['rail-pressure', 'fuel-flow', 'fuel-sample', 'injector-delivery'];

function violations(records: readonly CheckRecord[], { proposals }: Reasoned): string[] {
  const last = new Map(records.map((record) => [record.check, record]));
  const found = (check: CheckId, finding: string) => last.get(check)?.finding === finding;
  const wrong: string[] = [];
  for (const { check } of proposals) {
    const say = (why: string) => wrong.push(`${check}: ${why}`);
    if (TURNS_THE_ENGINE.includes(check)) {
      if (!found('high-voltage', 'none'))
        say('cranks before it is known that no high-voltage machine turns the engine');
      const belt =
        found('cranking', 'fast-even') ||
        found('cam-phase', 'outside') ||
        found('belt-look', 'slipped') ||
        found('belt-look', 'broken');
      if (belt && !found('belt-look', 'good')) say('cranks with a slipped belt suspected');
      if (
        last.get('codes')?.codes.includes('P0016') &&
        !found('belt-look', 'good') &&
        !found('cam-phase', 'inside')
      )
        say('cranks after P0016');
      const locked =
        found('cranking', 'slow') ||
        found('cranking', 'none') ||
        found('complaint', 'slow-crank') ||
        found('turn-by-hand', 'liquid');
      if (locked && !found('turn-by-hand', 'free')) say('cranks with liquid in a cylinder suspected');
      if (found('fuel-leak', 'leak')) say('cranks with fuel leaking');
    }
    if (OPENS_FUEL.includes(check) && !found('pressure-relieved', 'done'))
      say('opens the fuel side under pressure');
    if (check === 'spark' && !found('fuel-leak', 'dry')) say('sparks before leaks were looked for');
    if (check === 'starting-fluid') {
      if (!found('fluid-allowed', 'yes')) say('fluid before it is known to be allowed');
      if (!found('spark', 'good')) say('fluid before the spark is known, tester still on');
      if (found('plugs-look', 'wet')) say('fluid into a flooded engine');
      if (!found('fuel-leak', 'dry')) say('fluid before leaks were looked for');
    }
    if (check === 'crank-winding' && !found('crank-type', 'two-wire'))
      say('an ohmmeter on a sensor not known to be two-wire');
  }
  return wrong;
}

describe('reason()', () => {
  it('lists as cranking what turns the engine, no more and no less', () => {
    expect(CHECK_IDS.filter((id) => CHECKS[id].cranks).toSorted()).toEqual(TURNS_THE_ENGINE.toSorted());
  });

  it('proposes no step before its safety condition, over random sequences of results', () => {
    for (let seed = 1; seed <= 60; seed++) {
      const next = random(seed);
      const pick = <T>(from: readonly T[]): T => from[Math.floor(next() * from.length)]!;
      const records: CheckRecord[] = [];
      for (let step = 0; step < 14; step++) {
        const facts: Facts = {
          complaintText: pick(['cranks, does not start', 'stalls']),
          records,
          codes: [],
          measured: [],
          overrules: [],
        };
        const reasoned = reason(facts);
        expect(violations(records, reasoned), `seed ${seed}, step ${step}`).toEqual([]);
        // Mostly what is proposed, now and then anything at all: people do as they please.
        const check =
          next() < 0.6 && reasoned.proposals.length > 0 ? pick(reasoned.proposals).check : pick(CHECK_IDS);
        const finding = pick(Object.keys(CHECKS[check].findings));
        const luck = next();
        const result =
          luck < 0.1
            ? 'skipped'
            : luck < 0.2
              ? 'unclear'
              : (CHECKS[check].findings[finding]?.result ?? 'unclear');
        const record: CheckRecord = {
          check,
          result,
          finding: result === 'skipped' || result === 'unclear' ? null : finding,
          readings: [],
          codes: check === 'codes' && next() < 0.3 ? ['P0016'] : [],
          stands: '',
        };
        const at = records.findIndex((one) => one.check === check);
        if (at >= 0) records.splice(at, 1);
        records.push(record);
      }
    }
  });
});
