const FIRST_SAMPLES = 4096;
const MOST_SAMPLES = 1 << 18;

/**
 * Samples that all columns of one table may keep in plain buffers. Their memory the allocator can use again for the
 * next capture, which is quicker, but it comes back only when the collector runs.
 */
export class PlainBudget {
  private left = 1 << 22;

  take(samples: number): boolean {
    if (samples > this.left) return false;
    this.left -= samples;
    return true;
  }
}

/**
 * A float32 column that grows without ever holding many of its samples twice: it is kept in pieces that go one by one
 * into the final array. Beyond a budget pieces are resizable buffers, so that each gives its memory back at once,
 * without waiting for the collector, when it is shrunk to nothing.
 */
export class GrowingSamples {
  private readonly full: Float32Array[] = [];
  private piece: Float32Array;
  private used = 0;
  length = 0;

  constructor(private readonly budget: PlainBudget) {
    this.piece = newPiece(FIRST_SAMPLES, budget);
  }

  append(block: Float64Array): void {
    let from = 0;
    while (from < block.length) {
      if (this.used === this.piece.length) {
        this.full.push(this.piece);
        this.piece = newPiece(Math.min(2 * this.piece.length, MOST_SAMPLES), this.budget);
        this.used = 0;
      }
      const count = Math.min(block.length - from, this.piece.length - this.used);
      this.piece.set(block.subarray(from, from + count), this.used);
      this.used += count;
      from += count;
      this.length += count;
    }
  }

  /** All samples in one array of their own. The column is empty afterwards. */
  finish(): Float32Array {
    const all = new Float32Array(this.length);
    this.full.push(this.piece.subarray(0, this.used));
    let at = 0;
    for (const piece of this.full) {
      all.set(piece, at);
      at += piece.length;
      if (piece.buffer instanceof ArrayBuffer && piece.buffer.resizable) piece.buffer.resize(0);
    }
    this.full.length = 0;
    return all;
  }
}

function newPiece(samples: number, budget: PlainBudget): Float32Array {
  if (budget.take(samples)) return new Float32Array(samples);
  return new Float32Array(new ArrayBuffer(4 * samples, { maxByteLength: 4 * samples }), 0, samples);
}
