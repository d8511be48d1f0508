import { CR, LF } from './bytes.ts';

/** A line longer than this is passed over; no row of a table that we read comes near it. */
export const LONGEST_LINE = 1 << 20;
/** Bytes passed on at once: few enough that they stay in the processor's nearest cache. */
const SLICE = 1 << 16;

export interface LineSink {
  /** Whole lines: the byte at `to - 1` ends the last one. Gives false when no more lines are wanted. */
  lines(bytes: Uint8Array, from: number, to: number): boolean;
  /** A line that was too long to keep. */
  longLine(): boolean;
}

/**
 * Cuts a stream of bytes into whole lines, wherever its chunks end. Lines inside a chunk are passed on in place; only
 * the one across two chunks is copied. A CR at the end of a chunk waits for the LF that may follow it.
 */
export class LineFeeder {
  private carry = new Uint8Array(4096);
  private carried = 0;
  private skipping = false;

  constructor(private readonly sink: LineSink) {}

  /** False when the sink wants no more. */
  push(chunk: Uint8Array): boolean {
    // A view of one and the same kind, whatever kind of byte array the source gives: the compiler counts on it.
    for (let at = 0; at < chunk.length; at += SLICE) {
      const length = Math.min(SLICE, chunk.length - at);
      if (!this.slice(new Uint8Array(chunk.buffer, chunk.byteOffset + at, length))) return false;
    }
    return true;
  }

  /** The last line, where the file does not end with a line end. */
  end(): boolean {
    if (this.carried === 0 && !this.skipping) return true;
    if (this.carried > 0 && this.carry[this.carried - 1] === CR) return this.flushCarry();
    this.keep(Uint8Array.of(LF));
    return this.flushCarry();
  }

  private slice(chunk: Uint8Array): boolean {
    let from = 0;
    if (this.carried > 0 || this.skipping) {
      const taken = this.untilLineEnd(chunk);
      if (taken === null) {
        this.keep(chunk);
        return true;
      }
      this.keep(chunk.subarray(0, taken));
      if (!this.flushCarry()) return false;
      from = taken;
    }
    let to = chunk.length;
    // A CR as the very last byte may be half of a line end.
    if (to > from && chunk[to - 1] === CR) to--;
    while (to > from && chunk[to - 1] !== LF && chunk[to - 1] !== CR) to--;
    if (to > from && !this.sink.lines(chunk, from, to)) return false;
    this.keep(chunk.subarray(to));
    return true;
  }

  /** Bytes of the chunk that complete the carried line; null: it goes on beyond the chunk, or may. */
  private untilLineEnd(chunk: Uint8Array): number | null {
    if (this.carried > 0 && this.carry[this.carried - 1] === CR) return chunk[0] === LF ? 1 : 0;
    for (let i = 0; i < chunk.length; i++) {
      if (chunk[i] === LF) return i + 1;
      if (chunk[i] !== CR) continue;
      if (i + 1 === chunk.length) return null;
      return chunk[i + 1] === LF ? i + 2 : i + 1;
    }
    return null;
  }

  private keep(bytes: Uint8Array): void {
    if (bytes.length === 0) return;
    if (this.skipping || this.carried + bytes.length > LONGEST_LINE) {
      // Only the last byte is needed: it may be a CR.
      this.skipping = true;
      this.carry[0] = bytes[bytes.length - 1]!;
      this.carried = 1;
      return;
    }
    if (this.carried + bytes.length > this.carry.length) {
      const grown = new Uint8Array(Math.max(2 * this.carry.length, this.carried + bytes.length));
      grown.set(this.carry.subarray(0, this.carried));
      this.carry = grown;
    }
    this.carry.set(bytes, this.carried);
    this.carried += bytes.length;
  }

  private flushCarry(): boolean {
    const count = this.carried;
    const skipped = this.skipping;
    this.carried = 0;
    this.skipping = false;
    return skipped ? this.sink.longLine() : this.sink.lines(this.carry, 0, count);
  }
}
