import { type Portrait, portraitOf } from '../../engine/comparison/shapes/portrait.ts';
import { SHAPE_LENGTH, SHAPE_VERSION, shapeVector } from '../../engine/comparison/shapes/shape-of.ts';
import type { Side } from '../../engine/comparison/types.ts';
import { asFloat32, bytesOf } from '../storage/typed-bytes.ts';

export interface SignalPicture {
  readonly portrait: Portrait | null;
  readonly shape: Uint8Array | null;
  readonly shapeVersion: number;
}

/** What is kept of a signal's look: the small picture and the shape. */
export function pictureOf(side: Side): SignalPicture {
  const shape = shapeVector(side);
  return { portrait: portraitOf(side), shape: shape && bytesOf(shape), shapeVersion: SHAPE_VERSION };
}

/** A kept shape as numbers; null for one of another length. */
export function shapeOfBytes(bytes: Uint8Array): Float32Array | null {
  const shape = asFloat32(new Uint8Array(bytes));
  return shape.length === SHAPE_LENGTH ? shape : null;
}
