import type { Alert } from '../types.ts';

/** Dangers that stop checks until something takes them away. */
export const ALERTS = {
  belt: {
    text: 'A slipped or broken timing belt is suspected: no cranking until it is ruled out.',
    raisedBy: [
      'cranking:fast-even',
      'cam-phase:outside',
      'compression:none',
      'rhythm:flat',
      'belt-look:slipped',
      'belt-look:broken',
      'story:noise',
    ],
    raisedByCodes: ['P0016', 'P0017', 'P0018', 'P0019'],
    clearedBy: ['belt-look:good', 'cam-phase:inside'],
  },
  liquid: {
    text: 'Slow or locked cranking may be liquid in a cylinder: no cranking until the plugs are out and it turns freely by hand.',
    raisedBy: ['cranking:slow', 'cranking:none', 'turn-by-hand:liquid', 'turn-by-hand:tight'],
    raisedByComplaint: ['slow-crank'],
    clearedBy: ['turn-by-hand:free'],
  },
  leak: {
    text: 'Fuel leaks or smells: no cranking, no spark, until it is dry and aired.',
    raisedBy: ['fuel-leak:leak'],
    clearedBy: ['fuel-leak:dry'],
  },
  flooded: {
    text: 'The engine is flooded: no starting fluid, no long cranking.',
    raisedBy: ['plugs-look:wet'],
    clearedBy: ['plugs-look:good', 'plugs-look:dry'],
  },
} as const satisfies Record<string, Alert>;
export type AlertId = keyof typeof ALERTS;
export const ALERT_LIST: Readonly<Record<AlertId, Alert>> = ALERTS;
