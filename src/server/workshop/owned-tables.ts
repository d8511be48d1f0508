/** A table whose rows belong to a workshop, and the condition for those of workshop `$1`. */
export interface OwnedTable {
  readonly name: string;
  readonly where: string;
}

/** A connection to the database, whoever's it is. */
interface Queryable {
  query(text: string): Promise<{ rows: unknown[] }>;
}

interface Reference {
  readonly child: string;
  readonly column: string;
  readonly parent: string;
  readonly parent_column: string;
}

/** Tables that belong to persons or to nobody: what names a workshop in them is not the workshop's. */
const NOT_OWNED = new Set(['workshop', 'person']);

const quoted = (name: string) => `"${name.replaceAll('"', '""')}"`;

/**
 * Every table that belongs to workshops, directly or through what it hangs on, as the database's own foreign keys say; children
 * before parents, so that rows can be deleted in this order. A table added later is found by itself.
 */
export async function ownedTables(client: Queryable): Promise<OwnedTable[]> {
  const { rows } = await client.query(
    `select c.conrelid::regclass::text as child, a.attname as column, c.confrelid::regclass::text as parent,
        pa.attname as parent_column
       from pg_constraint c
       join pg_attribute a on a.attrelid = c.conrelid and a.attnum = c.conkey[1]
       join pg_attribute pa on pa.attrelid = c.confrelid and pa.attnum = c.confkey[1]
      where c.contype = 'f' and c.connamespace = 'public'::regnamespace and array_length(c.conkey, 1) = 1
      order by 1, 2`,
  );
  // The columns that the query names.
  const references = (rows as Reference[]).map((row) => ({ ...row, child: row.child.replaceAll('"', '') }));
  const found = new Map<string, string>();
  for (const { child, column, parent } of references)
    if (parent === 'workshop' && !NOT_OWNED.has(child)) found.set(child, `${quoted(column)} = $1`);
  for (let added = true; added; ) {
    added = false;
    for (const { child, column, parent, parent_column: key } of references) {
      const of = found.get(parent);
      if (of === undefined || found.has(child) || NOT_OWNED.has(child)) continue;
      found.set(child, `${quoted(column)} in (select ${quoted(key)} from ${quoted(parent)} where ${of})`);
      added = true;
    }
  }
  return childrenFirst(found, references);
}

function childrenFirst(found: ReadonlyMap<string, string>, references: readonly Reference[]): OwnedTable[] {
  const left = new Map(found);
  const ordered: OwnedTable[] = [];
  while (left.size > 0) {
    const [name, where] =
      [...left].find(
        ([table]) =>
          !references.some((one) => one.parent === table && one.child !== table && left.has(one.child)),
      ) ?? [];
    if (name === undefined || where === undefined) throw new Error('tables refer to each other in a circle');
    ordered.push({ name, where });
    left.delete(name);
  }
  return ordered;
}
