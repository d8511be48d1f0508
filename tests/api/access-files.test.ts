import { readdirSync, readFileSync } from 'node:fs';
import { join, relative, resolve } from 'node:path';
import { describe, expect, it } from 'vitest';
import { ACTIONS } from '../../src/contract/actions.ts';
import type { Endpoint } from '../../src/contract/endpoint.ts';
import { ENDPOINTS } from '../../src/contract/endpoints.ts';
import { PAGES } from '../../src/contract/pages.ts';

const root = resolve(import.meta.dirname, '../..');
const pagesFolder = join(root, 'src/pages');
const files = readdirSync(pagesFolder, { recursive: true, withFileTypes: true })
  .filter((entry) => entry.isFile() && /\.(astro|ts|md|mdx|html|js)$/.test(entry.name))
  .map((entry) => relative(pagesFolder, join(entry.parentPath, entry.name)));

/** `captures/[id]/index.ts` is served at `/captures/{id}`. */
const pathOf = (file: string) => {
  const path = `/${file.replace(/\.(astro|ts|md|mdx|html|js)$/, '').replace(/(^|\/)index$/, '')}`;
  return path.replace(/\/$/, '').replace(/\[(\w+)\]/g, '{$1}') || '/';
};

/** What answers an address that nothing else answers: with 404, which has no row on purpose. */
const CATCH_ALLS = ['api/[...path].ts', '[...path].astro'];
const served = files.filter((file) => !CATCH_ALLS.includes(file));
const routes = served.filter((file) => file.startsWith('api/'));
const pages = served.filter((file) => !file.startsWith('api/') && !file.endsWith('README.md'));
const rows = Object.entries<Endpoint>(ENDPOINTS);

describe('files under src/pages', () => {
  it.each(pages)('%s has a row among the pages', (file) => {
    expect(Object.keys(PAGES)).toContain(pathOf(file));
  });

  it.each(CATCH_ALLS)('%s has no row, so the middleware refuses whatever it would answer', (file) => {
    expect(files).toContain(file);
    expect(Object.keys(PAGES)).not.toContain(pathOf(file));
  });

  it.each(routes)('%s exports only methods that have a row, each made for that row', (file) => {
    const source = readFileSync(join(pagesFolder, file), 'utf8');
    const path = pathOf(file).replace('/api/v1', '');
    const exported = [...source.matchAll(/export (?:const|function|async function|\{)\s*(\w+)/g)].map(
      (m) => m[1] ?? '',
    );
    const made = [...source.matchAll(/export const (\w+) = route\(\s*'([\w.]+)'/g)];
    expect(made.map(([, method]) => method)).toEqual(exported);
    for (const [, method, id] of made) {
      const row = rows.find(([name]) => name === id)?.[1];
      expect(row, id).toMatchObject({ method, path });
      expect(row?.inFront, id).toBeUndefined();
    }
  });

  it('has a route for every endpoint that the front handler does not serve', () => {
    const sources = routes.map((file) => readFileSync(join(pagesFolder, file), 'utf8')).join('\n');
    for (const [id, row] of rows) if (!row.inFront) expect(sources, id).toContain(`route('${id}'`);
  });
});

describe('src/actions', () => {
  it('has exactly the forms that have a row', () => {
    const source = ['index', 'people', 'owner']
      .map((name) => readFileSync(join(root, `src/actions/${name}.ts`), 'utf8'))
      .join('\n');
    const names = [...source.matchAll(/^ {2}(\w+): defineAction\(/gm)].map((match) => match[1]);
    expect(names.sort()).toEqual(Object.keys(ACTIONS).sort());
    expect(source.match(/defineAction\(/g)?.length).toBe(names.length);
  });
});
