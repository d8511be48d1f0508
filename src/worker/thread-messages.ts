import type { CaptureFindings } from '../engine/capture.ts';
import type { PreviewLine, ReadFailure, Reading, ReadingHints } from '../engine/reading/types.ts';
import type { captureSignal, DerivedRequest, SignalRequest, StoredAxis } from '../server/db/schema.ts';

export type SignalDraft = Omit<typeof captureSignal.$inferSelect, 'captureId'>;

/** What a thread is to do with one capture. Plain data: it crosses to the thread by copy. */
export interface ThreadTask {
  readonly kind: 'read' | 'measure';
  readonly captureId: string;
  readonly originalKey: string;
  readonly bytes: number;
  readonly fileName: string;
  /** Compute it while reading, as it could not be had while the file came in. */
  readonly needsSha256: boolean;
  /** Where samples are written (read) or lie (measure). */
  readonly samplesVersion: number;
  readonly hints: ReadingHints;
  readonly signalRequests: readonly SignalRequest[];
  readonly cylinders: number | null;
  /** For `read`: what is to be made from the recorded signals. */
  readonly derived: readonly DerivedRequest[];
  /** For `measure`: the axis and signals as stored. */
  readonly axis: StoredAxis | null;
  readonly signals: readonly SignalDraft[];
  /** Unpacked text may have this many bytes. */
  readonly unpackedLimitBytes: number;
}

export type ThreadMessage =
  | { readonly type: 'progress'; readonly phase: 'reading' | 'measuring'; readonly part: number }
  | {
      readonly type: 'read';
      readonly reading: Reading;
      readonly preview: readonly PreviewLine[];
      readonly axis: StoredAxis;
      readonly samples: number;
      readonly signals: readonly SignalDraft[];
      readonly sha256: string | null;
    }
  | {
      readonly type: 'measured';
      readonly findings: CaptureFindings;
      readonly signals: readonly SignalDraft[];
    }
  | { readonly type: 'unreadable'; readonly failure: ReadFailure; readonly sha256: string | null }
  /** The task is over; the thread waits for another. */
  | { readonly type: 'done' }
  /** The store is away: try again later, nothing is wrong with the file. */
  | { readonly type: 'away'; readonly message: string };
