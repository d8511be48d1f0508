import { describe, expect, it } from 'vitest';
import { COMPLAINTS, type FindingRef } from '../types.ts';
import { unitsFor } from '../units.ts';
import { ALERT_LIST } from './alerts.ts';
import { CAUSE_IDS, CAUSES } from './causes.ts';
import { CAUTIONS } from './cautions.ts';
import { CHECK_IDS, CHECKS, isCheckId } from './checks.ts';
import { CODES } from './codes.ts';
import { CONFLICTS } from './conflicts.ts';

const exists = (ref: string) => {
  const [check = '', finding = ''] = ref.split(':');
  return isCheckId(check) && Object.hasOwn(CHECKS[check].findings, finding);
};
const refs = (lines: readonly (readonly FindingRef[])[]) => lines.flat();

describe('CHECKS', () => {
  it.each(CHECK_IDS)('%s names only findings that exist, and can be reached', (id) => {
    const { first = [], notWhile = [] } = CHECKS[id];
    for (const ref of refs(first)) expect(exists(ref), ref).toBe(true);
    for (const alert of notWhile) expect(Object.hasOwn(ALERT_LIST, alert), alert).toBe(true);
    // Following what must come first never leads back to the check itself.
    const seen = new Set<string>();
    const walk = (check: string): void => {
      for (const line of isCheckId(check) ? (CHECKS[check].first ?? []) : []) {
        const sources = line.map((ref) => ref.split(':')[0] ?? '');
        const onward = sources.filter((one) => !seen.has(one));
        for (const one of onward) {
          seen.add(one);
          walk(one);
        }
      }
    };
    walk(id);
    expect(seen.has(id)).toBe(false);
  });

  it.each(CHECK_IDS)('%s settles something, or makes another one safe', (id) => {
    const { safety, findings, pointsBits } = CHECKS[id];
    const settles = Object.values(findings).some(
      ({ fits, rulesOut }) => (fits?.length ?? 0) + (rulesOut?.length ?? 0) > 0,
    );
    const gates = CHECK_IDS.some((other) =>
      refs(CHECKS[other].first ?? []).some((ref) => ref.startsWith(`${id}:`)),
    );
    expect(safety ? gates || id === 'complaint' : settles || (pointsBits ?? 0) > 0).toBe(true);
  });

  it.each(CHECK_IDS)(
    '%s has a source on itself and on every expected value, and units that can be typed',
    (id) => {
      const { source, readings, findings } = CHECKS[id];
      expect(source.text).not.toBe('');
      for (const { expected, bands, unit } of Object.values(readings)) {
        if (expected !== undefined) expect(expected.source.text).not.toBe('');
        // A number that judges is a number that is shown with its source.
        if (bands !== undefined) expect(expected).toBeDefined();
        expect(unitsFor(unit)).toContain(unit);
        for (const { finding } of bands ?? []) expect(Object.hasOwn(findings, finding)).toBe(true);
      }
    },
  );

  it.each(CHECK_IDS.filter((id) => CHECKS[id].risk > 0))('%s has a risk and shows cautions', (id) => {
    expect(CHECKS[id].cautions.length).toBeGreaterThan(0);
    for (const caution of CHECKS[id].cautions) expect(Object.hasOwn(CAUTIONS, caution)).toBe(true);
  });

  it.each(CHECK_IDS.filter((id) => CHECKS[id].cranks))(
    '%s turns the engine: never on a hybrid, nor with a belt, liquid or leak suspected',
    (id) => {
      expect(CHECKS[id].first).toContainEqual(['high-voltage:none']);
      expect(CHECKS[id].notWhile).toEqual(expect.arrayContaining(['belt', 'liquid', 'leak']));
      expect(CHECKS[id].cautions).toContain('crank');
    },
  );

  it('names cranking in no check that is not held to its conditions', () => {
    for (const id of CHECK_IDS) {
      const { cranks, title, question } = CHECKS[id];
      if (/\bcranking\b/i.test(title + question) && id !== 'plugs-look') expect(cranks, id).toBe(true);
    }
  });

  it('never proposes the shortcuts that the trade warns of', () => {
    const text = CHECK_IDS.map(
      (id) => `${CHECKS[id].title} ${CHECKS[id].question} ${CHECKS[id].how} ${CHECKS[id].needs.join(' ')}`,
    ).join('\n');
    expect(text).not.toMatch(
      /screwdriver|bare (cable|lead|wire)|pierc|by hand under pressure|spark to (ground|block)|carburett?or cleaner/i,
    );
    expect(text).not.toMatch(/ohmmeter/i);
    expect(CHECKS['crank-winding'].first).toContainEqual(['crank-type:two-wire']);
    expect(CHECKS['starting-fluid'].notWhile).toContain('flooded');
    expect(CHECKS['starting-fluid'].first).toContainEqual(['fluid-allowed:yes']);
  });
});

describe('CAUSES', () => {
  it.each(CAUSE_IDS)('%s can be proved, and some check expects it', (id) => {
    const { proof, weight } = CAUSES[id];
    expect(proof.length).toBeGreaterThan(0);
    for (const ref of refs(proof)) expect(exists(ref), ref).toBe(true);
    expect(Object.values(weight).every((one) => one >= 1 && one <= 5)).toBe(true);
    expect(
      CHECK_IDS.some((check) => Object.values(CHECKS[check].findings).some(({ fits }) => fits?.includes(id))),
    ).toBe(true);
    // What proves it does not rule it out.
    for (const ref of refs(proof)) {
      const [check = '', finding = ''] = ref.split(':');
      expect(isCheckId(check) && CHECKS[check].findings[finding]?.rulesOut?.includes(id), ref).not.toBe(true);
    }
  });

  it.each(CAUSE_IDS)('%s can be proved for each complaint that it belongs to', (id) => {
    for (const complaint of COMPLAINTS.filter((one) => CAUSES[id].weight[one] !== undefined)) {
      const open = CAUSES[id].proof.some((line) =>
        line.every((ref) => {
          const check = CHECKS[ref.split(':')[0] as keyof typeof CHECKS];
          return check.complaints === undefined || check.complaints.includes(complaint);
        }),
      );
      expect(open, complaint).toBe(true);
    }
  });
});

describe('CODES, ALERTS and CONFLICTS', () => {
  it('name only checks, causes and findings that exist', () => {
    for (const [code, { checks, causes, title }] of Object.entries(CODES)) {
      expect(code).toMatch(/^[PU][0-3][0-9A-F]{3}$/);
      expect(title).not.toBe('');
      for (const check of checks) expect(isCheckId(check), check).toBe(true);
      for (const cause of causes) expect(CAUSE_IDS).toContain(cause);
    }
    for (const { raisedBy, raisedByCodes = [], clearedBy } of Object.values(ALERT_LIST)) {
      for (const ref of [...raisedBy, ...clearedBy]) expect(exists(ref), ref).toBe(true);
      for (const code of raisedByCodes) expect(Object.hasOwn(CODES, code), code).toBe(true);
    }
    for (const { one, other } of CONFLICTS)
      for (const ref of [one, other]) expect(exists(ref), ref).toBe(true);
  });

  // Titles: SAE J2012 (as reproduced with the outside values of this project).
  it.each([
    ['P0335', 'Crankshaft Position Sensor A Circuit'],
    ['P0340', 'Camshaft Position Sensor A Circuit Bank 1 or Single Sensor'],
    ['P0351', 'Ignition Coil A Primary Control Circuit/Open'],
    ['P0201', 'Cylinder 1 Injector A Circuit'],
    ['P0230', 'Fuel Pump Primary Circuit'],
    ['P0016', 'Crankshaft Position - Camshaft Position Correlation Bank 1 Sensor A'],
    ['P0087', 'Fuel Rail/System Pressure - Too Low Bank 1'],
    ['P0120', 'Throttle/Pedal Position Sensor/Switch A Circuit'],
    ['P0100', 'Mass or Volume Air Flow Sensor A Circuit'],
  ])('%s carries the title of SAE J2012', (code, title) => {
    expect(CODES[code]).toMatchObject({ title, titleFrom: 'named' });
  });
});
