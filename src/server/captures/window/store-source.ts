import type { CaptureRecord } from '../../access.ts';
import { ApiError } from '../../errors.ts';
import { pyramidKey, samplesKey, timesKey, timesPyramidKey } from '../../storage/keys.ts';
import { pyramidLayout } from '../../storage/pyramid-file.ts';
import { readRange } from '../../storage/range-cache.ts';
import { asFloat32, asFloat64 } from '../../storage/typed-bytes.ts';
import type { WindowSource } from './window-source.ts';

/** A capture's samples in the store, through the process's bounded cache. */
export function storeSource(row: Pick<CaptureRecord, 'id' | 'samplesVersion' | 'axis'>): WindowSource {
  const { id, samplesVersion, axis } = row;
  if (axis === null) throw new ApiError('not_ready');
  const places = pyramidLayout(axis.count);
  const last = places.at(-1);
  const pyramidBytes = last === undefined ? 0 : last.offset + last.blocks * 16;
  const timesPyramidBytes = last === undefined ? 0 : last.timesOffset + last.blocks * 8;
  return {
    axis,
    async samples(signal, from, to) {
      const key = samplesKey(id, samplesVersion, signal);
      return asFloat32(await readRange(key, axis.count * 4, from * 4, to * 4));
    },
    async blocks(signal, level, from, to) {
      const { offset } = places[level]!;
      const key = pyramidKey(id, samplesVersion, signal);
      return asFloat32(await readRange(key, pyramidBytes, offset + from * 16, offset + to * 16));
    },
    async times(from, to) {
      return asFloat64(await readRange(timesKey(id, samplesVersion), axis.count * 8, from * 8, to * 8));
    },
    async blockTimes(level, from, to) {
      const { timesOffset } = places[level]!;
      const key = timesPyramidKey(id, samplesVersion);
      return asFloat64(await readRange(key, timesPyramidBytes, timesOffset + from * 8, timesOffset + to * 8));
    },
  };
}
