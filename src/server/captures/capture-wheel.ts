import { eq } from 'drizzle-orm';
import type { WheelJson } from '../../contract/areas/captures.ts';
import type { CaptureRecord } from '../access.ts';
import { db } from '../db/client.ts';
import { measurement } from '../db/schema.ts';

/** The trigger wheel found in the capture, or null. */
export async function captureWheel(row: Pick<CaptureRecord, 'id'>): Promise<WheelJson> {
  const [found] = await db()
    .select({ wheel: measurement.wheel })
    .from(measurement)
    .where(eq(measurement.captureId, row.id));
  if (!found?.wheel) return null;
  const { marksS, teethS, teethDeg, toothHeights, toothAnglesDeg, ...wheel } = found.wheel;
  return {
    ...wheel,
    marksS: [...marksS],
    teethS: [...teethS],
    teethDeg: [...teethDeg],
    toothHeights: toothHeights && [...toothHeights],
    toothAnglesDeg: [...toothAnglesDeg],
  };
}
