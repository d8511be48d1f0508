const FIRST_SAMPLES = 4096;
const MOST_SAMPLES = 1 << 18;

/**
 * A float32 column that grows without ever holding its samples twice: it is kept in pieces, and `finish` gives each
 * piece's memory back at once (a resizable buffer shrunk to nothing) as soon as it has been copied.
 */
export class GrowingSamples {
  private readonly full: Float32Array[] = [];
  private piece = newPiece(FIRST_SAMPLES);
  private used = 0;
  length = 0;

  append(block: Float32Array): void {
    let from = 0;
    while (from < block.length) {
      if (this.used === this.piece.length) {
        this.full.push(this.piece);
        this.piece = newPiece(Math.min(2 * this.piece.length, MOST_SAMPLES));
        this.used = 0;
      }
      const count = Math.min(block.length - from, this.piece.length - this.used);
      this.piece.set(block.subarray(from, from + count), this.used);
      this.used += count;
      from += count;
    }
    this.length += block.length;
  }

  /** All samples in one array of their own. The column is empty afterwards. */
  finish(): Float32Array {
    const all = new Float32Array(this.length);
    let at = 0;
    for (const piece of [...this.full, this.piece.subarray(0, this.used)]) {
      all.set(piece, at);
      at += piece.length;
      if (piece.buffer instanceof ArrayBuffer) piece.buffer.resize(0);
    }
    this.full.length = 0;
    return all;
  }
}

function newPiece(samples: number): Float32Array {
  return new Float32Array(new ArrayBuffer(4 * samples, { maxByteLength: 4 * samples }), 0, samples);
}
