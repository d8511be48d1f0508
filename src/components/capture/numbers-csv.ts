import type { CaptureJson, MeasurementsJson } from '../../contract/areas/captures.ts';

/** A text cell: quoted where it must be (RFC 4180); what a spreadsheet would take for a formula gets an apostrophe (OWASP). */
function cell(text: string): string {
  const guarded = /^[=+\-@\t\r]/.test(text) ? `'${text}` : text;
  return /[",\r\n]/.test(guarded) ? `"${guarded.replaceAll('"', '""')}"` : guarded;
}

const figure = (value: number | null | undefined) => (value == null ? '' : String(value));

/** Every measured number as rows: whose, key, value, unit, count, spread, why it is missing, and the samples it came from. */
export function numbersCsv(capture: Pick<CaptureJson, 'signals'>, measurements: MeasurementsJson): string {
  const nameOf = (index: number) =>
    capture.signals.find((signal) => signal.index === index)?.name ?? `signal ${index}`;
  const groups = [
    ...measurements.signals.map(({ index, values }) => ({ name: nameOf(index), values })),
    ...measurements.relations.map(({ signals, values }) => ({
      name: signals.map(nameOf).join(' and '),
      values,
    })),
  ];
  const lines = ['signal,key,part,value,unit,n,min,max,sd,reason,from_s,to_s'];
  for (const { name, values } of groups)
    for (const one of values) {
      const list: readonly unknown[] = Array.isArray(one.value) ? one.value : [one.value];
      list.forEach((value, place) => {
        const part = Array.isArray(one.value) ? place : null;
        const of = (figures: number | readonly number[] | undefined) =>
          figure(typeof figures === 'object' ? figures[place] : figures);
        const text =
          typeof value === 'number'
            ? figure(value)
            : value === null
              ? ''
              : cell(typeof value === 'object' ? JSON.stringify(value) : String(value));
        const evidence = one.evidence[list.length === one.evidence.length ? place : 0];
        lines.push(
          [
            cell(name),
            one.key,
            part === null ? '' : String(part + 1),
            text,
            cell(one.unit),
            figure(one.n),
            of(one.min),
            of(one.max),
            of(one.sd),
            cell(one.reason ?? ''),
            figure(evidence?.from),
            figure(evidence?.to),
          ].join(','),
        );
      });
    }
  return `${lines.join('\n')}\n`;
}
