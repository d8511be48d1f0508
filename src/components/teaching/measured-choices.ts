import type { CaptureJson, MeasurementsJson } from '../../contract/areas/captures.ts';
import { labelOf } from '../capture/labels.ts';
import type { ExerciseDraft } from './exercise-draft.ts';

export interface MeasuredChoice {
  readonly label: string;
  readonly value: number;
  readonly unit: string;
  readonly evidence: ExerciseDraft['evidence'];
}

/** The engine's units as a learner may type them; times under a second are read in milliseconds. */
function typed(value: number, unit: string): { value: number; unit: string } | null {
  const short = (number: number) => Number(number.toPrecision(4));
  if (unit === 's')
    return Math.abs(value) < 1 ? { value: short(value * 1e3), unit: 'ms' } : { value: short(value), unit };
  if (unit === 'deg') return { value: short(value), unit: '°' };
  return ['ms', 'V', 'A', 'rpm', 'Hz', '%', '°', 'bar', '1'].includes(unit)
    ? { value: short(value), unit }
    : null;
}

/** Single numbers that the engine measured on the exercise's signals, to be asked for. */
export function measuredChoices(
  measurements: MeasurementsJson | null,
  capture: CaptureJson,
  signals: readonly number[],
): MeasuredChoice[] {
  return (measurements?.signals ?? []).flatMap(({ index, values }) => {
    const place = signals.indexOf(index);
    if (place < 0) return [];
    const name = capture.signals.find((signal) => signal.index === index)?.name ?? `signal ${place + 1}`;
    return values.flatMap(({ key, value, unit, evidence }) => {
      const found = typeof value === 'number' ? typed(value, unit) : null;
      if (found === null) return [];
      const label = `${labelOf(key)} (${name})`;
      return [
        {
          ...found,
          label,
          evidence: evidence
            .filter(({ from, to }) => to > from)
            .slice(0, 50)
            .map(({ from, to }) => ({ signal: place, from, to, label: labelOf(key) })),
        },
      ];
    });
  });
}
