import type { CauseJson, CheckJson } from '../../../contract/areas/path.ts';
import { CAUSE_IDS, CAUSES } from './data/causes.ts';
import { CAUTIONS } from './data/cautions.ts';
import { CHECK_IDS, CHECKS, type CheckId } from './data/checks.ts';
import { parseRef } from './ref.ts';
import { unitsFor } from './units.ts';

const checkJson = (id: CheckId): CheckJson => {
  const {
    title,
    question,
    how,
    stage,
    needs,
    minutes,
    risk,
    cranks,
    safety,
    complaints,
    readings,
    findings,
    cautions,
    source,
  } = CHECKS[id];
  return {
    check: id,
    title,
    question,
    how,
    stage,
    needs: [...needs],
    minutes,
    risk,
    cranks: cranks ?? false,
    safety: safety ?? false,
    complaints: complaints === undefined ? null : [...complaints],
    readings: Object.entries(readings).map(([reading, { what, unit, expected }]) => ({
      reading,
      what,
      unit,
      units: unitsFor(unit),
      expected:
        expected === undefined
          ? null
          : { ...expected, low: expected.low ?? null, high: expected.high ?? null },
    })),
    findings: Object.entries(findings).map(([finding, one]) => ({
      finding,
      result: one.result,
      says: one.says,
      rulesOut: [...(one.rulesOut ?? [])],
      pointsAt: [...(one.fits ?? [])],
    })),
    cautions: cautions.map((one) => CAUTIONS[one]),
    source,
  };
};

/** The checks as the API lists them. */
export const listChecks = (): CheckJson[] => CHECK_IDS.map(checkJson);

/** The causes as the API lists them. */
export const listCauses = (): CauseJson[] =>
  CAUSE_IDS.map((cause) => {
    const { name, part, because, prove, proof, weight } = CAUSES[cause];
    return { cause, name, part, because, prove, provedBy: proof.map((line) => line.map(parseRef)), weight };
  });
