/** Where things lie in the object store. Ids are ours, never a user's text. */

/** One signal's samples: little-endian float32, as recorded. */
export const samplesKey = (captureId: string, samplesVersion: number, signal: number) =>
  `captures/${captureId}/${samplesVersion}/${signal}.f32`;

/** One signal's pyramid: see src/server/storage/pyramid-file.ts. */
export const pyramidKey = (captureId: string, samplesVersion: number, signal: number) =>
  `captures/${captureId}/${samplesVersion}/${signal}.pyramid`;

/** Times of an uneven axis: little-endian float64. */
export const timesKey = (captureId: string, samplesVersion: number) =>
  `captures/${captureId}/${samplesVersion}/times.f64`;

/** A known-good's own copy of samples and, for an uneven axis, times. */
export const knownGoodSamplesKey = (knownGoodId: string, signal: number) =>
  `known-goods/${knownGoodId}/${signal}.f32`;
export const knownGoodTimesKey = (knownGoodId: string) => `known-goods/${knownGoodId}/times.f64`;
export const knownGoodPyramidKey = (knownGoodId: string, signal: number) =>
  `known-goods/${knownGoodId}/${signal}.pyramid`;
export const knownGoodTimesPyramidKey = (knownGoodId: string) => `known-goods/${knownGoodId}/times.pyramid`;

/** A photo of a job as it was written anew, and the same small. */
export const photoKey = (photoId: string) => `photos/${photoId}/whole`;
export const smallPhotoKey = (photoId: string) => `photos/${photoId}/small`;

/** Times at the pyramid's block bounds of an uneven axis: see src/server/storage/pyramid-file.ts. */
export const timesPyramidKey = (captureId: string, samplesVersion: number) =>
  `captures/${captureId}/${samplesVersion}/times.pyramid`;

/** Everything made from a capture's original, and its original. */
export const capturePrefix = (captureId: string) => `captures/${captureId}/`;
/** Everything that a known-good holds of its own. */
export const knownGoodPrefix = (knownGoodId: string) => `known-goods/${knownGoodId}/`;
export const originalKey = (captureId: string) => `captures/${captureId}/original`;

/** The samples version that a key belongs to, or null for the original. */
export function versionOfKey(key: string): number | null {
  const match = /^captures\/[^/]+\/(\d+)\//.exec(key);
  return match === null ? null : Number(match[1]);
}
