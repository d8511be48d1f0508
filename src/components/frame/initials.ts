/** "Ina Thorsby" → "IT", "R. Pellow" → "RP", "Odd" → "O". */
export function initials(name: string): string {
  const words = name.split(/\s+/u).filter((word) => /\p{L}/u.test(word));
  const first = words[0];
  const last = words.length > 1 ? words[words.length - 1] : undefined;
  return [first, last]
    .map((word) => word?.match(/\p{L}/u)?.[0] ?? '')
    .join('')
    .toUpperCase();
}
