import type { KnownGoodRowJson } from '../../contract/areas/library.ts';
import { circuitWords, ROLES, type SignalRole } from '../base/circuits.ts';

export interface EngineRow {
  /** Make, model and code, lower case: what makes two known-goods one engine. */
  readonly key: string;
  readonly name: string;
  readonly detail: string;
  readonly cells: ReadonlyMap<SignalRole, readonly KnownGoodRowJson[]>;
}

/** From three published ones on there is a spread worth the name. Our choice, no source. */
export const BAND_FROM = 3;

export const engineKey = ({ make, model, code }: KnownGoodRowJson['engine']): string =>
  [make, model, code].map((text) => text.trim().toLowerCase()).join('|');

/** "2011 to 2013", "2011", or nothing. */
export const yearsText = (all: readonly (number | null)[]): string => {
  const years = all.filter((year) => year !== null);
  if (years.length === 0) return '';
  const [first, last] = [Math.min(...years), Math.max(...years)];
  return first === last ? String(first) : `${first} to ${last}`;
};

/** Engines down, circuits across. A known-good of several signals stands in each of their columns. */
export function indexSheet(items: readonly KnownGoodRowJson[]): EngineRow[] {
  const groups = new Map<string, KnownGoodRowJson[]>();
  for (const item of items) {
    const key = engineKey(item.engine);
    groups.set(key, [...(groups.get(key) ?? []), item]);
  }
  return [...groups]
    .map(([key, members]) => {
      const { make, model, code } = members[0]!.engine;
      const years = members.flatMap(({ engine }) => [engine.year, engine.yearTo]);
      const cells = new Map(
        ROLES.map((role) => [role, members.filter((each) => rolesOf(each).has(role))] as const).filter(
          ([, found]) => found.length > 0,
        ),
      );
      return {
        key,
        name: `${make} ${model}`,
        detail: [code, yearsText(years)].filter((text) => text !== '').join(', '),
        cells,
      };
    })
    .sort((a, b) => a.name.localeCompare(b.name, 'en'));
}

const rolesOf = (item: KnownGoodRowJson): Set<SignalRole> =>
  new Set(item.signals.map((signal) => circuitWords(signal.circuit).role));

export const published = (items: readonly KnownGoodRowJson[]): number =>
  items.filter((item) => item.state === 'published').length;
export const waiting = (items: readonly KnownGoodRowJson[]): number =>
  items.filter((item) => item.state === 'proposed').length;

/** The signal that a cell shows: of the newest published one that has a picture, else of any. */
export function pictureOf(items: readonly KnownGoodRowJson[], role: SignalRole) {
  const first = [...items].sort((a, b) => Number(b.state === 'published') - Number(a.state === 'published'));
  for (const item of first)
    for (const signal of item.signals)
      if (signal.portrait !== null && circuitWords(signal.circuit).role === role)
        return { circuit: signal.circuit, portrait: signal.portrait };
  return null;
}
