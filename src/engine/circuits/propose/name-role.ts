import { COMMAND_WORDS, LEVEL_WORDS, PICKUP_WORDS, ROLE_WORDS, type Role } from './words.ts';

/** What a name says. `role` null: nothing, or several things at once. */
export interface NameRole {
  readonly role: Role | null;
  /** The word that decided, as written. */
  readonly word: string;
  readonly command: boolean;
  readonly pickup: boolean;
  readonly level: boolean;
}

/** Reads a column's name. "Camshaft coil" names two roles and so decides nothing; "fuel pump" and "cranking current" are phrases. */
export function nameRole(name: string): NameRole {
  const words = wordsOf(name);
  const says = (list: readonly string[]) => words.find((word) => list.some((entry) => matches(word, entry)));
  const found = (Object.keys(ROLE_WORDS) as Role[]).flatMap((role) => {
    const word = says(ROLE_WORDS[role]);
    return word === undefined ? [] : [{ role, word }];
  });
  const roles = found.filter(
    ({ role }) =>
      !yields(
        role,
        found.map((one) => one.role),
        words,
      ),
  );
  const command = says(COMMAND_WORDS) !== undefined;
  return {
    role: roles.length === 1 ? roles[0]!.role : null,
    word: roles.length === 1 ? roles[0]!.word : '',
    command,
    pickup: says(PICKUP_WORDS) !== undefined,
    level: says(LEVEL_WORDS) !== undefined,
  };
}

/** A weaker word gives way to a stronger one beside it: "ignition feed" is a supply, "starter battery" too, "coil trigger" a coil. */
function yields(role: Role, all: readonly Role[], words: readonly string[]): boolean {
  const others = all.filter((one) => one !== role);
  if (others.length === 0) return false;
  if (role === 'other') return true;
  if (role === 'supply') return words.some((word) => word === 'power') || others.includes('fuel-pump');
  if (role === 'coil' || role === 'injector') return others.includes('supply') && !words.includes('power');
  if (role === 'starter') return others.includes('crank') || others.includes('supply');
  return false;
}

const matches = (word: string, entry: string) =>
  entry.endsWith('*') ? word.startsWith(entry.slice(0, -1)) : word === entry;

/** Lower-case words without accents: "KW-Geber", "CamSensor_2", "Zündspule 1" → kw, geber, cam, sensor, 2, zundspule, 1. */
export function wordsOf(name: string): string[] {
  const plain = name
    .replace(/ß/g, 'ss')
    .replace(/([a-z])([A-Z])/g, '$1 $2')
    .normalize('NFD')
    .replace(/\p{M}/gu, '')
    .replace(/ł/gi, 'l')
    .replace(/ø/gi, 'o')
    .toLowerCase();
  const words = plain.match(/b\+|[\p{L}\p{N}]+/gu) ?? [];
  const bare = words.flatMap((word) => {
    const cut = word.match(/^(\p{L}{2,})\d+$/u);
    return cut ? [word, cut[1]!] : [word];
  });
  const joined = words.slice(1).map((word, k) => words[k]! + word);
  return [...bare, ...joined.filter((word) => /^(fuelpump|kl30|kl15|arboldelevas)/.test(word))];
}
