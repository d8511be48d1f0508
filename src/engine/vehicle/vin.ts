/**
 * Vehicle identification numbers: 17 places, place 9 a check digit over the others (49 CFR 565.15 (c), tables III to V).
 * The digit is mandatory only in some countries, so a misfit is a reason to look again and never one to refuse.
 */
const PLACES = 17;
const CHECK_PLACE = 8;

/** Table III: I, O and Q do not occur. */
const VALUES: Readonly<Record<string, number>> = {
  ...Object.fromEntries([...'0123456789'].map((digit) => [digit, Number(digit)])),
  ...Object.fromEntries([...'ABCDEFGH'].map((letter, k) => [letter, k + 1])),
  ...Object.fromEntries([...'JKLMN'].map((letter, k) => [letter, k + 1])),
  P: 7,
  R: 9,
  ...Object.fromEntries([...'STUVWXYZ'].map((letter, k) => [letter, k + 2])),
};

/** Table IV. The check digit itself has no weight. */
const WEIGHTS = [8, 7, 6, 5, 4, 3, 2, 10, 0, 9, 8, 7, 6, 5, 4, 3, 2] as const;

/**
 * The check digit that belongs to a VIN: the weighted sum modulo 11, where 10 is written X.
 * @param vin in capitals or not; what stands at place 9 is not looked at
 * @returns null when it has not 17 places or one of them cannot stand in a VIN
 */
export function vinCheckDigit(vin: string): string | null {
  const places = vin.toUpperCase();
  if (places.length !== PLACES) return null;
  let sum = 0;
  for (const [place, weight] of WEIGHTS.entries()) {
    const value = VALUES[places[place]!];
    if (value === undefined && place !== CHECK_PLACE) return null;
    sum += (value ?? 0) * weight;
  }
  const rest = sum % 11;
  return rest === 10 ? 'X' : String(rest);
}

/** What to look at again in a typed VIN; null when it fits, or when nothing was typed. */
export function vinWarning(typed: string): string | null {
  const vin = typed.toUpperCase();
  if (vin === '') return null;
  if (vin.length !== PLACES)
    return `A VIN has ${PLACES} places since 1981; this has ${vin.length}. Kept as it is.`;
  const odd = [...vin].find((place) => VALUES[place] === undefined);
  if (odd !== undefined) return `“${odd}” does not occur in a VIN (nor do I, O and Q). Kept as it is.`;
  const wanted = vinCheckDigit(vin);
  if (wanted === vin[CHECK_PLACE]) return null;
  return (
    `Place 9 would be ${wanted} by the check digit, and is ${vin[CHECK_PLACE]}. Not every country uses the digit: ` +
    'compare with the vehicle. Kept as it is.'
  );
}
