import { Metadata } from '@tus/server';
import { fieldsOf } from '../../server/captures/uploads/finish-upload.ts';
import { config } from '../../server/config.ts';
import { ApiError } from '../../server/errors.ts';

const METADATA_LIMIT = 8 * 1024;

/** Length and metadata of an upload that is to begin, checked before anything is made. */
export function checkCreation(header: (name: string) => string | undefined) {
  const length = lengthOf(header('upload-length'), header('upload-defer-length'));
  const text = header('upload-metadata') ?? '';
  if (Buffer.byteLength(text) > METADATA_LIMIT) {
    throw new ApiError('invalid', {
      details: [{ path: 'Upload-Metadata', message: 'is longer than 8 KiB' }],
    });
  }
  const metadata = parse(text);
  return { length, metadata, fields: fieldsOf(metadata) };
}

function lengthOf(text: string | undefined, deferred: string | undefined): number {
  if (deferred !== undefined || text === undefined || !/^\d{1,15}$/.test(text)) {
    throw new ApiError('invalid', {
      details: [{ path: 'Upload-Length', message: 'is needed when the upload begins: the number of bytes' }],
    });
  }
  const length = Number(text);
  if (length === 0) throw new ApiError('empty_file');
  if (length > config().uploadLimitBytes) {
    const mib = Math.floor(config().uploadLimitBytes / 1024 ** 2);
    throw new ApiError('too_large', {
      message: `The file is larger than the ${mib} MiB that this server takes. Nothing was kept.`,
      hint: 'Export a shorter stretch or fewer channels, or pack the file as .gz or .zip.',
    });
  }
  return length;
}

function parse(text: string): Record<string, string | null> {
  if (text.trim() === '') return {};
  try {
    return Metadata.parse(text);
  } catch {
    throw new ApiError('invalid', {
      details: [{ path: 'Upload-Metadata', message: 'is not a list of keys and base64 values' }],
    });
  }
}
