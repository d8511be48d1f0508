/** What a cell that is no number says: over the input's range on one side, or nothing. null: none of these words. */
export type Word = 'high' | 'low' | 'hole';

const OVER =
  /^(over|ovr|overflow|over[- ]?range|overload|o\.?l\.?|ovld|inf(inity)?|1\.#inf|∞|clip(ped|ping)?|sat(urated)?|off[- ]?scale|out[- ]of[- ]range|überlauf|übersteuert|hors[- ]gamme|fuera de rango)$/i;
const UNDER = /^(under|underflow|under[- ]?range|unterlauf)$/i;
const NOTHING =
  /^(nan|[+-]?1\.#(ind|qnan|snan)0*|n\/?a|#n\/a|null|none|nil|invalid|-{1,8}|—|–|\*+|#+|\?+|\.+|_+)$/i;

/** Reads words such as "OL", "+inf", "-∞", "over range" or "n/a"; a sign or an arrow before the word names the side. */
export function readWord(text: string): Word | null {
  if (NOTHING.test(text)) return 'hole';
  const sign = /^[-−<]/.test(text) ? 'low' : 'high';
  const word = text.replace(/^[-−+<>]\s*/, '');
  if (OVER.test(word)) return sign;
  return UNDER.test(word) ? 'low' : null;
}
