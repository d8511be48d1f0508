import { CR, LF, SPACE } from './bytes.ts';
import { CellReader } from './cellReader.ts';
import type { LineSink } from './lineFeeder.ts';
import { EXACT_MANTISSA, POWERS_OF_TEN } from './number.ts';
import type { Plan } from './plan.ts';
import { RowKeeper } from './rowKeeper.ts';
import { Stage } from './stage.ts';

/** Digits that surely fit an int32, which is quicker than doubles. */
const INT_DIGITS = 9;

/**
 * Reads rows of numbers from whole lines. Ordinary cells (sign, digits, decimal mark, digits, exponent) become doubles
 * while their bytes are passed over, by the rule of `parseNumber`; all others go to the cell reader, and every row that
 * is not wholly ordinary to the row keeper. Rows end at line ends only, whatever quotes say, so two are never merged.
 */
export class Scanner implements LineSink {
  readonly stage: Stage;
  readonly cells: CellReader;
  readonly keeper: RowKeeper;

  constructor(private readonly plan: Plan) {
    this.stage = new Stage(plan);
    this.cells = new CellReader(plan, this.stage);
    this.keeper = new RowKeeper(plan, this.stage, this.cells);
  }

  lines(bytes: Uint8Array, from: number, to: number): boolean {
    const { stage, cells, keeper, plan } = this;
    const { values, bases, shifts, blockRows, extraBase } = stage;
    const width = plan.cells;
    const need = keeper.need;
    const delimiter = plan.delimiter.charCodeAt(0);
    const bySpaces = delimiter === SPACE;
    let decimal = cells.decimalByte;
    let isPlain = keeper.isPlain;
    let { r, line, lastTime } = keeper;
    let p = from;
    keeper.bytesSeen += to - from;
    while (p < to) {
      line++;
      const lineStart = p;
      let column = 0;
      let isOdd = false;
      let unusedEmpty = 0;
      let c = 0;
      for (;;) {
        c = bytes[p]!;
        while (c === SPACE) c = bytes[++p]!;
        const cellStart = p;
        const isNegative = c === 45;
        if (isNegative || c === 43) c = bytes[++p]!;
        const start = p;
        let whole = 0;
        let digit = c ^ 48;
        while (digit < 10) {
          whole = (whole * 10 + digit) | 0;
          c = bytes[++p]!;
          digit = c ^ 48;
        }
        let digits = p - start;
        let fraction = 0;
        if (c === decimal) {
          const point = p;
          c = bytes[++p]!;
          digit = c ^ 48;
          while (digit < 10) {
            whole = (whole * 10 + digit) | 0;
            c = bytes[++p]!;
            digit = c ^ 48;
          }
          fraction = p - point - 1;
          digits += fraction;
        }
        let value = whole;
        if (digits > INT_DIGITS) {
          value = 0;
          for (let i = start; i < p; i++) {
            digit = bytes[i]! ^ 48;
            if (digit < 10) value = value * 10 + digit;
          }
          if (value > EXACT_MANTISSA) digits = 0;
        }
        let power = -fraction - shifts[column]!;
        if ((c | 32) === 101 && digits > 0) {
          c = bytes[++p]!;
          const isSmall = c === 45;
          if (isSmall || c === 43) c = bytes[++p]!;
          const exponentStart = p;
          let exponent = 0;
          while ((c ^ 48) < 10 && p < exponentStart + 4) {
            exponent = exponent * 10 + (c ^ 48);
            c = bytes[++p]!;
          }
          if (p === exponentStart) digits = 0;
          power += isSmall ? -exponent : exponent;
        }
        if (!bySpaces) while (c === SPACE) c = bytes[++p]!;
        const isEnd = c === delimiter || c === LF || c === CR;
        if (isEnd && digits > 0 && power >= -22 && power <= 22) {
          if (power < 0) value /= POWERS_OF_TEN[-power]!;
          else if (power > 0) value *= POWERS_OF_TEN[power]!;
          values[bases[column]! + r] = isNegative ? -value : value;
        } else if (isEnd && p === cellStart && column > 0 && bases[column]! >= extraBase) {
          // An empty cell where nothing is wanted, as after a trailing delimiter.
          unusedEmpty++;
        } else {
          p = cells.read(bytes, cellStart, column, r, line);
          c = bytes[p]!;
          isOdd = true;
          decimal = cells.decimalByte;
        }
        if (c !== delimiter) break;
        p++;
        if (bySpaces) {
          while (bytes[p] === SPACE) p++;
          c = bytes[p]!;
          if (c === LF || c === CR) break;
        }
        if (column < width) column++;
      }
      const lineEnd = p;
      p += c === CR && p + 1 < to && bytes[p + 1] === LF ? 2 : 1;
      const time = values[r]!;
      if (isPlain && !isOdd && column + 1 >= need && column < width && time >= lastTime) {
        lastTime = time;
        r++;
      } else {
        keeper.r = r;
        keeper.line = line;
        keeper.lastTime = lastTime;
        keeper.oddRow(bytes, lineStart, lineEnd, column + 1, unusedEmpty);
        if (keeper.stop !== null) return false;
        r = keeper.r;
        lastTime = keeper.lastTime;
        isPlain = keeper.isPlain;
      }
      if (r === blockRows) {
        stage.flush(r);
        r = 0;
      }
    }
    keeper.r = r;
    keeper.line = line;
    keeper.lastTime = lastTime;
    return true;
  }

  longLine(): boolean {
    this.keeper.line++;
    this.keeper.addText('a line of more than a million characters');
    return true;
  }
}
