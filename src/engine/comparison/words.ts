import { edgeShifts, PLAY_DEG } from './cam-shift.ts';
import type { Alignment, CamShift, Row, Side } from './types.ts';

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

export const nameOf = (row: Row) => {
  const name = NAMES[row.key] ?? row.key.replaceAll('_', ' ');
  return row.part === null ? name : `${name} ${row.part}`;
};

function cellText(cell: Row['here'], unit: string): string {
  if (cell === null) return 'none';
  if (!isNumber(cell)) return String(cell);
  return unit === '1' || unit === '' ? number(cell) : `${number(cell, 4)} ${unit}`;
}

/** One sentence when all of a cam's edges moved together: that is timing, not the cam wheel. */
function camSentence(rows: readonly Row[], shift: CamShift | null): string | null {
  const shifts = edgeShifts(rows);
  if (shifts.length < 2) return null;
  if (shift === null)
    return 'The cam’s edges do not all lie as in the reference, and not all by the same angle.';
  if (Math.abs(shift.deg) < PLAY_DEG)
    return `The cam lies as in the reference, within ${number(Math.max(...shifts.map(Math.abs)), 2)} degrees.`;
  const way = shift.deg > 0 ? 'late' : 'early';
  return `The cam comes ${Math.abs(shift.deg).toFixed(1)} degrees ${way} against the crank, at all ${shift.edges} edges alike${teethWords(shift)}.`;
}

/** How far from a whole number of teeth a shift may lie and still be called that many. */
const WHOLE = 0.15;

function teethWords({ teeth, sprocketTeeth }: CamShift): string {
  if (teeth === null) return '';
  const whole = Math.round(Math.abs(teeth));
  const near = whole > 0 && Math.abs(Math.abs(teeth) - whole) <= WHOLE;
  const text = near ? `${whole} ${whole === 1 ? 'tooth' : 'teeth'}` : `${Math.abs(teeth).toFixed(1)} teeth`;
  return `, ${text} of the belt or chain at a crank sprocket of ${sprocketTeeth}${near ? '' : ', no whole number'}`;
}

/** What a customer could read, made from the numbers only, with what the comparison cannot tell. */
export function wordsOf(
  here: Side,
  alignment: Alignment,
  rows: readonly Row[],
  references: number,
  shift: CamShift | null,
): string {
  const sentences: string[] = [];
  const cam = camSentence(rows, shift);
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
  if (alignment.byHand !== null)
    sentences.push(
      `The reference was moved by hand by ${number(alignment.byHand.shift)} ${alignment.byHand.axis === 'deg' ? 'degrees' : 's'} for the overlay; the table is not touched by that.`,
    );
  const part = here.circuit.startsWith('cam-')
    ? 'belt, chain, cam wheel or cam adjuster'
    : 'the sensor, its wiring or what it looks at';
  sentences.push(
    `This compares measurements. It cannot tell which of ${part} is at fault; the maker’s service information decides.`,
  );
  return sentences.join(' ');
}

export const capital = (text: string) => text.charAt(0).toUpperCase() + text.slice(1);
