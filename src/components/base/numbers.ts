const THIN_SPACE = '\u2009';

/** 1240000 → "1 240 000" with thin spaces. */
export const grouped = (count: number): string =>
  Math.round(count)
    .toString()
    .replace(/\B(?=(\d{3})+(?!\d))/g, THIN_SPACE);

/** Bytes in the unit that keeps the number short: "31.4 MiB". */
export function bytesText(bytes: number): string {
  if (bytes < 1024) return `${bytes} B`;
  const units = ['KiB', 'MiB', 'GiB', 'TiB'];
  let value = bytes / 1024;
  let unit = 0;
  while (value >= 1024 && unit < units.length - 1) {
    value /= 1024;
    unit += 1;
  }
  return `${value.toFixed(value < 10 ? 2 : 1)} ${units[unit]}`;
}

/** Seconds as a length: "1.400 s", "50.0 s", "2 min 05 s". */
export function lengthText(seconds: number): string {
  if (seconds < 10) return `${seconds.toFixed(3)} s`;
  if (seconds < 120) return `${seconds.toFixed(1)} s`;
  const minutes = Math.floor(seconds / 60);
  if (minutes < 120) return `${minutes} min ${String(Math.floor(seconds % 60)).padStart(2, '0')} s`;
  return `${Math.floor(minutes / 60)} h ${String(minutes % 60).padStart(2, '0')} min`;
}

/** A rate: "50 kHz", "1.25 MHz". */
export function rateText(hertz: number): string {
  const [value, unit] =
    hertz >= 1e6 ? [hertz / 1e6, 'MHz'] : hertz >= 1e3 ? [hertz / 1e3, 'kHz'] : [hertz, 'Hz'];
  return `${Number(value.toPrecision(4))} ${unit}`;
}

/** A step of time: "0.025 ms", "20 µs". */
export function stepText(seconds: number): string {
  const [value, unit] =
    seconds >= 1 ? [seconds, 's'] : seconds >= 1e-5 ? [seconds * 1e3, 'ms'] : [seconds * 1e6, 'µs'];
  return `${Number(value.toPrecision(4))} ${unit}`;
}

const DAY = new Intl.DateTimeFormat('en-GB', {
  day: 'numeric',
  month: 'short',
  year: 'numeric',
  timeZone: 'UTC',
});
const TIME = new Intl.DateTimeFormat('en-GB', { hour: '2-digit', minute: '2-digit', timeZone: 'UTC' });

/** "14 May 2026, 09:42" in UTC unless a zone is given (the workshop's). */
export function timeText(iso: string, timeZone = 'UTC'): string {
  const at = new Date(iso);
  if (timeZone === 'UTC') return `${DAY.format(at)}, ${TIME.format(at)}`;
  const day = new Intl.DateTimeFormat('en-GB', { day: 'numeric', month: 'short', year: 'numeric', timeZone });
  const time = new Intl.DateTimeFormat('en-GB', { hour: '2-digit', minute: '2-digit', timeZone });
  return `${day.format(at)}, ${time.format(at)}`;
}
