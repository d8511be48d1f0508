import { eq } from 'drizzle-orm';
import { STARTER_KNOWN_GOODS, STARTER_PRACTICE, type StarterItem } from '../../../samples/starter/library.ts';
import type { Circuit } from '../../engine/circuit.ts';
import { db } from '../db/client.ts';
import { capture, knownGood } from '../db/schema.ts';
import type { DemoClient } from './demo-client.ts';

export interface Missing {
  readonly goods: readonly StarterItem[];
  readonly practice: readonly StarterItem[];
  /** Captures that an earlier run uploaded and did not come to keep, by title. */
  readonly uploaded: ReadonlyMap<string, string>;
}

/** What of the starting library is not there yet; one that somebody deleted or retired stays away. */
export async function missingStarters(workshopId: string): Promise<Missing> {
  const goods = await db()
    .select({ note: knownGood.note })
    .from(knownGood)
    .where(eq(knownGood.workshopId, workshopId));
  const captures = await db()
    .select({ id: capture.id, title: capture.title, deletedAt: capture.deletedAt })
    .from(capture)
    .where(eq(capture.workshopId, workshopId));
  const kept = new Set(goods.map(({ note }) => note));
  const titles = new Set(captures.map(({ title }) => title));
  return {
    goods: STARTER_KNOWN_GOODS.filter((item) => !kept.has(noteOf(item))),
    practice: STARTER_PRACTICE.filter(({ title }) => !titles.has(title)),
    uploaded: new Map(
      captures.filter(({ deletedAt }) => deletedAt === null).map(({ id, title }) => [title, id] as const),
    ),
  };
}

const noteOf = ({ title }: StarterItem) => `Simulated. ${title}.`;

const CIRCUITS: Readonly<Record<StarterItem['kind'], readonly Circuit[]>> = {
  'crank and cam': ['crank-vr', 'cam-hall'],
  coil: ['coil-primary-voltage', 'coil-primary-current'],
  injector: ['injector-voltage'],
  starter: ['starter-current', 'supply-voltage'],
};

function circuitsOf({ kind, engine }: StarterItem): readonly Circuit[] {
  if (kind === 'crank and cam' && engine.sensor === 'three-wire') return ['crank-hall', 'cam-hall'];
  return CIRCUITS[kind];
}

interface People {
  readonly instructor: DemoClient;
  readonly technician: DemoClient;
}

/**
 * Uploads each, keeps the sound ones as known-goods that another person publishes, and takes their captures away again: a
 * known-good outlives its capture, and the list of captures stays short. Returns how many were made.
 */
export async function starterWork({ goods, practice, uploaded }: Missing, people: People): Promise<number> {
  for (const item of practice) await upload(item, people.technician);
  for (const item of goods) {
    const captureId = uploaded.get(item.title) ?? (await upload(item, people.technician));
    await people.technician.untilReady(captureId);
    const { make, model, code, year, yearTo, cylinders } = item.engine;
    const id = await people.technician.make('/known-goods', {
      captureId,
      signals: circuitsOf(item).map((_, index) => index),
      engine: { make, model, code, year, yearTo, cylinders },
      condition: item.condition,
      note: noteOf(item),
      provenance:
        'Simulated by the product’s own generator, not recorded on a vehicle. For trying and teaching only.',
      instrument: 'none: computed',
      probe: 'none: computed',
      confirmed: 'The physics were given; nothing was measured on a part.',
    });
    await people.instructor.call('POST', `/known-goods/${id}/reviews`, {
      decision: 'publish',
      note: 'Simulated, and says so.',
    });
    await people.technician.call('DELETE', `/captures/${captureId}`);
  }
  return goods.length + practice.length;
}

const upload = (item: StarterItem, technician: DemoClient): Promise<string> =>
  technician.uploadText(item.csv(), `${item.engine.code}-${item.kind.replaceAll(' ', '-')}.csv`, {
    title: item.title,
    cylinders: String(item.engine.cylinders),
    signals: JSON.stringify(circuitsOf(item).map((circuit, place) => ({ column: place + 1, circuit }))),
  });
