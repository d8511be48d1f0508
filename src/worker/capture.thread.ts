import { parentPort } from 'node:worker_threads';
import type { CaptureInput, SignalInput, TimeAxis } from '../engine/capture.ts';
import { measureCapture } from '../engine/measure.ts';
import { readTable } from '../engine/reading/read.ts';
import { ApiError } from '../server/errors.ts';
import { isStoreAway } from '../server/storage/away.ts';
import { loadAxis, loadSamples } from '../server/storage/load-samples.ts';
import { writeSamples, writeTimes } from '../server/storage/write-samples.ts';
import { deriveSignals } from './derive-signals.ts';
import { draftSignals, requested } from './draft-signals.ts';
import { storedAxis } from './stored-axis.ts';
import type { SignalDraft, ThreadMessage, ThreadTask } from './thread-messages.ts';
import { BadArchive } from './unpack/bad-archive.ts';
import { hashOf, openOriginal } from './unpack/open-original.ts';

/**
 * Reads or measures one capture in a thread of its own, so that the worker stays answerable and can end it at any moment.
 * It talks to the store only; what it finds goes to the worker as messages, which writes it down.
 */
const tell = (message: ThreadMessage) => parentPort?.postMessage(message);

/** How much of the reading phase the reading itself is; the rest is writing samples. */
const READING_PART = 0.85;

async function run(task: ThreadTask): Promise<void> {
  const input = task.kind === 'read' ? await read(task) : await load(task);
  if (input === null) return;
  tell({ type: 'progress', phase: 'measuring', part: 0.1 });
  const { drafts, ...capture } = input;
  tell({ type: 'measured', findings: measureCapture(capture), signals: drafts });
}

type Loaded = CaptureInput & { readonly drafts: readonly SignalDraft[] };

async function read(task: ThreadTask): Promise<Loaded | null> {
  const { captureId, originalKey, bytes, samplesVersion, needsSha256, unpackedLimitBytes } = task;
  const original = await openOriginal(originalKey, bytes, { needsSha256, unpackedLimitBytes });
  const table = await readTable(original.text, {
    hints: task.hints,
    onProgress: (taken) => {
      // Of a packed file the length is not known beforehand: ten to one is usual for text.
      const part = Math.min(1, taken / Math.max(1, original.packed ? bytes * 10 : bytes));
      tell({ type: 'progress', phase: 'reading', part: part * READING_PART });
    },
  });
  const sha256 = await original.sha256();
  if (!table.ok) {
    tell({ type: 'unreadable', failure: table, sha256 });
    return null;
  }
  const { axis, columns, reading, preview } = table;
  const recorded = draftSignals(columns, axis, task.signalRequests);
  const { made, drafts } = deriveSignals(task, axis, recorded, columns);
  await writeTimes(captureId, samplesVersion, axis);
  const all = [...columns.map(({ samples }) => samples), ...made];
  for (const [index, samples] of all.entries()) {
    await writeSamples(captureId, samplesVersion, index, samples);
    const part = READING_PART + ((1 - READING_PART) * (index + 1)) / all.length;
    tell({ type: 'progress', phase: 'reading', part });
  }
  const stored = storedAxis(axis);
  tell({ type: 'read', reading, preview, axis: stored, samples: stored.count, signals: drafts, sha256 });
  const signals = drafts.map((draft) => signalInput(draft, all[draft.index]!));
  return { axis, signals, cylinders: task.cylinders, drafts };
}

async function load(task: ThreadTask): Promise<Loaded> {
  const row = { id: task.captureId, samplesVersion: task.samplesVersion, axis: task.axis };
  const drafts = task.signals.map((draft) => requested(draft, task.signalRequests));
  const axis: TimeAxis = await loadAxis(row);
  const signals: SignalInput[] = [];
  for (const draft of drafts) signals.push(signalInput(draft, await loadSamples(row, draft.index)));
  return { axis, signals, cylinders: task.cylinders, drafts };
}

function signalInput(draft: SignalDraft, samples: Float32Array): SignalInput {
  const { index, name, circuit, unit, factor, offset, rail } = draft;
  return { index, name, circuit, unit, factor, offset, samples, ...(rail === null ? {} : { rail }) };
}

/** Faults that are not the file's and not the store's end the thread: the worker counts the attempt as failed. */
async function take(task: ThreadTask): Promise<void> {
  try {
    await run(task);
  } catch (error) {
    if (error instanceof BadArchive) {
      const sha256 = await hashOf(task.originalKey, task.needsSha256);
      tell({ type: 'unreadable', failure: error.toFailure(), sha256 });
    } else if (isStoreAway(error) || (error instanceof ApiError && error.code === 'service_away'))
      tell({ type: 'away', message: error instanceof Error ? error.message : String(error) });
    else throw error;
  }
  tell({ type: 'done' });
}

parentPort?.on('message', (task: ThreadTask) => void take(task));
