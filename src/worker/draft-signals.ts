import type { TimeAxis } from '../engine/capture.ts';
import { proposeCircuit } from '../engine/circuits/propose.ts';
import type { ReadColumn } from '../engine/reading/types.ts';
import type { SignalRequest } from '../server/db/schema.ts';
import type { SignalDraft } from './thread-messages.ts';

const BY_A_PERSON = { circuitConfidence: 1, circuitBecause: 'set by a person' } as const;

/** Signals of a file just read: what the file says, the program's proposal for the circuit, and over both what a person asked. */
export function draftSignals(
  columns: readonly ReadColumn[],
  axis: TimeAxis,
  requests: readonly SignalRequest[],
): SignalDraft[] {
  return columns.map((column, index) => {
    const { name, unit, factor, samples } = column;
    const proposal = proposeCircuit({ name, unit, factor, samples, axis });
    const draft: SignalDraft = {
      index,
      column: column.column,
      name,
      circuit: proposal.circuit,
      circuitConfidence: proposal.confidence,
      circuitBecause: proposal.because,
      unit: unit ?? proposal.unit,
      factor,
      offset: 0,
      made: null,
      rail: column.rail,
    };
    return requested(draft, requests);
  });
}

/** What a person asked for a signal's column, over what stands. */
export function requested(draft: SignalDraft, requests: readonly SignalRequest[]): SignalDraft {
  const request = requests.find(({ column }) => column === draft.column);
  if (request === undefined) return draft;
  return {
    ...draft,
    name: request.name || draft.name,
    unit: request.unit ?? draft.unit,
    factor: request.factor ?? draft.factor,
    offset: request.offset ?? draft.offset,
    ...(request.circuit === undefined ? {} : { circuit: request.circuit, ...BY_A_PERSON }),
  };
}
