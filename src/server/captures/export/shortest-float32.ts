/**
 * The shortest decimal text that reads back as the same float32, that is, `Math.fround(Number(text)) === value`; of several of
 * that length the one nearest to the value. Written as JavaScript writes numbers. NaN (a hole) is the empty text.
 *
 * Nine digits always suffice for float32 (IEEE 754-2019, 5.12.2). Fewer are tried first. The nearest decimal of a length is
 * not always the one that reads back when its neighbour does: below a power of two the interval of what reads back is only
 * half as wide, so the neighbours on both sides are tried too.
 */
export function shortestFloat32(value: number): string {
  if (Number.isNaN(value)) return '';
  if (value === 0) return Object.is(value, -0) ? '-0' : '0';
  if (!Number.isFinite(value)) return value > 0 ? 'Infinity' : '-Infinity';
  const exact = Math.fround(value);
  const size = Math.abs(exact);
  const sign = exact < 0 ? '-' : '';
  for (let digits = 1; digits < 9; digits += 1) {
    const found = readsBack(size, digits);
    if (found !== null) return sign + String(found);
  }
  return sign + String(Number(size.toPrecision(9)));
}

function readsBack(size: number, digits: number): number | null {
  const text = size.toExponential(digits - 1);
  const nearest = Number(text);
  if (Math.fround(nearest) === size) return nearest;
  const [mantissa, exponent] = text.split('e') as [string, string];
  const whole = Number(mantissa.replace('.', ''));
  for (const neighbour of nearest < size ? [whole + 1] : [whole - 1]) {
    const candidate = Number(`${neighbour}e${Number(exponent) - (digits - 1)}`);
    if (Math.fround(candidate) === size) return candidate;
  }
  return null;
}
