import type { Proposal } from '../../reading/types.ts';
import type { NameRole } from './name-role.ts';
import type { Shape } from './shape.ts';

/** Kicks are higher, commands lower. Common practice, no source. */
const LOWEST_KICK_V = 30;

type Guess = Omit<Proposal, 'unit'>;

/** The circuit that a name means, with the variant taken from unit and shape; null when the name decides nothing. */
export function byName(name: NameRole, unit: string | null, shape: Shape | null): Guess | null {
  const said = `the name says “${name.word}”`;
  const ampere = unit === 'A';
  switch (name.role) {
    case 'crank':
      return ampere ? null : sensor('crank', name, shape, said);
    case 'cam':
      return ampere ? null : sensor('cam', name, shape, said);
    case 'coil':
      return coil(name, unit, shape, said);
    case 'injector':
      if (ampere) return { circuit: 'injector-current', confidence: 0.92, because: `${said}, in amperes` };
      return unit === 'V'
        ? { circuit: 'injector-voltage', confidence: 0.92, because: said }
        : { circuit: 'injector-voltage', confidence: 0.7, because: `${said}; no unit is given` };
    case 'starter':
      if (unit === 'V')
        return { circuit: 'supply-voltage', confidence: 0.4, because: `${said}, but in volts` };
      return { circuit: 'starter-current', confidence: ampere ? 0.92 : 0.6, because: said };
    case 'supply':
      if (ampere) {
        const heavy = shape !== null && shape.highest > 80;
        return {
          circuit: heavy ? 'starter-current' : 'other',
          confidence: 0.4,
          because: `${said}, but in amperes`,
        };
      }
      return { circuit: 'supply-voltage', confidence: unit === 'V' ? 0.9 : 0.7, because: said };
    case 'fuel-pump':
      if (unit === 'V')
        return { circuit: 'supply-voltage', confidence: 0.4, because: `${said}, but in volts` };
      return { circuit: 'fuel-pump-current', confidence: ampere ? 0.9 : 0.55, because: said };
    case 'other':
      return { circuit: 'other', confidence: 0.75, because: said };
    default:
      return null;
  }
}

function sensor(kind: 'crank' | 'cam', name: NameRole, shape: Shape | null, said: string): Guess {
  if (name.pickup !== name.level) {
    return {
      circuit: name.pickup ? `${kind}-vr` : `${kind}-hall`,
      confidence: 0.93,
      because: `${said} and the kind of sensor`,
    };
  }
  if (!shape || shape.flat) {
    return {
      circuit: `${kind}-vr`,
      confidence: 0.4,
      because: `${said}; a flat trace does not show which kind of sensor`,
    };
  }
  if (shape.twoLevels && !shape.aboutZero) {
    return { circuit: `${kind}-hall`, confidence: 0.93, because: `${said} and the trace has two levels` };
  }
  if (shape.aboutZero && !shape.twoLevels) {
    return { circuit: `${kind}-vr`, confidence: 0.93, because: `${said} and the trace swings about zero` };
  }
  if (shape.twoLevels) {
    return {
      circuit: `${kind}-hall`,
      confidence: 0.6,
      because: `${said}; two levels about zero (AC coupling?)`,
    };
  }
  const offGround = shape.lowest > -0.1 * shape.highest;
  return offGround && shape.swings < 3
    ? {
        circuit: `${kind}-hall`,
        confidence: 0.45,
        because: `${said}; the trace does not show which kind of sensor`,
      }
    : { circuit: `${kind}-vr`, confidence: 0.7, because: `${said} and the trace swings without two levels` };
}

function coil(name: NameRole, unit: string | null, shape: Shape | null, said: string): Guess {
  if (unit === 'A')
    return { circuit: 'coil-primary-current', confidence: 0.92, because: `${said}, in amperes` };
  // Rare pulses of a command stand out as far as kicks do, but rest at a second level and stay below what a kick reaches.
  const pulses = shape?.twoLevels === true && (name.command || shape.highest < LOWEST_KICK_V);
  const kicks = shape !== null && !pulses && shape.kickRatio > 2.2 && shape.topShare < 0.05;
  if (kicks && !name.command) {
    return {
      circuit: 'coil-primary-voltage',
      confidence: unit === 'V' ? 0.95 : 0.75,
      because: `${said} and there are kicks far above the feed`,
    };
  }
  if (kicks)
    return {
      circuit: 'coil-primary-voltage',
      confidence: 0.7,
      because: `${said} and there are kicks far above the feed`,
    };
  if (name.command)
    return {
      circuit: 'coil-command',
      confidence: shape?.twoLevels ? 0.9 : 0.6,
      because: `${said} and a command`,
    };
  if (shape?.twoLevels) {
    return {
      circuit: 'coil-command',
      confidence: 0.7,
      because: `${said}; two levels and no kick look like a coil's command`,
    };
  }
  return {
    circuit: 'coil-primary-voltage',
    confidence: unit === 'V' ? 0.6 : 0.4,
    because: `${said}; no kick is seen`,
  };
}
