/** A time of day in whole nanoseconds, with the day (days since 1970) where a date stands before it. */
export interface Clock {
  readonly day: number | null;
  readonly ns: number;
}

const DATE = String.raw`(?:(\d{4})[-/.](\d{1,2})[-/.](\d{1,2})|(\d{1,2})[-/.](\d{1,2})[-/.](\d{2,4}))`;
const CLOCK = new RegExp(
  String.raw`^(?:${DATE}[T ]\s*)?(\d{1,3}):(\d{1,2})(?::(\d{1,2})(?:[.,:](\d{1,9})\d*)?|[.,](\d{1,9})\d*)?\s*Z?$`,
);
const ONLY_DATE = new RegExp(`^${DATE}$`);

export const NS_PER_DAY = 86_400e9;

/**
 * Reads hh:mm:ss with or without a fraction, mm:ss.fff and hh:mm, with or without a date before it. Digits beyond the
 * nanosecond are dropped. Day and month of a date with the year last are taken in the order that is possible, day
 * first where both are: only the difference between rows counts.
 */
export function parseClock(text: string): Clock | null {
  const m = CLOCK.exec(text);
  if (m === null) return null;
  const [, year, month, day, first, second, lastYear, a, b, c, fraction, minuteFraction] = m;
  const three = c !== undefined;
  const colonFraction =
    three && fraction !== undefined && text.includes(`:${fraction}`) && text.split(':').length === 4;
  const digits = fraction ?? minuteFraction ?? '';
  const part = Number(
    colonFraction && digits.length <= 3 ? digits.padStart(3, '0').padEnd(9, '0') : digits.padEnd(9, '0'),
  );
  const minuteForm = !three && minuteFraction !== undefined;
  const hours = minuteForm ? 0 : Number(a);
  const minutes = minuteForm ? Number(a) : Number(b);
  const seconds = minuteForm ? Number(b) : Number(c ?? 0);
  if (seconds > 60 || (!minuteForm && minutes > 59)) return null;
  const ns = (hours * 3600 + minutes * 60 + seconds) * 1e9 + part;
  if (year !== undefined) return { day: dayNumber(Number(year), Number(month), Number(day)), ns };
  if (lastYear === undefined) return { day: null, ns };
  const monthFirst = Number(second) > 12;
  return {
    day: dayNumber(
      Number(lastYear),
      Number(monthFirst ? first : second),
      Number(monthFirst ? second : first),
    ),
    ns,
  };
}

/** True for a cell that holds only a date. */
export function isDate(text: string): boolean {
  return ONLY_DATE.test(text);
}

function dayNumber(year: number, month: number, day: number): number {
  return Math.floor(Date.UTC(year < 100 ? 2000 + year : year, month - 1, day) / 86_400_000);
}
