import { z } from 'zod';
import type { DemoClient } from './demo-client.ts';

const jobs = z.object({ items: z.array(z.object({ id: z.string(), complaint: z.string() })) });

/** Makes, models, plates and complaints that do not exist; the captures are the simulated samples. */
const JOBS = [
  {
    complaint: 'Cranks, does not start. Started late for a week before.',
    vehicle: {
      make: 'Orvane',
      model: 'Kestle 1.6',
      year: 2011,
      engine: 'OK16, petrol, port injection',
      plate: 'QM 418 T',
      cylinders: 4,
    },
    codes: ['P0336'],
    files: ['crank-60-2-weak-tooth.csv'],
    entries: [
      { kind: 'reading', what: 'Battery at rest', value: 12.4, unit: 'V', text: '' },
      { kind: 'reading', what: 'Battery while cranking, lowest', value: 10.1, unit: 'V', text: '' },
      {
        kind: 'note',
        text: 'Spark comes and goes: 4 in 16 turns with the adjustable tester, grounded, injection off.',
      },
    ],
    outcome: null,
  },
  {
    complaint: 'Misfires when wet, long cranking.',
    vehicle: {
      make: 'Aldane',
      model: 'Sorrel 1.4',
      year: 2008,
      engine: 'AS14, petrol, port injection',
      plate: 'QM 077 B',
      cylinders: 4,
    },
    codes: ['P0351'],
    files: ['coil-primary-amperes.csv'],
    entries: [{ kind: 'reading', what: 'Coil feed, key on', value: 11.8, unit: 'V', text: 'Back-probed' }],
    outcome: {
      cause: 'Cracked coil housing, tracking to the bracket',
      part: 'Coil of cylinder 1 replaced',
      proof: 'No misfire in 10 minutes of water spray after; before it came within seconds.',
    },
  },
] as const;

/** Two jobs with invented vehicles, one open and one closed. What is there already is recognised by its complaint. */
export async function demoJobs(technician: DemoClient, ids: ReadonlyMap<string, string>): Promise<void> {
  const there = jobs.parse(await technician.call('GET', '/jobs?limit=100')).items;
  for (const { files, entries, outcome, ...job } of JOBS) {
    if (there.some((each) => each.complaint === job.complaint)) continue;
    const id = await technician.make('/jobs', job);
    for (const entry of entries) await technician.make(`/jobs/${id}/entries`, entry);
    for (const file of files) {
      const captureId = ids.get(file);
      if (captureId !== undefined) await technician.call('PATCH', `/captures/${captureId}`, { jobId: id });
    }
    if (outcome !== null) await technician.call('PATCH', `/jobs/${id}`, { state: 'closed', outcome });
  }
}
