interface Named {
  readonly id: string;
  readonly name: string;
}

const isWordPart = (character: string | undefined) =>
  character !== undefined && /[\p{L}\p{N}]/u.test(character);

/**
 * The people whom a text names with an at sign, as "@Ada Holt": whole names, whatever their case; of names that begin alike the
 * longest. An at sign inside a word, as in an e-mail address, names nobody.
 */
export function mentionedIn(text: string, people: readonly Named[]): string[] {
  const folded = text.toLowerCase();
  const longestFirst = [...people].sort((a, b) => b.name.length - a.name.length);
  const found = new Set<string>();
  for (let at = folded.indexOf('@'); at >= 0; at = folded.indexOf('@', at + 1)) {
    if (isWordPart(folded[at - 1])) continue;
    const rest = folded.slice(at + 1);
    const hit = longestFirst.find(
      ({ name }) => name !== '' && rest.startsWith(name.toLowerCase()) && !isWordPart(rest[name.length]),
    );
    if (hit === undefined) continue;
    const name = hit.name.toLowerCase();
    // Two of one name are both meant, since the text cannot tell.
    for (const one of people) if (one.name.toLowerCase() === name) found.add(one.id);
  }
  return [...found];
}
