export interface Column {
  readonly name: string;
  readonly unit: string;
  readonly values: Float64Array;
}

export interface Dialect {
  readonly delimiter: ',' | ';' | '\t';
  readonly decimal: '.' | ',';
  readonly timeUnit: 's' | 'ms' | 'us';
  readonly preamble?: readonly string[];
}

const perSecond = { s: 1, ms: 1e3, us: 1e6 } as const;

/** Writes columns as a scope would: times in the dialect's unit, values to four figures. */
export function toCsv(startS: number, stepS: number, columns: readonly Column[], dialect: Dialect): string {
  const number = (text: string) => (dialect.decimal === ',' ? text.replace('.', ',') : text);
  const scale = perSecond[dialect.timeUnit];
  const lines = [...(dialect.preamble ?? [])];
  lines.push(
    [`Time (${dialect.timeUnit})`, ...columns.map((c) => `${c.name} (${c.unit})`)].join(dialect.delimiter),
  );
  const count = columns[0]?.values.length ?? 0;
  for (let i = 0; i < count; i++) {
    const time = String(Number(((startS + i * stepS) * scale).toPrecision(9)));
    const cells = columns.map((column) => String(Number(column.values[i]!.toPrecision(4))));
    lines.push([time, ...cells].map(number).join(dialect.delimiter));
  }
  return `${lines.join('\n')}\n`;
}
