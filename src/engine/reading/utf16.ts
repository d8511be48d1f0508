/**
 * UTF-16 to UTF-8, chunk by chunk: a unit or a surrogate pair may be cut anywhere. A lone surrogate becomes U+FFFD.
 * `end()` gives what an odd last byte leaves behind.
 */
export class Utf16ToUtf8 {
  private half = -1;
  private high = 0;

  constructor(private readonly littleEndian: boolean) {}

  push(chunk: Uint8Array): Uint8Array {
    // One unit gives at most three bytes; a kept half or surrogate adds at most one unit each.
    const out = new Uint8Array(3 * ((chunk.length >> 1) + 2));
    let length = 0;
    let i = 0;
    while (i < chunk.length) {
      const first = this.half >= 0 ? this.half : chunk[i++]!;
      if (i >= chunk.length) {
        this.half = first;
        break;
      }
      this.half = -1;
      const second = chunk[i++]!;
      const unit = this.littleEndian ? first | (second << 8) : (first << 8) | second;
      if (unit < 0x80 && this.high === 0) out[length++] = unit;
      else length = this.encode(unit, out, length);
    }
    return out.subarray(0, length);
  }

  end(): Uint8Array {
    const loose = this.half >= 0 || this.high !== 0;
    this.half = -1;
    this.high = 0;
    return loose ? Uint8Array.of(0xef, 0xbf, 0xbd) : new Uint8Array(0);
  }

  private encode(unit: number, out: Uint8Array, at: number): number {
    let length = at;
    if (this.high !== 0) {
      const high = this.high;
      this.high = 0;
      if (unit >= 0xdc00 && unit < 0xe000) {
        const code = 0x10000 + ((high - 0xd800) << 10) + (unit - 0xdc00);
        out[length++] = 0xf0 | (code >> 18);
        out[length++] = 0x80 | ((code >> 12) & 63);
        out[length++] = 0x80 | ((code >> 6) & 63);
        out[length++] = 0x80 | (code & 63);
        return length;
      }
      length = three(0xfffd, out, length);
    }
    if (unit >= 0xd800 && unit < 0xdc00) {
      this.high = unit;
      return length;
    }
    if (unit < 0x80) {
      out[length++] = unit;
      return length;
    }
    if (unit < 0x800) {
      out[length++] = 0xc0 | (unit >> 6);
      out[length++] = 0x80 | (unit & 63);
      return length;
    }
    return three(unit >= 0xdc00 && unit < 0xe000 ? 0xfffd : unit, out, length);
  }
}

function three(code: number, out: Uint8Array, at: number): number {
  out[at] = 0xe0 | (code >> 12);
  out[at + 1] = 0x80 | ((code >> 6) & 63);
  out[at + 2] = 0x80 | (code & 63);
  return at + 3;
}
