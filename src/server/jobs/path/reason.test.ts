import { describe, expect, it } from 'vitest';
import { CHECK_IDS } from './data/checks.ts';
import { type CheckRecord, type MeasuredReading, noFacts } from './facts.ts';
import { reason } from './reason.ts';

const record = (
  check: CheckRecord['check'],
  result: CheckRecord['result'],
  finding: string | null = null,
  more: Partial<CheckRecord> = {},
): CheckRecord => ({
  check,
  result,
  finding,
  readings: [],
  codes: [],
  stands: '',
  ...more,
});
const given = (...records: CheckRecord[]) => ({
  ...noFacts,
  complaintText: 'cranks, does not start',
  records,
});
const measured = (more: Partial<MeasuredReading>): MeasuredReading => ({
  check: 'cranking',
  reading: 'speed',
  value: 205,
  unit: 'rpm',
  captureId: 'c1',
  from: 'Crank, rpm_mean',
  finding: 'usual',
  remark: null,
  ...more,
});
const stateOf = (facts: Parameters<typeof reason>[0], cause: string) =>
  reason(facts).causes.find((one) => one.cause === cause);

describe('reason()', () => {
  it('gives the same answer for the same facts', () => {
    const facts = given(record('spark', 'bad', 'none'), record('fuses', 'good', 'good'));
    expect(JSON.stringify(reason(facts).proposals)).toBe(
      JSON.stringify(reason(structuredClone(facts)).proposals),
    );
  });

  it('reaches every check that is not about another complaint or safety from some facts', () => {
    const open = new Set<string>(reason(given()).proposals.map(({ check }) => check));
    const safe = [record('high-voltage', 'good', 'none'), record('fuel-leak', 'good', 'dry')];
    for (const complaint of ['cranks-no-start', 'slow-crank', 'misfire', 'stall']) {
      const more = [record('complaint', 'bad', complaint), record('turn-by-hand', 'good', 'free')];
      const gates: CheckRecord[][] = [
        [],
        [
          record('pressure-relieved', 'good', 'done'),
          record('fluid-allowed', 'good', 'yes'),
          record('spark', 'good', 'good'),
        ],
        [record('pressure-relieved', 'good', 'done'), record('rail-pressure', 'bad', 'low')],
        [record('pressure-relieved', 'good', 'done'), record('rail-pressure', 'good', 'good')],
        [record('rail-pressure', 'bad', 'falls-off')],
        [
          record('spark', 'bad', 'none'),
          record('coil-feed', 'bad', 'missing'),
          record('coil-command', 'bad', 'none'),
        ],
        [record('crank-trace', 'bad', 'none'), record('crank-type', 'good', 'three-wire')],
        [record('crank-type', 'good', 'two-wire')],
        [record('cam-trace', 'bad', 'none'), record('reference', 'bad', 'low')],
        [
          record('story', 'bad', 'heat'),
          record('control-supply', 'good', 'good'),
          record('crank-trace', 'good', 'regular'),
        ],
        [record('which-cylinder', 'bad', 'one'), record('plugs-look', 'bad', 'wet')],
      ];
      for (const gate of gates)
        for (const { check } of reason(given(...safe, ...more, ...gate)).proposals) open.add(check);
    }
    // Without the hand-turning, slow cranking leads to it first; without a look at the tank, to that.
    for (const { check } of reason(
      given(record('complaint', 'bad', 'slow-crank'), record('high-voltage', 'good', 'none')),
    ).proposals)
      open.add(check);
    for (const { check } of reason(given(record('high-voltage', 'good', 'none'))).proposals) open.add(check);
    for (const { check } of reason(
      given(
        record('high-voltage', 'good', 'none'),
        record('fuel-leak', 'good', 'dry'),
        record('spark', 'good', 'good'),
      ),
    ).proposals)
      open.add(check);
    expect(CHECK_IDS.filter((id) => !open.has(id) && id !== 'complaint')).toEqual([]);
  });

  it('rules out by a good result and says which', () => {
    const coil = stateOf(given(record('spark', 'good', 'good')), 'coil');
    expect(coil?.state).toBe('ruled out');
    expect(coil?.because).toContainEqual({
      effect: 'rules out',
      check: 'spark',
      text: 'Spark while cranking: strong and steady on all',
    });
  });

  it('keeps a cause open that does not fit, with less weight, and says so', () => {
    const before = stateOf(given(), 'fuel-pump')?.share ?? 0;
    const after = stateOf(given(record('spark', 'bad', 'none')), 'fuel-pump');
    expect(after?.state).toBe('possible');
    expect(after?.share).toBeLessThan(before);
    expect(after?.because[0]?.effect).toBe('against');
  });

  it('shows a cause only when all of a proof is there', () => {
    const half = given(
      record('crank-trace', 'bad', 'none'),
      record('crank-at-sensor', 'bad', 'none'),
      record('crank-type', 'good', 'three-wire'),
    );
    expect(stateOf(half, 'crank-sensor')?.state).toBe('possible');
    const whole = given(
      ...half.records,
      record('crank-supply', 'good', 'good'),
      record('crank-look', 'good', 'good'),
    );
    expect(stateOf(whole, 'crank-sensor')?.state).toBe('shown');
  });

  it('keeps "unclear" open and proposes it again', () => {
    const reasoned = reason(given(record('high-voltage', 'good', 'none'), record('cranking', 'unclear')));
    expect(reasoned.known.outcomes.has('cranking')).toBe(false);
    expect(reasoned.proposals.find(({ check }) => check === 'cranking')?.again).toBe('unclear');
  });

  it('takes a bad result that does not say which as any of them: it rules out only what all of them do', () => {
    const vague = given(record('compression', 'bad'));
    expect(stateOf(vague, 'weak-cylinder')?.state).toBe('possible');
    expect(stateOf(vague, 'timing-broken')?.state).toBe('possible');
  });

  it('judges a typed number by its band, and leaves the middle to the person', () => {
    const typed = (value: number) =>
      reason(given(record('battery-rest', 'bad', null, { readings: [{ what: 'rest', value, unit: 'V' }] })));
    expect(typed(11.4).contradictions).toEqual([]);
    expect(typed(12.1).contradictions).toEqual([]);
    expect(typed(12.7).contradictions[0]?.kind).toBe('reading against result');
  });

  it('converts units before it judges: 12 700 mV is not low', () => {
    const facts = given(
      record('battery-rest', 'bad', null, { readings: [{ what: 'rest', value: 12_700, unit: 'mV' }] }),
    );
    expect(reason(facts).contradictions).toHaveLength(1);
  });

  it('fills a check from a capture and names the capture', () => {
    const reasoned = reason({ ...given(), measured: [measured({})] });
    expect(reasoned.known.outcomes.get('cranking')).toMatchObject({
      findings: ['usual'],
      by: 'capture',
      captureIds: ['c1'],
    });
  });

  it('names a measured value that disagrees with a typed result and counts neither', () => {
    const reasoned = reason({ ...given(record('cranking', 'bad', 'slow')), measured: [measured({})] });
    expect(reasoned.contradictions).toMatchObject([
      { kind: 'measured against result', checks: ['cranking'] },
    ]);
    expect(reasoned.known.outcomes.has('cranking')).toBe(false);
    // Slow was said: that is enough to stop cranking until somebody has looked.
    expect(reasoned.alerts.has('liquid')).toBe(true);
  });

  it('lets a person say that the typed result stands', () => {
    const stands = record('cranking', 'bad', 'slow', { stands: 'The capture is from another day.' });
    const reasoned = reason({ ...given(stands), measured: [measured({})] });
    expect(reasoned.contradictions).toEqual([]);
    expect(reasoned.known.outcomes.get('cranking')?.findings).toEqual(['slow']);
  });

  it('names two captures that disagree instead of averaging them', () => {
    const reasoned = reason({
      ...given(),
      measured: [measured({}), measured({ captureId: 'c2', value: 80, finding: 'slow' })],
    });
    expect(reasoned.contradictions[0]?.kind).toBe('measured against measured');
    expect(reasoned.known.outcomes.has('cranking')).toBe(false);
  });

  it('names two results that cannot both be true, counts neither and asks for both again', () => {
    const reasoned = reason(
      given(
        record('high-voltage', 'good', 'none'),
        record('fuel-leak', 'good', 'dry'),
        record('spark', 'good', 'good'),
        record('crank-trace', 'bad', 'none'),
      ),
    );
    expect(reasoned.contradictions[0]).toMatchObject({
      kind: 'cannot both be true',
      checks: ['spark', 'crank-trace'],
    });
    expect(reasoned.causes.every(({ state }) => state === 'possible')).toBe(true);
    expect(
      reasoned.proposals.filter(({ again }) => again === 'contradicted').map(({ check }) => check),
    ).toEqual(expect.arrayContaining(['spark', 'crank-trace']));
  });

  it('puts a ruled-out cause back when a person says so, with the reason', () => {
    const facts = {
      ...given(record('spark', 'good', 'good')),
      overrules: [{ cause: 'coil' as const, decision: 'put back' as const, why: 'fails hot', by: 'Ina' }],
    };
    expect(stateOf(facts, 'coil')?.state).toBe('possible');
    expect(stateOf(facts, 'coil')?.because.at(-1)).toEqual({
      effect: 'put back',
      check: null,
      text: 'Ina: fails hot',
    });
  });

  it('sets a cause aside when a person says so', () => {
    const facts = {
      ...given(),
      overrules: [
        { cause: 'immobiliser' as const, decision: 'set aside' as const, why: 'has none', by: 'Ina' },
      ],
    };
    expect(stateOf(facts, 'immobiliser')?.state).toBe('ruled out');
  });

  it('says when nothing is left', () => {
    const overrules = reason(given()).causes.map(({ cause }) => ({
      cause,
      decision: 'set aside' as const,
      why: 'x',
      by: 'y',
    }));
    expect(reason({ ...given(), overrules }).contradictions.at(-1)?.kind).toBe('nothing left');
  });

  it('lets a code point and prove nothing; keeps an unknown one as typed', () => {
    const reasoned = reason(
      given(record('codes', 'bad', 'stored', { codes: ['p0335', 'Z-9 manufacturer'] })),
    );
    const sensor = reasoned.causes.find(({ cause }) => cause === 'crank-sensor');
    expect(sensor?.state).toBe('possible');
    expect(sensor?.because.some(({ effect }) => effect === 'code')).toBe(true);
    expect(reasoned.codes).toMatchObject([{ code: 'P0335' }, { code: 'Z-9 manufacturer', known: null }]);
  });

  it('rules nothing out by a good moment when the fault comes and goes', () => {
    const stalls = {
      ...given(record('complaint', 'bad', 'stall'), record('crank-trace', 'good', 'regular')),
    };
    expect(stateOf(stalls, 'crank-sensor')?.state).toBe('possible');
  });

  it('holds cranking checks back on a hybrid and says why', () => {
    const reasoned = reason(given(record('high-voltage', 'bad', 'hybrid')));
    expect(reasoned.held.find(({ check }) => check === 'cranking')).toMatchObject({ hybrid: true });
    expect(reasoned.proposals.map(({ check }) => check)).not.toContain('cranking');
  });

  it.each([
    ['cranks, does not start', 'cranks-no-start'],
    ['Does not start, stalled on the road', 'cranks-no-start'],
    ['Stalls when warm', 'stall'],
    ['turns over very slowly', 'slow-crank'],
    ['rough and misfires', 'misfire'],
    ['', 'cranks-no-start'],
  ])('guesses the complaint from "%s" and says that it is a guess', (complaintText, complaint) => {
    expect(reason({ ...noFacts, complaintText })).toMatchObject({ complaint, complaintGuessed: true });
  });
});
