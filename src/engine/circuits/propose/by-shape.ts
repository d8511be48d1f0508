import type { TimeAxis } from '../../capture.ts';
import type { Proposal } from '../../reading/types.ts';
import type { Shape } from './shape.ts';

type Guess = Omit<Proposal, 'unit'>;

const unsure = (because: string): Guess => ({ circuit: 'other', confidence: 0.2, because });

/** The circuit a trace looks like when its name says nothing. Never surer than 0.7: many circuits look alike. */
export function byShape(unit: string | null, shape: Shape | null, axis: TimeAxis): Guess {
  if (!shape) return unsure('there are no samples to look at');
  if (shape.flat) return flat(unit, shape);
  if (axis.kind === 'uneven' && axis.holds)
    return unsure('two logic levels alone do not say which circuit it is');
  return unit === 'A' ? amperes(shape) : volts(unit, shape);
}

function flat(unit: string | null, shape: Shape): Guess {
  return unit === 'V' && shape.median > 9 && shape.median < 15.5
    ? { circuit: 'supply-voltage', confidence: 0.35, because: 'a steady trace at battery voltage' }
    : unsure('a flat trace does not show where it comes from');
}

function volts(unit: string | null, shape: Shape): Guess {
  const sure = unit === 'V' ? 1 : 0.7;
  const rare = shape.topShare < 0.03;
  if (rare && shape.kickRatio > 2.2 && shape.median > 0) {
    const timesFeed = shape.highest / shape.median;
    if (timesFeed > 11) {
      return {
        circuit: 'coil-primary-voltage',
        confidence: 0.65 * sure,
        because: 'kicks many times the feed voltage',
      };
    }
    if (timesFeed > 3 && timesFeed < 8) {
      return {
        circuit: 'injector-voltage',
        confidence: 0.55 * sure,
        because: 'kicks of a few times the feed voltage',
      };
    }
    return {
      circuit: 'injector-voltage',
      confidence: 0.3,
      because: 'kicks above the feed, but coil and injector overlap there',
    };
  }
  if (shape.twoLevels && !shape.aboutZero) {
    if (shape.swings >= 20 && shape.highShare > 0.2 && shape.highShare < 0.8) {
      return { circuit: 'crank-hall', confidence: 0.5 * sure, because: 'many pulses between two levels' };
    }
    return shape.highShare < 0.12 && shape.swings >= 2
      ? { circuit: 'coil-command', confidence: 0.35, because: 'short pulses between two levels' }
      : { circuit: 'cam-hall', confidence: 0.3, because: 'a few pulses between two levels' };
  }
  if (shape.aboutZero && shape.swings >= 20) {
    return { circuit: 'crank-vr', confidence: 0.6 * sure, because: 'many swings about zero' };
  }
  if (shape.aboutZero && shape.swings >= 2) {
    return { circuit: 'cam-vr', confidence: 0.3, because: 'a few swings about zero' };
  }
  if (shape.lowest > 3 && shape.highest < 16 && shape.median > 7 && shape.median < 15.5) {
    return {
      circuit: 'supply-voltage',
      confidence: 0.5 * sure,
      because: 'a level near battery voltage that is never pulled to ground',
    };
  }
  return unsure('neither name nor shape says which circuit it is');
}

function amperes(shape: Shape): Guess {
  const most = Math.max(Math.abs(shape.highest), Math.abs(shape.lowest));
  if (most > 80) return { circuit: 'starter-current', confidence: 0.7, because: 'more than 80 A' };
  if (most > 2.5 && most < 40 && shape.zeroShare > 0.4) {
    return most > 5
      ? {
          circuit: 'coil-primary-current',
          confidence: 0.5,
          because: 'pulses of several amperes with nothing between them',
        }
      : {
          circuit: 'coil-primary-current',
          confidence: 0.3,
          because: 'pulses of a few amperes; coil and injector overlap there',
        };
  }
  if (most > 0.3 && most <= 2.5 && shape.zeroShare > 0.4) {
    return {
      circuit: 'injector-current',
      confidence: 0.45,
      because: 'pulses of about an ampere with nothing between them',
    };
  }
  if (shape.lowest > 0.5 && most < 25 && shape.swingRateHz > 50) {
    return { circuit: 'fuel-pump-current', confidence: 0.5, because: 'a steady current with a fast ripple' };
  }
  return unsure('amperes, but no circuit that is known by its shape');
}
