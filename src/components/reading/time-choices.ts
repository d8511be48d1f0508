import type { CaptureJson } from '../../contract/areas/captures.ts';

const SECONDS: Readonly<Record<string, number>> = { s: 1, ms: 1e-3, us: 1e-6, ns: 1e-9, min: 60 };

export interface TimeChoice {
  readonly unit: string;
  readonly durationS: number;
  readonly rateHz: number | null;
}

/** How long and how fast the capture would be with the unit taken and with its neighbours; empty when that says nothing. */
export function timeChoices(
  capture: Pick<CaptureJson, 'durationS' | 'sampleRateHz'>,
  unit: string,
): TimeChoice[] {
  const now = SECONDS[unit];
  if (now === undefined || capture.durationS <= 0) return [];
  const neighbours: Readonly<Record<string, readonly string[]>> = {
    s: ['s', 'ms'],
    ms: ['ms', 's'],
    us: ['us', 'ms'],
    ns: ['ns', 'us'],
    min: ['min', 's'],
  };
  return (neighbours[unit] ?? []).map((each) => {
    const ratio = SECONDS[each]! / now;
    return {
      unit: each,
      durationS: capture.durationS * ratio,
      rateHz: capture.sampleRateHz === null ? null : capture.sampleRateHz / ratio,
    };
  });
}
