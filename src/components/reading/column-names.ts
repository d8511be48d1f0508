import type { z } from 'zod';
import type { CaptureJson, preview } from '../../contract/areas/captures.ts';

type Line = z.infer<typeof preview>['lines'][number];

/** Names of the file's columns from the line of names, else from the signals; '' where a column has none. */
export function columnNamesOf(lines: readonly Line[], signals: CaptureJson['signals']): string[] {
  const rows = lines.filter((line) => line.role === 'numbers' || line.role === 'names');
  const count = Math.max(
    0,
    ...rows.map((line) => line.cells.length),
    ...signals.map((signal) => signal.column + 1),
  );
  const names = lines.find((line) => line.role === 'names')?.cells ?? [];
  const bySignal = new Map(signals.map((signal) => [signal.column, signal.name]));
  return Array.from({ length: count }, (_, column) => bySignal.get(column) ?? names[column]?.trim() ?? '');
}
