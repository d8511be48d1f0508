import type { Alignment, Row, Side } from './types.ts';

const number = (value: number, digits = 3) => String(Number(value.toPrecision(digits)));
const isNumber = (cell: Row['here']): cell is number => typeof cell === 'number';

const NAMES: Readonly<Record<string, string>> = {
  cam_rising_angles: 'rising edge',
  cam_falling_angles: 'falling edge',
  burn_time: 'burn time',
  burn_level: 'burn level',
  kick_peak: 'kick',
  peak_to_peak: 'swing',
  peak_current: 'peak current',
  irregular_teeth: 'irregular teeth',
};

const nameOf = (row: Row) => {
  const name = NAMES[row.key] ?? row.key.replaceAll('_', ' ');
  return row.part === null ? name : `${name} ${row.part}`;
};

function cellText(cell: Row['here'], unit: string): string {
  if (cell === null) return 'none';
  if (!isNumber(cell)) return String(cell);
  return unit === '1' || unit === '' ? number(cell) : `${number(cell, 4)} ${unit}`;
}

/** One sentence when all of a cam's edges moved together: that is timing, not the cam wheel. */
function camSentence(rows: readonly Row[]): string | null {
  const angles = rows.filter((row) => row.key === 'cam_rising_angles' || row.key === 'cam_falling_angles');
  const shifts = angles.flatMap((row) =>
    isNumber(row.here) && isNumber(row.reference) ? [row.here - row.reference] : [],
  );
  if (shifts.length < 2) return null;
  const mean = shifts.reduce((sum, shift) => sum + shift, 0) / shifts.length;
  const alike = shifts.every((shift) => Math.abs(shift - mean) <= 1.5);
  if (!alike) return 'The cam’s edges do not all lie as in the reference, and not all by the same angle.';
  if (Math.abs(mean) < 2)
    return `The cam lies as in the reference, within ${number(Math.max(...shifts.map(Math.abs)), 2)} degrees.`;
  const way = mean > 0 ? 'late' : 'early';
  return `The cam comes ${Math.abs(mean).toFixed(1)} degrees ${way} against the crank, at all ${shifts.length} edges alike.`;
}

/** What a customer could read, made from the numbers only, with what the comparison cannot tell. */
export function wordsOf(here: Side, alignment: Alignment, rows: readonly Row[], references: number): string {
  const sentences: string[] = [];
  const cam = camSentence(rows);
  if (cam) sentences.push(cam);
  const outside = rows.filter((row) => row.verdict === 'outside' && !(cam && row.key.startsWith('cam_')));
  for (const row of outside.slice(0, 4))
    sentences.push(
      `${capital(nameOf(row))}: ${cellText(row.here, row.unit)} here, ${cellText(row.reference, row.unit)} in the reference.`,
    );
  const inside = rows.filter((row) => row.verdict === 'inside').length;
  const undecided = rows.filter((row) => row.verdict === 'undecided').length;
  const out = rows.length - inside - undecided;
  const against = references >= 3 ? `the band of ${references} known-goods` : 'the reference';
  sentences.push(
    `Of ${rows.length} values, ${inside} agree with ${against}, ${out} do not, ${undecided} cannot be decided.`,
  );
  if (alignment.by === 'none')
    sentences.push('The two traces could not be laid on each other; both are drawn as they are.');
  if (alignment.confidence < 0.6 && alignment.by !== 'none')
    sentences.push(
      'The two are laid on each other with little certainty; look at the overlay before you trust the table.',
    );
  const part = here.circuit.startsWith('cam-')
    ? 'belt, chain, cam wheel or cam adjuster'
    : 'the sensor, its wiring or what it looks at';
  sentences.push(
    `This compares measurements. It cannot tell which of ${part} is at fault; the maker’s service information decides.`,
  );
  return sentences.join(' ');
}

const capital = (text: string) => text.charAt(0).toUpperCase() + text.slice(1);
