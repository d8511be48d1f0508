import { join } from 'node:path';
import { z } from 'zod';
import { measurements, wheel } from '../../contract/areas/captures.ts';
import type { DemoClient } from './demo-client.ts';
import { demoJobs } from './demo-jobs.ts';
import { demoTeaching } from './demo-teaching.ts';

interface DemoWork {
  readonly technician: DemoClient;
  readonly instructor: DemoClient;
  readonly samples: readonly {
    readonly file: string;
    readonly title: string;
    readonly text: string;
    readonly cylinders: number;
  }[];
  readonly folder: string;
}

/** A make and models that do not exist. */
const ENGINE = { make: 'Orvane', model: 'Kestle 1.6', code: 'OK16', year: 2011, cylinders: 4 };
const PROVENANCE = 'Simulated by the sample program, not recorded on a vehicle. For trying the product only.';

/** Samples that are sound, with the condition they stand for. */
const GOOD: Readonly<Record<string, 'cranking' | 'idle'>> = {
  'crank-60-2-with-cam.csv': 'cranking',
  'crank-36-2-three-wire.csv': 'cranking',
  'coil-primary-burn.csv': 'cranking',
  'coil-primary-amperes.csv': 'cranking',
  'injector-pulses.csv': 'cranking',
};

const goods = z.object({
  items: z.array(z.object({ id: z.string(), captureId: z.string().nullable(), state: z.string() })),
});
const marks = z.object({ items: z.array(z.object({ id: z.string() })) });

/** What the demo's people did: uploads, known-goods proposed by one and published by another, a mark on what is wrong. */
export async function demoWork({ technician, instructor, samples, folder }: DemoWork): Promise<void> {
  const there = new Map((await technician.captures()).map((capture) => [capture.title, capture.id]));
  const ids = new Map<string, string>();
  // Last first, so that the list, newest on top, opens with what a beginner reads first.
  for (const sample of [...samples].reverse()) {
    const id =
      there.get(sample.title) ??
      (await technician.upload(join(folder, sample.file), sample.title, sample.cylinders));
    ids.set(sample.file, id);
  }
  for (const id of ids.values()) await technician.untilReady(id);
  const kept = goods.parse(await technician.call('GET', '/known-goods?limit=100')).items;
  for (const [file, condition] of Object.entries(GOOD)) {
    const captureId = ids.get(file);
    if (captureId === undefined) continue;
    const already = kept.find((good) => good.captureId === captureId);
    const id = already?.id ?? (await keep(technician, captureId, condition));
    if ((already?.state ?? 'proposed') === 'proposed')
      await instructor.call('POST', `/known-goods/${id}/reviews`, {
        decision: 'publish',
        note: 'Regular, levels reach, no notice.',
      });
  }
  const weak = ids.get('crank-60-2-weak-tooth.csv');
  if (weak !== undefined) await markWeakTooth(technician, weak);
  await demoTeaching(instructor, ids);
  await demoJobs(technician, ids);
}

async function keep(technician: DemoClient, captureId: string, condition: string): Promise<string> {
  const { signals } = measurements.parse(await technician.call('GET', `/captures/${captureId}/measurements`));
  return technician.make('/known-goods', {
    captureId,
    signals: signals.map((signal) => signal.index),
    engine: ENGINE,
    condition,
    note: 'Simulated sample',
    provenance: PROVENANCE,
  });
}

/** The mark goes where the engine found the tooth; nothing is marked when it found none. */
async function markWeakTooth(technician: DemoClient, captureId: string): Promise<void> {
  if (marks.parse(await technician.call('GET', `/captures/${captureId}/marks`)).items.length > 0) return;
  const found = wheel.parse(await technician.call('GET', `/captures/${captureId}/wheel`));
  const second = found?.marksS[1];
  if (!found || second === undefined) return;
  const place = found.teethS.findIndex((time) => time >= second) + 22;
  const time = found.teethS[place];
  if (time === undefined) return;
  await technician.make(`/captures/${captureId}/marks`, {
    kind: 'point',
    signal: found.signal,
    from: time,
    to: null,
    value: 0,
    text: 'Tooth 23 short, every turn. Chip or dirt? Look before changing the sensor.',
  });
}
