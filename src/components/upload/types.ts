/** One file on its way. After `received` the capture's own state says how far it is. */
export interface UploadItem {
  readonly key: string;
  readonly file: File;
  readonly title: string | null;
  readonly cylinders: number | null;
  /** The job that the capture will belong to. */
  readonly jobId: string | null;
  readonly phase: 'waiting' | 'sending' | 'paused' | 'received' | 'refused';
  readonly sentBytes: number;
  /** Set with `received`. */
  readonly captureId: string | null;
  /** Why it pauses or was refused, in words. */
  readonly happened: string | null;
  readonly todo: string | null;
  /** When it began to pause, ISO. */
  readonly since: string | null;
}

export interface FileToSend {
  readonly file: File;
  readonly title?: string;
  readonly cylinders?: number;
  readonly jobId?: string;
}

export type UploadAction =
  | { readonly type: 'add'; readonly files: readonly (FileToSend & { readonly key: string })[] }
  | { readonly type: 'sent'; readonly key: string; readonly bytes: number }
  | { readonly type: 'received'; readonly key: string; readonly captureId: string }
  | { readonly type: 'paused'; readonly key: string; readonly happened: string; readonly since: string }
  | { readonly type: 'refused'; readonly key: string; readonly happened: string; readonly todo: string }
  | { readonly type: 'start'; readonly key: string }
  | { readonly type: 'remove'; readonly key: string };
