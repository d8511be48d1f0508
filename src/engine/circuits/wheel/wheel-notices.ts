import type { IrregularTooth, Notice, Value } from '../../value.ts';
import type { FoundWheel } from './train.ts';

/** Notices that follow from the pattern alone, whatever the sensor. */
export function patternNotices(wheel: FoundWheel, irregular: Value): Notice[] {
  const { pattern } = wheel;
  const out: Notice[] = [];
  const all = [{ from: wheel.timesS[0]!, to: wheel.timesS.at(-1)! }];
  if (pattern.marks.length === 0) {
    out.push({
      code: 'no-reference-mark',
      severity: 'info',
      text: `The teeth are evenly spaced; the cam signal counts ${pattern.teeth} in a turn, taking the cam to come round once in two turns. Nothing on this wheel marks where a turn begins, so turns are not counted.`,
      evidence: all,
    });
  } else if (pattern.markIsFirstOfSeveral) {
    out.push({
      code: 'several-reference-marks',
      severity: 'info',
      text: 'More than one tooth of this wheel could serve as the reference mark. The first in time was taken, so angles may be turned against those of another capture of the same engine.',
      evidence: all,
    });
  }
  if (pattern.stretches.length > 1) {
    out.push({
      code: 'teeth-not-followed',
      severity: 'watch',
      text: 'The teeth could not be followed all through the capture: the engine stopped, or the signal dropped out or was disturbed in between. Only the turns on either side are counted. Look at the trace there before trusting the count.',
      evidence: pattern.stretches.slice(1, 50).map((start) => ({
        from: wheel.timesS[start - 1]!,
        to: wheel.timesS[start]!,
      })),
    });
  }
  if (
    pattern.gaps.length > 1 &&
    pattern.gaps.some((gap) => gap.size === 2) &&
    pattern.gaps.some((gap) => gap.size > 2)
  ) {
    out.push({
      code: 'gap-or-broken-tooth',
      severity: 'info',
      text: 'One place in the turn lacks a single tooth besides the wider gap. Some wheels are made so; a wheel with a tooth broken off looks the same. Look at the wheel, or compare with a known-good of this engine.',
      evidence: all,
    });
  }
  if (pattern.doubled.length > 0) {
    out.push({
      code: 'doubled-tooth',
      severity: 'watch',
      text: `In most turns one swing too many stands just before place ${pattern.doubled.map((place) => place + 1).join(', ')}. This usually is a damaged tooth or something stuck to the wheel. It was left out of the count; the trace cannot tell which it is.`,
      evidence: all,
    });
  }
  if (Array.isArray(irregular.value) && irregular.value.length > 0) out.push(irregularNotice(irregular));
  return out;
}

function irregularNotice(irregular: Value): Notice {
  const teeth = irregular.value as readonly IrregularTooth[];
  const names = teeth.slice(0, 6).map((tooth) => `tooth ${tooth.tooth} (${describe(tooth)})`);
  const more = teeth.length > 6 ? ` and ${teeth.length - 6} more` : '';
  return {
    code: 'irregular-tooth',
    severity: 'watch',
    text: `At the same place in nearly every turn: ${names.join(', ')}${more}. This usually is a chipped, bent or dirty tooth. Turn the engine by hand and look at the wheel there. The trace cannot tell damage from dirt.`,
    evidence: irregular.evidence,
  };
}

function describe(tooth: IrregularTooth): string {
  const parts: string[] = [];
  if (tooth.height_ratio !== null && (tooth.height_ratio < 0.85 || tooth.height_ratio > 1.15)) {
    parts.push(`${Math.round(tooth.height_ratio * 100)} % of its neighbours' height`);
  }
  if (tooth.spacing_ratio !== null) parts.push(tooth.spacing_ratio > 1 ? 'comes late' : 'comes early');
  return parts.join(', ') || 'uneven';
}
