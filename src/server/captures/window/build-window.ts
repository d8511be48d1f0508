import { timeAt } from '../../../engine/signal/time.ts';
import { bytesOf } from '../../storage/typed-bytes.ts';
import { evenColumns } from './even-columns.ts';
import { findIndex } from './find-index.ts';
import { unevenBounds, unevenColumns } from './uneven-columns.ts';
import type { WindowSource } from './window-source.ts';

export interface WindowRequest {
  readonly from: number;
  readonly to: number;
  readonly columns: number;
  readonly signals: readonly number[];
}

/** The body and the headers that tell its layout: see `windowAnswer` in the contract. */
export interface BuiltWindow {
  readonly headers: Readonly<Record<string, string>>;
  readonly body: Uint8Array;
}

/** Fewer samples a column than this are sent as they are. */
const VALUES_A_COLUMN = 4;

/**
 * The window of a stretch. Outside of the capture there is nothing: count 0. A changes-only capture begins with the change
 * before the stretch, since that value still holds; on any uneven axis one sample more on either side lets the line reach
 * the edges.
 */
export async function buildWindow(source: WindowSource, request: WindowRequest): Promise<BuiltWindow> {
  const { axis } = source;
  const startS = axis.startS;
  const endS = axis.kind === 'even' ? timeAt(axis, axis.count - 1) : axis.endS;
  const fromS = Math.max(Math.min(request.from, request.to), startS);
  const toS = Math.min(Math.max(request.from, request.to), endS);
  const outside = axis.count === 0 || fromS > toS;
  let from = outside ? 0 : await findIndex(source, fromS);
  let to = outside ? 0 : await findIndex(source, toS, true);
  if (axis.kind === 'uneven' && !outside) {
    from = Math.max(0, from - 1);
    to = Math.min(axis.count, to + 1);
  }
  const covered = outside ? { fromS: startS, toS: startS } : { fromS, toS };
  if (to - from < request.columns * VALUES_A_COLUMN) {
    return samplesWindow(source, request.signals, from, to, covered);
  }
  if (axis.kind === 'even') {
    const span = { fromS: timeAt(axis, from), toS: timeAt(axis, to) };
    const values = await Promise.all(
      request.signals.map((signal) => evenColumns(source, signal, from, to, request.columns)),
    );
    return columnsWindow(request, span, values);
  }
  const bounds = await unevenBounds(source, { ...covered, from, to }, request.columns);
  const values = await Promise.all(request.signals.map((signal) => unevenColumns(source, signal, bounds)));
  return columnsWindow(request, covered, values);
}

interface Span {
  readonly fromS: number;
  readonly toS: number;
}

const common = (signals: readonly number[], count: number, { fromS, toS }: Span) => ({
  'Gapmark-Count': String(count),
  'Gapmark-Signals': signals.join(','),
  'Gapmark-From': String(fromS),
  'Gapmark-To': String(toS),
});

function columnsWindow(request: WindowRequest, span: Span, values: readonly Float32Array[]): BuiltWindow {
  return {
    headers: { 'Gapmark-Layout': 'columns', ...common(request.signals, request.columns, span) },
    body: joined(values.map(bytesOf)),
  };
}

async function samplesWindow(
  source: WindowSource,
  signals: readonly number[],
  from: number,
  to: number,
  span: Span,
): Promise<BuiltWindow> {
  const { axis } = source;
  const even = axis.kind === 'even';
  const [times, ...values] = await Promise.all([
    even ? new Float64Array(0) : source.times(from, to),
    ...signals.map((signal) => source.samples(signal, from, to)),
  ]);
  return {
    headers: {
      'Gapmark-Layout': 'samples',
      ...common(signals, to - from, span),
      'Gapmark-Axis': even ? 'even' : axis.holds ? 'holds' : 'uneven',
      ...(even ? { 'Gapmark-Start': String(timeAt(axis, from)), 'Gapmark-Step': String(axis.stepS) } : {}),
    },
    body: joined([bytesOf(times), ...values.map(bytesOf)]),
  };
}

function joined(parts: readonly Uint8Array[]): Uint8Array {
  const body = new Uint8Array(parts.reduce((length, part) => length + part.length, 0));
  let at = 0;
  for (const part of parts) {
    body.set(part, at);
    at += part.length;
  }
  return body;
}
