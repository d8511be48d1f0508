import type { TimeAxis } from '../../engine/capture.ts';
import { buildPyramid } from '../../engine/signal/pyramid.ts';
import { pyramidKey, samplesKey, timesKey, timesPyramidKey } from './keys.ts';
import { putObject } from './put-object.ts';
import { encodePyramid, encodeTimesPyramid } from './pyramid-file.ts';
import { bytesOf } from './typed-bytes.ts';

/** Stores one signal's samples and its pyramid under a samples version that nobody reads yet. */
export async function writeSamples(
  captureId: string,
  samplesVersion: number,
  signal: number,
  samples: Float32Array,
): Promise<void> {
  const pyramid = encodePyramid(samples.length, buildPyramid(samples));
  await putObject(samplesKey(captureId, samplesVersion, signal), bytesOf(samples));
  await putObject(pyramidKey(captureId, samplesVersion, signal), pyramid);
}

/** Stores the times of an uneven axis; an even one needs none. */
export async function writeTimes(captureId: string, samplesVersion: number, axis: TimeAxis): Promise<void> {
  if (axis.kind === 'even') return;
  await putObject(timesKey(captureId, samplesVersion), bytesOf(axis.timesS));
  await putObject(timesPyramidKey(captureId, samplesVersion), encodeTimesPyramid(axis.timesS));
}
