import type { TimeAxis } from '../engine/capture.ts';
import { derive } from '../engine/derived/derive.ts';
import type { Source } from '../engine/derived/types.ts';
import { measureCapture } from '../engine/measure.ts';
import type { ReadColumn } from '../engine/reading/types.ts';
import { requested } from './draft-signals.ts';
import type { SignalDraft, ThreadTask } from './thread-messages.ts';

/**
 * The signals that people asked to have made, after the recorded ones and in the order asked, so that one may be made from
 * another. They are stored, measured, compared and taken out like recorded ones; factor and offset of their sources are applied.
 */
export function deriveSignals(
  task: Pick<ThreadTask, 'derived' | 'signalRequests' | 'cylinders'>,
  axis: TimeAxis,
  recorded: readonly SignalDraft[],
  columns: readonly ReadColumn[],
): { readonly made: Float32Array[]; readonly drafts: SignalDraft[] } {
  const made: Float32Array[] = [];
  const drafts = [...recorded];
  const samplesOf = (draft: SignalDraft) =>
    draft.index < columns.length ? columns[draft.index]!.samples : made[draft.index - columns.length]!;
  const source = (column: number): Source | undefined => {
    const draft = drafts.find((each) => each.column === column);
    if (draft === undefined) return undefined;
    const { name, unit, factor, offset } = draft;
    const samples = samplesOf(draft);
    const plain = factor === 1 && offset === 0;
    return { name, unit, values: plain ? samples : samples.map((value) => value * factor + offset) };
  };
  const wheelOf = (column: number) => {
    const draft = drafts.find((each) => each.column === column);
    if (draft === undefined) return null;
    const { index, name, circuit, unit, factor, offset } = draft;
    const signal = { index, name, circuit, unit, factor, offset, samples: samplesOf(draft) };
    return measureCapture({ axis, signals: [signal], cylinders: task.cylinders }).wheel;
  };
  for (const { column, ...recipe } of task.derived) {
    const { name, unit, values, made: how, reason } = derive(recipe, { axis, source, wheelOf });
    const draft: SignalDraft = {
      index: drafts.length,
      column,
      name,
      circuit: 'other',
      circuitConfidence: 1,
      circuitBecause: 'made from other signals',
      unit,
      factor: 1,
      offset: 0,
      made: reason === null ? how : `not made: ${reason}`,
      rail: null,
    };
    made.push(values);
    drafts.push(requested(draft, task.signalRequests));
  }
  return { made, drafts };
}
