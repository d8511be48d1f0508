import { asc, eq } from 'drizzle-orm';
import type { CaptureRecord } from '../server/access.ts';
import { type Begun, beginWork, versionFor } from '../server/captures/work/begin-work.ts';
import { commitFailed } from '../server/captures/work/commit-failed.ts';
import { commitMeasured } from '../server/captures/work/commit-measured.ts';
import { commitRead } from '../server/captures/work/commit-read.ts';
import { endJob } from '../server/captures/work/end-job.ts';
import { noteProgress } from '../server/captures/work/note-progress.ts';
import { config } from '../server/config.ts';
import { db } from '../server/db/client.ts';
import { captureSignal } from '../server/db/schema.ts';
import { ApiError } from '../server/errors.ts';
import { readJob } from '../server/queue/names.ts';
import type { TakenJob } from '../server/queue/take-job.ts';
import { runThread, ThreadFault } from './run-thread.ts';
import type { ThreadMessage, ThreadTask } from './thread-messages.ts';

/** Progress is written this seldom. */
const PROGRESS_MS = 300;

/** Reads or measures one capture from beginning to end. Throws when the attempt must be given back or counted as failed. */
export async function workOnCapture(job: TakenJob, signal: AbortSignal): Promise<void> {
  const begun = await beginWork(readJob.parse(job.data));
  if (begun === null) return endJob(job);
  const { row, kind } = begun;
  const samplesVersion =
    kind === 'measure'
      ? row.samplesVersion
      : Math.max(versionFor(row.revision, job.takes), row.samplesVersion + 1);
  const at = { id: row.id, revision: row.revision, samplesVersion };
  let noted = 0;
  const onMessage = async (message: ThreadMessage): Promise<void> => {
    switch (message.type) {
      case 'progress': {
        if (Date.now() - noted < PROGRESS_MS) return;
        noted = Date.now();
        return noteProgress(at, message.phase, message.part);
      }
      case 'read':
        return commitRead(job, at, samplesVersion, message);
      case 'measured':
        return commitMeasured(job, at, message, false);
      case 'unreadable': {
        const { code, message: words, hint, line, preview } = message.failure;
        return commitFailed(job, at, {
          error: { code, message: words, hint, line },
          preview,
          sha256: message.sha256,
        });
      }
      case 'done':
        return;
      case 'away':
        throw new ApiError('service_away', { cause: new Error(message.message) });
    }
  };
  try {
    await runThread(await taskFor(begun, samplesVersion), signal, onMessage);
  } catch (error) {
    if (!(error instanceof ThreadFault) || !error.outOfMemory) throw error;
    await commitFailed(job, at, { error: TOO_BIG, sha256: null });
  }
}

const TOO_BIG = {
  code: 'too_large',
  message: 'This file needs more memory to read than the server has. The file is kept.',
  hint: 'Export a shorter stretch or fewer channels and upload that.',
};

/** What the thread gets; also for measuring again in the background. */
export async function taskFor({ row, kind }: Begun, samplesVersion: number): Promise<ThreadTask> {
  return {
    kind,
    captureId: row.id,
    originalKey: row.originalKey,
    bytes: row.bytes,
    fileName: row.fileName,
    needsSha256: row.sha256 === '',
    samplesVersion,
    hints: row.hints,
    signalRequests: row.signalRequests,
    cylinders: row.cylinders,
    derived: row.derived,
    axis: row.axis,
    signals: kind === 'measure' ? await storedSignals(row) : [],
    unpackedLimitBytes: config().uploadLimitBytes * 2,
  };
}

async function storedSignals(row: CaptureRecord) {
  const rows = await db()
    .select()
    .from(captureSignal)
    .where(eq(captureSignal.captureId, row.id))
    .orderBy(asc(captureSignal.index));
  return rows.map(({ captureId: _, ...signal }) => signal);
}
