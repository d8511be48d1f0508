import type { CaptureInput } from '../../engine/capture.ts';
import { buildPyramid } from '../../engine/signal/pyramid.ts';
import type { KnownGoodRecord } from '../access.ts';
import { getBytes } from '../storage/get-bytes.ts';
import {
  knownGoodPyramidKey,
  knownGoodSamplesKey,
  knownGoodTimesKey,
  knownGoodTimesPyramidKey,
} from '../storage/keys.ts';
import { listKeys } from '../storage/list-keys.ts';
import { putObject } from '../storage/put-object.ts';
import { encodePyramid, encodeTimesPyramid } from '../storage/pyramid-file.ts';
import { asFloat32, asFloat64, bytesOf } from '../storage/typed-bytes.ts';

/** Stores a known-good's own copy: samples, pyramids and, on an uneven axis, times. */
export async function writeFrozen(id: string, { axis, signals }: CaptureInput): Promise<void> {
  for (const { index, samples } of signals) {
    await putObject(knownGoodSamplesKey(id, index), bytesOf(samples));
    await putPyramid(id, index, samples);
  }
  if (axis.kind === 'uneven') {
    await putObject(knownGoodTimesKey(id), bytesOf(axis.timesS));
    await putObject(knownGoodTimesPyramidKey(id), encodeTimesPyramid(axis.timesS));
  }
  whole.add(id);
}

const putPyramid = (id: string, index: number, samples: Float32Array) =>
  putObject(knownGoodPyramidKey(id, index), encodePyramid(samples.length, buildPyramid(samples)));

/** Known-goods whose pyramids this process saw. */
const whole = new Set<string>();

/** Makes the pyramids that are missing: known-goods frozen by an earlier version had none. */
export async function ensurePyramids(row: KnownGoodRecord, indices: readonly number[]): Promise<void> {
  const { id, axis } = row;
  if (whole.has(id)) return;
  const there = new Set(await listKeys(`known-goods/${id}/`));
  for (const index of indices) {
    if (there.has(knownGoodPyramidKey(id, index))) continue;
    await putPyramid(id, index, asFloat32(await getBytes(knownGoodSamplesKey(id, index))));
  }
  if (axis.kind === 'uneven' && !there.has(knownGoodTimesPyramidKey(id)))
    await putObject(
      knownGoodTimesPyramidKey(id),
      encodeTimesPyramid(asFloat64(await getBytes(knownGoodTimesKey(id)))),
    );
  if (whole.size > 10_000) whole.clear();
  whole.add(id);
}
