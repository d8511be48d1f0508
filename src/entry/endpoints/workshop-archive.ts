import { mkdtemp, rm } from 'node:fs/promises';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { pipeline } from 'node:stream/promises';
import { config } from '../../server/config.ts';
import { importWorkshop } from '../../server/workshop/archive/import-workshop.ts';
import { writeArchive } from '../../server/workshop/archive/write-archive.ts';
import { auditedBy, recordAudit } from '../../server/workshop/audit.ts';
import { attachment } from '../attachment.ts';
import { call } from '../call.ts';
import { receiveToDisk } from '../multipart/receive-to-disk.ts';
import { send } from '../send.ts';
import type { FrontRequest } from '../types.ts';

/** GET /workshop/export: the whole workshop as a zip, streamed. */
export async function exportWorkshopEndpoint(front: FrontRequest): Promise<void> {
  const caller = await call(front, 'workshop.export');
  const archive = await writeArchive(caller.workshopId);
  const entry = { ...auditedBy(caller, caller.workshopId, front.address), subject: '' };
  await recordAudit({ ...entry, action: 'workshop exported' });
  front.response.writeHead(200, {
    'Content-Type': 'application/zip',
    'Content-Disposition': attachment(`workshop-${new Date().toISOString().slice(0, 10)}.zip`),
    'Cache-Control': 'private, no-store',
    'Content-Security-Policy': "sandbox; default-src 'none'",
  });
  // A part that cannot be had breaks the stream off: a zip without its end is no zip, and nobody takes it for whole.
  await pipeline(archive, front.response).catch(() => front.response.destroy());
}

/** POST /workshops/import: a new workshop from such a zip. */
export async function importWorkshopEndpoint(front: FrontRequest): Promise<void> {
  const caller = await call(front, 'workshop.import');
  const folder = await mkdtemp(join(tmpdir(), 'gapmark-import-'));
  try {
    const path = join(folder, 'archive.zip');
    await receiveToDisk(front.request, path, config().uploadLimitBytes);
    const made = await importWorkshop(caller, path, front.address);
    send(front.response, {
      status: 201,
      headers: { 'Content-Type': 'application/json; charset=utf-8', 'Cache-Control': 'no-store' },
      body: JSON.stringify(made),
    });
  } finally {
    await rm(folder, { recursive: true, force: true });
  }
}
