import type { Upload } from 'tus-js-client';
import { isPassing, refusal } from './refusal.ts';

export interface SendEvents {
  onSent: (bytes: number) => void;
  onReceived: (captureId: string) => void;
  /** The line was lost and trying again did not help for now; what was sent stays on the server. */
  onPaused: (happened: string) => void;
  onRefused: (words: { happened: string; todo: string }) => void;
}

export interface Sending {
  /** Stops without losing what was sent. */
  pause: () => Promise<void>;
  /** Stops and lets the server throw the part away. */
  giveUp: () => Promise<void>;
}

interface SendRequest {
  readonly file: File;
  readonly title: string | null;
  readonly cylinders: number | null;
  readonly note?: string;
  readonly jobId?: string | null;
}

const RETRY_MS = [0, 1_000, 3_000, 6_000, 12_000];

/**
 * Sends one file over the resumable protocol (tus 1.0), going on where an earlier try of the same file stopped.
 * The client is loaded only now: nobody who only looks pays for it.
 */
export async function sendFile(request: SendRequest, events: SendEvents): Promise<Sending> {
  const tus = await import('tus-js-client');
  let captureId: string | null = null;
  const metadata: Record<string, string> = { filename: request.file.name };
  if (request.title !== null) metadata.title = request.title;
  if (request.cylinders !== null) metadata.cylinders = String(request.cylinders);
  if (request.note) metadata.note = request.note;
  if (request.jobId) metadata.jobId = request.jobId;
  const upload: Upload = new tus.Upload(request.file, {
    endpoint: '/api/v1/uploads',
    metadata,
    retryDelays: RETRY_MS,
    removeFingerprintOnSuccess: true,
    onProgress: events.onSent,
    onShouldRetry: (error) => navigator.onLine && isPassing(error.originalResponse?.getStatus() ?? 0),
    // Every answer about a finished upload names its capture, the repeated last one too.
    onAfterResponse: (_, response) => {
      captureId = response.getHeader('Gapmark-Capture') ?? captureId;
    },
    onSuccess: () => {
      if (captureId !== null) events.onReceived(captureId);
      else
        events.onRefused({
          happened: 'The file arrived, but the server did not say which capture it became.',
          todo: 'Reload this page: the capture is in the list.',
        });
    },
    onError: (error) => {
      const response = error instanceof tus.DetailedError ? error.originalResponse : null;
      const status = response?.getStatus() ?? 0;
      if (status === 0) events.onPaused('No connection.');
      else if (isPassing(status)) events.onPaused(refusal(status, response?.getBody() ?? '').happened);
      else events.onRefused(refusal(status, response?.getBody() ?? ''));
    },
  });
  const [earlier] = await upload.findPreviousUploads();
  if (earlier !== undefined) upload.resumeFromPreviousUpload(earlier);
  upload.start();
  return { pause: () => upload.abort(), giveUp: () => upload.abort(true) };
}
