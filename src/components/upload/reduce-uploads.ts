import type { FileToSend, UploadAction, UploadItem } from './types.ts';

const fresh = ({ file, key, title, cylinders, jobId }: FileToSend & { key: string }): UploadItem => ({
  key,
  file,
  title: title ?? null,
  cylinders: cylinders ?? null,
  jobId: jobId ?? null,
  phase: file.size === 0 ? 'refused' : 'waiting',
  sentBytes: 0,
  captureId: null,
  happened: file.size === 0 ? 'The file is empty.' : null,
  todo: file.size === 0 ? 'Save the recording again as CSV, with all samples.' : null,
  since: null,
});

/** Next list of files on their way. Bytes sent never count backwards below zero or past the file. */
export function reduceUploads(items: readonly UploadItem[], action: UploadAction): readonly UploadItem[] {
  if (action.type === 'add') return [...items, ...action.files.map(fresh)];
  if (action.type === 'remove') return items.filter((item) => item.key !== action.key);
  return items.map((item) => (item.key === action.key ? changed(item, action) : item));
}

function changed(item: UploadItem, action: Exclude<UploadAction, { type: 'add' | 'remove' }>): UploadItem {
  switch (action.type) {
    case 'start':
      return { ...item, phase: 'sending', happened: null, todo: null, since: null };
    case 'sent':
      return { ...item, sentBytes: Math.min(item.file.size, Math.max(0, action.bytes)) };
    case 'received':
      return {
        ...item,
        phase: 'received',
        sentBytes: item.file.size,
        captureId: action.captureId,
        happened: null,
      };
    case 'paused':
      return { ...item, phase: 'paused', happened: action.happened, since: action.since };
    case 'refused':
      return { ...item, phase: 'refused', happened: action.happened, todo: action.todo };
  }
}
