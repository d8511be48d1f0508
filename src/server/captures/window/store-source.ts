import type { CaptureRecord } from '../../access.ts';
import type { StoredAxis } from '../../db/schema.ts';
import { ApiError } from '../../errors.ts';
import { pyramidKey, samplesKey, timesKey, timesPyramidKey } from '../../storage/keys.ts';
import { pyramidLayout } from '../../storage/pyramid-file.ts';
import { readRange } from '../../storage/range-cache.ts';
import { asFloat32, asFloat64 } from '../../storage/typed-bytes.ts';
import type { WindowSource } from './window-source.ts';

/** Where the pieces of one thing's samples lie. What lies there never changes. */
export interface SampleKeys {
  samples(signal: number): string;
  pyramid(signal: number): string;
  readonly times: string;
  readonly timesPyramid: string;
}

/** A capture's samples in the store, through the process's bounded cache. */
export function storeSource(row: Pick<CaptureRecord, 'id' | 'samplesVersion' | 'axis'>): WindowSource {
  const { id, samplesVersion, axis } = row;
  if (axis === null) throw new ApiError('not_ready');
  return keyedSource(axis, {
    samples: (signal) => samplesKey(id, samplesVersion, signal),
    pyramid: (signal) => pyramidKey(id, samplesVersion, signal),
    times: timesKey(id, samplesVersion),
    timesPyramid: timesPyramidKey(id, samplesVersion),
  });
}

/** Samples, pyramids and times of an axis under the keys given. */
export function keyedSource(axis: StoredAxis, keys: SampleKeys): WindowSource {
  const places = pyramidLayout(axis.count);
  const last = places.at(-1);
  const pyramidBytes = last === undefined ? 0 : last.offset + last.blocks * 16;
  const timesPyramidBytes = last === undefined ? 0 : last.timesOffset + last.blocks * 8;
  return {
    axis,
    async samples(signal, from, to) {
      return asFloat32(await readRange(keys.samples(signal), axis.count * 4, from * 4, to * 4));
    },
    async blocks(signal, level, from, to) {
      const { offset } = places[level]!;
      return asFloat32(
        await readRange(keys.pyramid(signal), pyramidBytes, offset + from * 16, offset + to * 16),
      );
    },
    async times(from, to) {
      return asFloat64(await readRange(keys.times, axis.count * 8, from * 8, to * 8));
    },
    async blockTimes(level, from, to) {
      const { timesOffset } = places[level]!;
      const bytes = await readRange(
        keys.timesPyramid,
        timesPyramidBytes,
        timesOffset + from * 8,
        timesOffset + to * 8,
      );
      return asFloat64(bytes);
    },
  };
}
