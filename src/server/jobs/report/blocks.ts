import type { TraceFigure } from './trace-figure.ts';

/** A picture that was written anew by us. */
export interface PhotoBlock {
  readonly kind: 'photo';
  readonly id: string;
  readonly caption: string;
  readonly width: number;
  readonly height: number;
}

export interface TableBlock {
  readonly kind: 'table';
  readonly columns: readonly { readonly title: string; readonly share: number; readonly number?: true }[];
  /** The first cell names its row. */
  readonly rows: readonly (readonly string[])[];
}

export type Block =
  | { readonly kind: 'text'; readonly text: string; readonly weight?: 'strong' | 'soft' }
  | { readonly kind: 'list'; readonly items: readonly string[] }
  | { readonly kind: 'trace'; readonly figure: TraceFigure }
  | TableBlock
  | PhotoBlock;

export interface Section {
  readonly heading: string;
  readonly blocks: readonly Block[];
}

/** A report before it is written. Texts are as people typed them. */
export interface Report {
  readonly kicker: string;
  readonly title: string;
  readonly workshop: string;
  /** Label and value, as a table at the top. */
  readonly facts: readonly (readonly [label: string, value: string])[];
  readonly sections: readonly Section[];
  /** At the foot of every page. */
  readonly foot: string;
  /** When what it tells last changed: the only date that the file carries. */
  readonly asOf: Date;
}
