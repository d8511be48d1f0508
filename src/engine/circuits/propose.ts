import type { TimeAxis } from '../capture.ts';
import type { Circuit } from '../circuit.ts';
import type { Proposal } from '../reading/types.ts';
import { byName } from './propose/by-name.ts';
import { byShape } from './propose/by-shape.ts';
import { nameRole } from './propose/name-role.ts';
import { shapeOf } from './propose/shape.ts';

export interface ProposalInput {
  readonly name: string;
  /** UCUM code as read, or null when the file gives none. */
  readonly unit: string | null;
  /** Prefix of the unit: values are samples × factor. */
  readonly factor: number;
  readonly samples: Float32Array;
  readonly axis: TimeAxis;
}

const AMPERE_CIRCUITS: readonly Circuit[] = [
  'coil-primary-current',
  'injector-current',
  'starter-current',
  'fuel-pump-current',
];

/**
 * Proposes a circuit from name, unit and shape, and says how sure it is (0 to 1). The name leads and the shape decides
 * between variants; where they contradict each other the proposal is unsure. Without a telling name it is never above 0.7.
 * The person confirms or corrects it.
 */
export function proposeCircuit(input: ProposalInput): Proposal {
  const name = nameRole(input.name);
  const shape = shapeOf(input.samples, input.factor, input.axis);
  const unit = input.unit;
  if (unit !== null && unit !== 'V' && unit !== 'A' && unit !== '1') {
    return {
      circuit: 'other',
      unit,
      confidence: 0.9,
      because: `a signal in ${unit} has no circuit of its own`,
    };
  }
  const guess = (name.role === null ? null : byName(name, unit, shape)) ?? byShape(unit, shape, input.axis);
  const usual = AMPERE_CIRCUITS.includes(guess.circuit) ? 'A' : 'V';
  return { ...guess, unit: unit ?? (guess.circuit === 'other' ? '1' : usual) };
}
