import type { ChargeShape } from './charge-shape.ts';

/** Limited: the last 10 % of the dwell lie within this share. */
const WITHIN = 0.01;
/** The mean of the charges is told from the limit when it is further away than this many of its standard errors. */
const SURE = 3;

/**
 * Whether the current is held: the rise over the last 10 % of the dwell, as a mean over the charges, is below 1 % of the level by
 * more than its error. Where noise leaves that open, what the shapes say, if all of them say the same. null: it cannot be told.
 */
export function currentLimited(shapes: readonly ChargeShape[]): boolean | null {
  const drifts = shapes.flatMap(({ drift }) => (drift ? [drift] : []));
  if (drifts.length === 0) return null;
  const share = drifts.reduce((sum, one) => sum + one.share, 0) / drifts.length;
  const error = Math.sqrt(drifts.reduce((sum, one) => sum + one.error ** 2, 0)) / drifts.length;
  const away = (Math.abs(share) - WITHIN) / Math.max(error, 1e-9);
  if (away > SURE) return false;
  if (away < -SURE) return true;
  const flat = shapes.filter((shape) => shape.flat).length;
  if (Math.abs(away) < 1 && shapes.length < 3) return null;
  return flat === shapes.length ? true : flat === 0 ? false : null;
}
