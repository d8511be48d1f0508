import type { Side } from '../types.ts';
import { camShape } from './cam.ts';
import { crankShape } from './crank.ts';
import { switchedOnShape, switchedVoltsShape } from './event.ts';
import { periodicShape } from './periodic.ts';
import { starterShape } from './starter.ts';
import { supplyShape } from './supply.ts';

/** Raise it when a vector's meaning changes: kept ones are then made again. */
export const SHAPE_VERSION = 1;
export const SHAPE_LENGTH = 128;

/** The shape of a signal as 128 numbers; null where it has no wheel, event or period to be measured by. */
export function shapeVector(side: Side): Float32Array | null {
  switch (side.circuit) {
    case 'crank-vr':
    case 'crank-hall':
      return crankShape(side);
    case 'cam-vr':
    case 'cam-hall':
      return camShape(side);
    case 'coil-primary-voltage':
    case 'injector-voltage':
      return switchedVoltsShape(side);
    case 'coil-primary-current':
    case 'coil-command':
    case 'injector-current':
      return switchedOnShape(side);
    case 'starter-current':
      return starterShape(side);
    case 'supply-voltage':
      return supplyShape(side);
    case 'fuel-pump-current':
    case 'other':
      return periodicShape(side);
  }
}
