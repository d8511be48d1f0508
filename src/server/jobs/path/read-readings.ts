import type { z } from 'zod';
import type { checkInput } from '../../../contract/areas/path.ts';
import { readTypedNumber } from '../../../engine/reading/typed-number.ts';
import { ApiError } from '../../errors.ts';
import { CHECKS, type CheckId } from './data/checks.ts';
import type { TypedReading } from './facts.ts';
import { convert, unitsFor } from './units.ts';

/** Readings as numbers. A unit that cannot be this reading's, and a number that can be read in two ways, are refused in words. */
export function readReadings(
  check: CheckId,
  readings: z.output<typeof checkInput>['readings'],
): TypedReading[] {
  const details: { path: string; message: string }[] = [];
  const read = readings.map(({ what, value, unit }, index) => {
    const typed = typeof value === 'number' ? { value } : readTypedNumber(value);
    if ('problem' in typed) details.push({ path: `readings.${index}.value`, message: typed.problem });
    const spec = CHECKS[check].readings[what];
    if (spec !== undefined && convert(1, unit, spec.unit) === null) {
      details.push({
        path: `readings.${index}.unit`,
        message: `is not a unit of ${spec.what}: use ${unitsFor(spec.unit).join(', ')}`,
      });
    }
    return { what, value: 'value' in typed ? typed.value : 0, unit };
  });
  if (details.length > 0) throw new ApiError('invalid', { details });
  return read;
}
