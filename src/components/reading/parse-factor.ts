/**
 * What a person types for a probe or clamp: "20:1" and "20" are 20, "1:10" is 0.1, "0,01" and "0.01" are the same.
 * Null when it is no number, not finite, or 0.
 */
export function parseFactor(text: string): number | null {
  const [left, right, ...rest] = text.trim().replaceAll(',', '.').split(':');
  if (left === undefined || rest.length > 0) return null;
  const numerator = numberOf(left);
  const denominator = right === undefined ? 1 : numberOf(right);
  if (numerator === null || denominator === null) return null;
  const factor = numerator / denominator;
  return Number.isFinite(factor) && factor !== 0 ? factor : null;
}

function numberOf(text: string): number | null {
  const trimmed = text.trim();
  if (!/^[+-]?(\d+\.?\d*|\.\d+)(e[+-]?\d+)?$/i.test(trimmed)) return null;
  return Number(trimmed);
}
