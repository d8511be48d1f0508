import type { z } from 'zod';
import type { preview } from '../../contract/areas/captures.ts';
import type { CaptureRecord } from '../access.ts';

/** The first lines of the file as they were understood; none before it was read. */
export function capturePreview(row: CaptureRecord): z.input<typeof preview> {
  return { lines: (row.preview ?? []).map((line) => ({ ...line, cells: [...line.cells] })) };
}
