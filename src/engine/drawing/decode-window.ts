/**
 * The binary window of the API turned into typed arrays, without copying. Layout and headers: the OpenAPI text of
 * /captures/{id}/window. Values are as recorded; NaN is a hole. Numbers are little-endian, as on every machine that runs a
 * browser today.
 */

/** Four values a column (first, earlier extreme, later extreme, last); column c starts at from + c * (to - from) / count. */
export interface ColumnsWindow {
  readonly layout: 'columns';
  readonly from: number;
  readonly to: number;
  readonly count: number;
  readonly samplesVersion: number;
  readonly signals: ReadonlyMap<number, Float32Array>;
}

/** The samples themselves; sample i lies at times[i] seconds. */
export interface SamplesWindow {
  readonly layout: 'samples';
  readonly from: number;
  readonly to: number;
  readonly count: number;
  readonly samplesVersion: number;
  readonly holds: boolean;
  /** Samples come at one step. */
  readonly even: boolean;
  readonly times: Float64Array;
  readonly signals: ReadonlyMap<number, Float32Array>;
}

export type DecodedWindow = ColumnsWindow | SamplesWindow;

/** The part of Headers that is read. */
export interface WindowHeaders {
  get(name: string): string | null;
}

export class WindowFormatError extends Error {
  override name = 'WindowFormatError';
}

/** Throws WindowFormatError when a header is missing or the body has another length than the headers say. */
export function decodeWindow(headers: WindowHeaders, body: ArrayBuffer): DecodedWindow {
  const layout = headers.get('Gapmark-Layout');
  const count = number(headers, 'Gapmark-Count');
  const from = number(headers, 'Gapmark-From');
  const to = number(headers, 'Gapmark-To');
  const samplesVersion = number(headers, 'Gapmark-Samples-Version');
  const indices = (headers.get('Gapmark-Signals') ?? '').split(',').filter(Boolean).map(Number);

  if (layout === 'columns') {
    const signals = slices(body, 0, indices, count * 4);
    return { layout, from, to, count, samplesVersion, signals };
  }
  if (layout !== 'samples') throw new WindowFormatError(`unknown layout ${String(layout)}`);

  const axis = headers.get('Gapmark-Axis') ?? 'even';
  const timeBytes = axis === 'even' ? 0 : count * 8;
  const signals = slices(body, timeBytes, indices, count);
  const times = axis === 'even' ? evenTimes(headers, count) : new Float64Array(body, 0, count);
  return {
    layout,
    from,
    to,
    count,
    samplesVersion,
    holds: axis === 'holds',
    even: axis === 'even',
    times,
    signals,
  };
}

/** Recorded value at the time of sample `index`; NaN for a hole or a signal that the window does not hold. */
export function sampleOf(window: SamplesWindow, signal: number, index: number): number {
  return window.signals.get(signal)?.[index] ?? Number.NaN;
}

/** Length of a column in seconds; 0 when the window holds every sample. */
export function columnS(window: DecodedWindow): number {
  return window.layout === 'samples' || window.count === 0 ? 0 : (window.to - window.from) / window.count;
}

function number(headers: WindowHeaders, name: string): number {
  const text = headers.get(name);
  const value = text === null || text === '' ? Number.NaN : Number(text);
  if (!Number.isFinite(value)) throw new WindowFormatError(`header ${name} is ${String(text)}`);
  return value;
}

function evenTimes(headers: WindowHeaders, count: number): Float64Array {
  if (count === 0) return new Float64Array(0);
  const start = number(headers, 'Gapmark-Start');
  const step = number(headers, 'Gapmark-Step');
  return Float64Array.from({ length: count }, (_, index) => start + index * step);
}

function slices(body: ArrayBuffer, offset: number, indices: readonly number[], each: number) {
  const expected = offset + indices.length * each * 4;
  if (body.byteLength !== expected) {
    throw new WindowFormatError(`${body.byteLength} bytes came, ${expected} were announced`);
  }
  return new Map(
    indices.map((index, place) => [index, new Float32Array(body, offset + place * each * 4, each)] as const),
  );
}
