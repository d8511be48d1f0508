import { asc, eq } from 'drizzle-orm';
import { timeAt } from '../../../engine/signal/time.ts';
import type { CaptureRecord } from '../../access.ts';
import { db } from '../../db/client.ts';
import { captureSignal } from '../../db/schema.ts';
import { ApiError } from '../../errors.ts';
import { getBytes } from '../../storage/get-bytes.ts';
import { samplesKey, timesKey } from '../../storage/keys.ts';
import { asFloat32, asFloat64 } from '../../storage/typed-bytes.ts';
import { findIndex } from '../window/find-index.ts';
import { storeSource } from '../window/store-source.ts';
import { recordedUnit } from './recorded-unit.ts';
import { shortestFloat32 } from './shortest-float32.ts';
import { textCell } from './text-cell.ts';

const ROWS_AT_A_TIME = 32_768;

/**
 * A stretch as CSV, piece by piece: time in seconds, then every signal as recorded (factor and offset not applied). Reading
 * it with our reader gives the same float32 and the same times.
 */
export async function exportCsv(
  row: CaptureRecord,
  span: { readonly from: number | undefined; readonly to: number | undefined },
): Promise<AsyncGenerator<string>> {
  const { axis, samplesVersion } = row;
  if (axis === null) throw new ApiError('not_ready', { message: 'The capture is not read yet.' });
  const source = storeSource(row);
  const from = span.from === undefined ? 0 : await findIndex(source, span.from);
  const to = span.to === undefined ? axis.count : await findIndex(source, span.to, true);
  const signals = await db()
    .select()
    .from(captureSignal)
    .where(eq(captureSignal.captureId, row.id))
    .orderBy(asc(captureSignal.index));
  const names = signals.map((signal) => {
    const unit = recordedUnit(signal);
    return textCell(unit === null ? signal.name : `${signal.name} (${unit})`);
  });

  async function times(start: number, end: number): Promise<(index: number) => number> {
    if (axis?.kind === 'even') return (index) => timeAt(axis, index);
    const column = asFloat64(
      await getBytes(timesKey(row.id, samplesVersion), { from: start * 8, to: end * 8 }),
    );
    return (index) => column[index - start]!;
  }

  return (async function* lines() {
    // The names go out with the first rows, so that a store that is away is told by status and not by half a file.
    let text = `${['Time (s)', ...names].join(',')}\n`;
    if (from >= to) yield text;
    for (let start = from; start < to; start += ROWS_AT_A_TIME) {
      const end = Math.min(to, start + ROWS_AT_A_TIME);
      const timeOf = await times(start, end);
      const columns: Float32Array[] = [];
      for (const { index } of signals) {
        const key = samplesKey(row.id, samplesVersion, index);
        columns.push(asFloat32(await getBytes(key, { from: start * 4, to: end * 4 })));
      }
      for (let index = start; index < end; index += 1) {
        text += String(timeOf(index));
        for (const column of columns) text += `,${shortestFloat32(column[index - start]!)}`;
        text += '\n';
      }
      yield text;
      text = '';
    }
  })();
}
