import { and, asc, desc, eq, inArray, isNull } from 'drizzle-orm';
import { significant, withUnit } from '../../../engine/drawing/format.ts';
import type { CaptureRecord, JobRecord } from '../../access.ts';
import { captureMeasurements } from '../../captures/capture-measurements.ts';
import { db } from '../../db/client.ts';
import { capture, comparison, jobEntry, person, workshop } from '../../db/schema.ts';
import { nameOf } from '../create-job.ts';
import { nextOfJob } from '../path/next-of-job.ts';
import { listPhotos } from '../photos/list-photos.ts';
import type { Block, Report, Section } from './blocks.ts';
import { CAUTIONS, DISCLAIMER } from './cautions.ts';
import { checksSection } from './checks-section.ts';
import { traceFigure } from './trace-figure.ts';
import { whenText } from './when.ts';

export type Reader = 'customer' | 'colleague';

/** What a report holds at most, so that it stays two to three pages. */
const MOST = { figures: 3, photos: { customer: 4, colleague: 8 }, values: 14, comparisonRows: 10 } as const;

/** A job as a report: complaint, vehicle, what was read and seen in order, cause and proof, cautions. */
export async function reportContent(row: JobRecord, reader: Reader): Promise<Report> {
  const [[shop], entries, photos, captures, names, path] = await Promise.all([
    db().select().from(workshop).where(eq(workshop.id, row.workshopId)),
    db()
      .select()
      .from(jobEntry)
      .where(and(eq(jobEntry.jobId, row.id), isNull(jobEntry.deletedAt)))
      .orderBy(asc(jobEntry.createdAt), asc(jobEntry.id)),
    listPhotos(row.id),
    db()
      .select()
      .from(capture)
      .where(and(eq(capture.jobId, row.id), isNull(capture.deletedAt), eq(capture.practice, false)))
      .orderBy(asc(capture.createdAt), asc(capture.id))
      .limit(50),
    nameOfPeople([row.assigneeId, row.closedBy, row.createdBy]),
    nextOfJob(row),
  ]);
  const timeZone = shop?.timeZone ?? 'Etc/UTC';
  const when = (at: Date) => whenText(at, timeZone);
  const readings = entries.filter((entry) => entry.kind === 'reading');
  const notes = entries.filter((entry) => entry.kind === 'note');
  const colleague = reader === 'colleague';
  const figures: Section[] = [];
  for (const each of captures.slice(0, colleague ? MOST.figures : 1)) {
    const section = await captureSection(each, figures.length + 1, colleague);
    if (section !== null) figures.push(section);
  }
  const shownPhotos = photos.slice(0, MOST.photos[reader]);
  const sections: (Section | null)[] = [
    outcomeSection(row, names, colleague),
    checksSection(path, colleague, when),
    readings.length === 0
      ? null
      : {
          heading: 'What was read, in order',
          blocks: [
            {
              kind: 'table',
              columns: [
                { title: 'Reading', share: 0.34 },
                { title: 'Value', share: 0.18, number: true },
                { title: 'How', share: 0.3 },
                { title: 'When', share: 0.18 },
              ],
              rows: readings.map((entry) => [
                entry.what ?? '',
                entry.value === null ? '' : `${entry.value} ${entry.unit ?? ''}`.trim(),
                entry.text,
                when(entry.createdAt),
              ]),
            },
          ],
        },
    ...figures,
    colleague && notes.length > 0
      ? {
          heading: 'Notes',
          blocks: [
            {
              kind: 'list',
              items: notes.map((note) => `${when(note.createdAt)}, ${note.author}: ${note.text}`),
            },
          ],
        }
      : null,
    shownPhotos.length === 0
      ? null
      : {
          heading: 'Photos',
          blocks: shownPhotos.map(
            ({ id, caption, width, height }): Block => ({ kind: 'photo', id, caption, width, height }),
          ),
        },
    {
      heading: 'Cautions',
      blocks: [
        { kind: 'list', items: CAUTIONS },
        { kind: 'text', text: DISCLAIMER },
      ],
    },
  ];
  const vehicle = [[row.make, row.model].filter(Boolean).join(' '), row.year ?? '']
    .filter(Boolean)
    .join(', ');
  const facts: [string, string][] = [
    ['Complaint', row.complaint],
    ['Vehicle', vehicle || 'not named'],
    [
      'Engine',
      [row.engine, row.cylinders === null ? '' : `${row.cylinders} cylinders`].filter(Boolean).join(', '),
    ],
    ['Plate', row.plate],
    ['VIN', row.vin],
    [
      'Trouble codes',
      path.codes.map(({ code, title }) => (title === null ? code : `${code} ${title}`)).join('; '),
    ],
    ['In', when(row.createdAt)],
    ['Closed', row.closedAt === null ? 'still open' : when(row.closedAt)],
    ['Technician', names.get(row.assigneeId ?? '') ?? ''],
  ];
  return {
    kicker: `Report on a diagnosis, job ${nameOf(row)}${colleague ? ', for a colleague' : ''}`,
    title: row.outcome?.cause || row.complaint,
    workshop: shop?.name ?? '',
    facts: facts.filter(([, value]) => value !== ''),
    sections: sections.filter((section) => section !== null),
    foot: DISCLAIMER,
    asOf: latest([
      row.updatedAt,
      ...entries.map((entry) => entry.updatedAt),
      ...photos.map((photo) => photo.createdAt),
      ...captures.map((each) => each.updatedAt),
      ...path.steps.flatMap(({ record }) => (record === null ? [] : [new Date(record.at)])),
    ]),
  };
}

async function nameOfPeople(ids: readonly (string | null)[]): Promise<ReadonlyMap<string, string>> {
  const known = [...new Set(ids)].filter((id) => id !== null);
  const people = await db()
    .select({ id: person.id, name: person.name })
    .from(person)
    .where(inArray(person.id, known));
  return new Map(people.map(({ id, name }) => [id, name]));
}

const latest = (dates: readonly Date[]): Date => new Date(Math.max(...dates.map((date) => date.getTime())));

function outcomeSection(row: JobRecord, names: ReadonlyMap<string, string>, colleague: boolean): Section {
  const { outcome } = row;
  if (outcome === null)
    return {
      heading: 'Outcome',
      blocks: [{ kind: 'text', text: 'Nothing is decided yet. The work goes on.' }],
    };
  const by = row.closedBy === null ? '' : ` Entered by ${names.get(row.closedBy) ?? 'a former member'}.`;
  const parts: [string, string][] = [
    [colleague ? 'Cause' : 'What was wrong', outcome.cause],
    [colleague ? 'Part or repair' : 'What was done', outcome.part],
    [colleague ? 'Proof' : 'How it was shown', outcome.proof],
    ['Note', outcome.note],
  ];
  const blocks = parts
    .filter(([, text]) => text !== '')
    .map(
      ([label, text]): Block => ({
        kind: 'text',
        text: `${label}: ${text}`,
        ...(label === parts[0]?.[0] ? { weight: 'strong' as const } : {}),
      }),
    );
  return {
    heading: colleague ? 'Cause and proof' : 'What was found',
    blocks: by === '' ? blocks : [...blocks, { kind: 'text', text: by.trim(), weight: 'soft' }],
  };
}

async function captureSection(
  row: CaptureRecord,
  number: number,
  colleague: boolean,
): Promise<Section | null> {
  const figure = await traceFigure(row, number);
  if (figure === null) return null;
  const blocks: Block[] = [{ kind: 'trace', figure }];
  if (colleague) {
    const { signals, relations } = await captureMeasurements(row);
    const values = [...signals, ...relations].flatMap((findings) => findings.values);
    const rows = values
      .filter((value) => typeof value.value === 'number')
      .slice(0, MOST.values)
      .map((value) => [
        words(value.key),
        withUnit(significant(Number(value.value)), value.unit),
        value.n === undefined ? '' : String(value.n),
        typeof value.min !== 'number' || typeof value.max !== 'number'
          ? ''
          : `${significant(value.min)} to ${significant(value.max)}`,
      ]);
    if (rows.length > 0) {
      blocks.push({
        kind: 'table',
        columns: [
          { title: 'Quantity', share: 0.4 },
          { title: 'Value', share: 0.22, number: true },
          { title: 'n', share: 0.1, number: true },
          { title: 'Lowest to highest', share: 0.28, number: true },
        ],
        rows,
      });
    }
    blocks.push(...(await comparisonBlocks(row.id)));
  }
  const { signals, relations } = await captureMeasurements(row);
  const notices = [...signals, ...relations].flatMap((findings) => findings.notices);
  const told = notices.filter((notice) => notice.severity !== 'info').slice(0, 4);
  if (told.length > 0) blocks.push({ kind: 'list', items: told.map((notice) => notice.text) });
  return { heading: figure.title, blocks };
}

/** The newest comparison of a capture that came to an end. */
async function comparisonBlocks(captureId: string): Promise<Block[]> {
  const [found] = await db()
    .select({ result: comparison.result })
    .from(comparison)
    .where(and(eq(comparison.captureId, captureId), eq(comparison.status, 'ready')))
    .orderBy(desc(comparison.createdAt), desc(comparison.id))
    .limit(1);
  const result = found?.result;
  if (!result?.rows || result.rows.length === 0) return [];
  const number = (value: unknown) =>
    typeof value === 'number' ? significant(value) : String(value ?? 'none');
  return [
    {
      kind: 'text',
      text: `Compared with ${result.other?.title ?? 'a reference'}. ${result.text ?? ''}`.trim(),
    },
    {
      kind: 'table',
      columns: [
        { title: 'Quantity', share: 0.34 },
        { title: 'Here', share: 0.18, number: true },
        { title: 'Reference', share: 0.18, number: true },
        { title: 'Verdict', share: 0.3 },
      ],
      rows: result.rows
        .slice(0, MOST.comparisonRows)
        .map((each) => [words(each.key), number(each.here), number(each.reference), each.verdict]),
    },
  ];
}

/** A key in its own words: rpm_mean is "Rpm mean". */
function words(key: string): string {
  const plain = key.replaceAll('_', ' ');
  return plain.charAt(0).toUpperCase() + plain.slice(1);
}
