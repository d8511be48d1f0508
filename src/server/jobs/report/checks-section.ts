import type { NextJson } from '../../../contract/areas/path.ts';
import { significant, withUnit } from '../../../engine/drawing/format.ts';
import { CHECKS, isCheckId } from '../path/data/checks.ts';
import type { Expected, Source } from '../path/types.ts';
import type { Block, Section } from './blocks.ts';

type Step = NextJson['steps'][number];

const SOURCE: Readonly<Record<Source['kind'], string>> = {
  published: 'source',
  arithmetic: 'arithmetic',
  practice: 'common practice, no source',
  memory: 'from memory',
  maker: 'the maker’s figure decides',
};

/** What was checked, in the order in which it was taken; null when nothing was. For a colleague with limits and their sources. */
export function checksSection(
  { steps, contradictions }: NextJson,
  colleague: boolean,
  when: (at: Date) => string,
): Section | null {
  if (steps.length === 0) return null;
  const rows = steps.map((step) => {
    const found = `${step.result}${step.says === '' ? '' : `: ${step.says}`}`;
    if (!colleague) return [step.title, found];
    return [step.title, found, readingsOf(step), whenOf(step, when)];
  });
  const blocks: Block[] = [
    {
      kind: 'table',
      columns: colleague
        ? [
            { title: 'Check', share: 0.24 },
            { title: 'Found', share: 0.26 },
            { title: 'Readings and limits', share: 0.34 },
            { title: 'When', share: 0.16 },
          ]
        : [
            { title: 'Check', share: 0.45 },
            { title: 'Found', share: 0.55 },
          ],
      rows,
    },
  ];
  if (colleague && contradictions.length > 0)
    blocks.push({ kind: 'list', items: contradictions.map(({ text }) => text) });
  return { heading: 'What was checked, in order', blocks };
}

const whenOf = ({ record }: Step, when: (at: Date) => string) =>
  record === null ? 'from a capture' : `${when(new Date(record.at))}, ${record.author}`;

function readingsOf(step: Step): string {
  const typed = (step.record?.readings ?? []).map(({ what, value, unit }) =>
    lineOf(step.check, what, value, unit),
  );
  const measured = step.measured.map(
    ({ what, value, unit, from }) =>
      `${lineOf(step.check, what, value, unit)} (measured: ${from.replace(/: [a-z_]+$/, '')})`,
  );
  return [...typed, ...measured, step.record?.note ?? ''].filter((line) => line !== '').join('; ');
}

function lineOf(check: string, what: string, value: number, unit: string): string {
  const shown = `${what} ${withUnit(significant(value), unit)}`;
  const expected = isCheckId(check)
    ? Object.values(CHECKS[check].readings).find((spec) => spec.what === what)?.expected
    : undefined;
  return expected === undefined ? shown : `${shown}, expected ${limitOf(expected)}`;
}

function limitOf({ text, source }: Expected): string {
  const from = source.kind === 'published' ? source.text : SOURCE[source.kind];
  return `${text} (${from})`;
}
