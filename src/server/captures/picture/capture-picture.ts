import { asc, eq } from 'drizzle-orm';
import { decodeWindow } from '../../../engine/drawing/decode-window.ts';
import { count, fixed } from '../../../engine/drawing/format.ts';
import type { CaptureRecord } from '../../access.ts';
import { db } from '../../db/client.ts';
import { captureSignal } from '../../db/schema.ts';
import { ApiError } from '../../errors.ts';
import { axisJson } from '../capture-json.ts';
import { captureWheel } from '../capture-wheel.ts';
import { listMarks } from '../marks/list-marks.ts';
import { captureWindow } from '../window/capture-window.ts';
import { fontFace } from './fonts.ts';
import { PALETTES, type PictureTheme, strokeOf } from './palette.ts';
import { pictureSvg } from './picture-svg.ts';
import { toPng } from './to-png.ts';

export interface PictureQuery {
  readonly from?: number | undefined;
  readonly to?: number | undefined;
  readonly width: number;
  readonly theme: PictureTheme;
  readonly format: 'svg' | 'png';
  readonly signals?: readonly number[] | undefined;
  /** For somebody outside of the workshop: no file name, no people, and no marks that came through links. */
  readonly shared?: boolean;
}

/** More lanes than this make no picture that could be read. */
const MOST_LANES = 16;

/** A stretch of a capture with its marks as a picture to put into a report. */
export async function capturePicture(
  row: CaptureRecord,
  query: PictureQuery,
): Promise<{ readonly contentType: string; readonly body: Buffer }> {
  const { theme, width } = query;
  const { startS, durationS, axis, sampleRateHz } = axisJson(row.axis);
  if (row.axis === null || row.samplesVersion === 0)
    throw new ApiError('not_ready', { message: 'The capture is not read yet; there is nothing to draw.' });
  const all = await db()
    .select()
    .from(captureSignal)
    .where(eq(captureSignal.captureId, row.id))
    .orderBy(asc(captureSignal.index));
  const signals = (
    query.signals === undefined
      ? all
      : query.signals.map((index) => {
          const found = all.find((signal) => signal.index === index);
          if (found !== undefined) return found;
          throw new ApiError('invalid', {
            details: [{ path: 'signals', message: `there is no signal ${index}` }],
          });
        })
  ).slice(0, MOST_LANES);
  const from = Math.max(query.from ?? startS, startS);
  const to = Math.min(query.to ?? startS + durationS, startS + durationS);
  if (!(to > from))
    throw new ApiError('invalid', {
      details: [{ path: 'from', message: 'the stretch lies outside of the capture or has no length' }],
    });
  const columns = Math.min(Math.round(width * 2), 8192);
  const [window, wheel, marks, face] = await Promise.all([
    captureWindow(row, { from, to, columns, signals: signals.map(({ index }) => index) }),
    captureWheel(row),
    listMarks(row.id),
    query.format === 'svg' ? fontFace() : Promise.resolve(''),
  ]);
  const decoded = decodeWindow(
    { get: (name) => window.headers[name] ?? null },
    window.body.slice().buffer as ArrayBuffer,
  );
  const shown =
    decoded.layout === 'samples' ? 'every sample' : 'first, lowest, highest and last of each column';
  const rate = sampleRateHz === null ? 'uneven steps' : `${fixed(sampleRateHz / 1000, 3)} kHz`;
  const picture = pictureSvg({
    title: row.title || 'Capture',
    caption: [
      `${fixed(from, 4)} to ${fixed(to, 4)} s of ${fixed(durationS, 3)} s; ${count(row.samples)} samples a signal at ${rate}. Drawn: ${shown}.`,
      `${query.shared ? 'Recorded' : `File ${row.fileName}, SHA-256 ${row.sha256.slice(0, 12)}…, recorded`} values with factor and offset applied. Drawn by Gapmark; it certifies nothing.`,
    ],
    lanes: signals.map((signal) => ({ signal, ...strokeOf(signal.circuit, theme) })),
    window: decoded,
    holds: axis === 'holds',
    view: { from, to },
    wheel,
    marks: marks
      .filter((mark) => !query.shared || mark.answerId === null)
      .map(({ kind, fromS, toS, author, ...mark }) => ({
        ...mark,
        author: query.shared ? 'the workshop' : author,
        from: fromS,
        to: kind === 'range' ? toS : null,
      })),
    width,
    theme,
    fontFace: face,
  });
  if (query.format === 'svg') return { contentType: 'image/svg+xml', body: Buffer.from(picture.svg) };
  return { contentType: 'image/png', body: await toPng(picture, PALETTES[theme].sheet) };
}
