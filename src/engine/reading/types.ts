import type { TimeAxis } from '../capture.ts';
import type { Circuit } from '../circuit.ts';

export type Encoding = 'utf-8' | 'utf-16le' | 'utf-16be' | 'windows-1252';
export type Delimiter = ',' | ';' | '\t' | ' ' | '|';
export type Decimal = '.' | ',';
export type TimeUnit = 's' | 'ms' | 'us' | 'ns' | 'min' | 'clock';

/** What a person corrected; anything absent is found out from the file. */
export interface ReadingHints {
  readonly encoding?: Encoding;
  readonly delimiter?: Delimiter;
  readonly decimal?: Decimal;
  /** Line number (from 1) of the line with the names; null: there is none. */
  readonly headerLine?: number | null;
  readonly timeUnit?: TimeUnit;
  /** Used when the file has no time column. */
  readonly sampleIntervalS?: number;
  /** File columns (from 0) to read as signals; the rest is left out. */
  readonly columns?: readonly number[];
  /** File column (from 0) that holds time; null: none. */
  readonly timeColumn?: number | null;
}

/** A row that could not be read as it stood. Its readable cells are kept, the rest are holes. `line` counts from 1. */
export interface RejectedRow {
  readonly line: number;
  readonly found: string;
  readonly expected: string;
}

/** How the file was understood; shown to the person and corrected by them. */
export interface Reading {
  readonly encoding: Encoding;
  readonly delimiter: Delimiter;
  readonly decimal: Decimal;
  readonly timeUnit: TimeUnit | null;
  readonly timeColumn: number | null;
  /** Line (from 1) that holds the names; null when there is none. */
  readonly headerLine: number | null;
  /** Rows of numbers kept, rejected ones included. */
  readonly rows: number;
  /** The first 100 rejected rows. */
  readonly rejectedRows: readonly RejectedRow[];
  /** How many rows were rejected in all. */
  readonly rejectedCount: number;
  /** Date or start of recording found above the table, as it stood. */
  readonly recordedAt: string | null;
  /** Sentences for the person: several tables, holes, over-range words taken as the rail, time that repeats … */
  readonly remarks: readonly string[];
}

export interface ReadColumn {
  /** File column, counted from 0, time included. */
  readonly column: number;
  readonly name: string;
  /** UCUM code as found, prefix kept in `factor`: a column in mV has unit "V" and factor 0.001. null: not given. */
  readonly unit: string | null;
  readonly factor: number;
  readonly samples: Float32Array;
  readonly rail: { readonly low: number | null; readonly high: number | null } | null;
}

/** First lines as they came, for the preview. `role` says what the reader made of the line. */
export interface PreviewLine {
  readonly line: number;
  readonly cells: readonly string[];
  readonly role: 'text' | 'names' | 'units' | 'numbers' | 'rejected' | 'empty';
}

export interface ReadTable {
  readonly ok: true;
  readonly reading: Reading;
  readonly axis: TimeAxis;
  readonly columns: readonly ReadColumn[];
  readonly preview: readonly PreviewLine[];
}

/** A file that cannot be read: a sentence that says what happened, where, and what to do. */
export interface ReadFailure {
  readonly ok: false;
  readonly code:
    | 'empty_file'
    | 'not_text'
    | 'no_numbers'
    | 'one_column'
    | 'interval_needed'
    | 'time_backwards'
    | 'too_many_columns'
    | 'bad_archive';
  readonly message: string;
  readonly hint: string;
  readonly line: number | null;
  readonly preview: readonly PreviewLine[];
}

export type ReadOutcome = ReadTable | ReadFailure;

export interface ReadOptions {
  readonly hints?: ReadingHints;
  /** Called now and then with bytes taken so far and rows read so far. */
  readonly onProgress?: (bytes: number, rows: number) => void;
  /** Checked between chunks; reading stops with the signal's reason. */
  readonly signal?: AbortSignal;
}

/** A circuit proposed from name, unit and shape. `confidence` 0 to 1; `because` is one short sentence. */
export interface Proposal {
  readonly circuit: Circuit;
  readonly unit: string;
  readonly confidence: number;
  readonly because: string;
}
