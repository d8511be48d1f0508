import { afterAll, describe, expect, it } from 'vitest';
import type { Endpoint } from '../../src/contract/endpoint.ts';
import { ENDPOINTS } from '../../src/contract/endpoints.ts';
import { pool, send } from './security-kit.ts';

afterAll(() => pool.end());

describe('GET /openapi.json', () => {
  it('describes every endpoint, with its parameters and who may call it', async () => {
    const { status, json } = await send('GET', '/api/v1/openapi.json');
    expect(status).toBe(200);
    expect(json.openapi).toBe('3.1.0');
    expect(json.servers).toEqual([{ url: '/api/v1' }]);
    for (const [id, row] of Object.entries<Endpoint>(ENDPOINTS)) {
      const operation = json.paths[row.path]?.[row.method.toLowerCase()];
      expect(operation?.operationId, id).toBe(id);
      const inPath = (operation.parameters ?? []).filter(
        (parameter: { in: string }) => parameter.in === 'path',
      );
      const names = [...row.path.matchAll(/\{(\w+)\}/g)].map((match) => match[1]);
      expect(
        inPath.map((parameter: { name: string }) => parameter.name),
        id,
      ).toEqual(names);
      expect(Object.keys(operation.responses), id).toContain(String(row.successStatus ?? 200));
      expect(operation['x-access'], id).toBeDefined();
    }
    const described = Object.values<object>(json.paths).flatMap((path) => Object.keys(path));
    expect(described).toHaveLength(Object.keys(ENDPOINTS).length);
  });

  it('resolves every reference within itself', async () => {
    const { json, text } = await send('GET', '/api/v1/openapi.json');
    const references = [...text.matchAll(/"\$ref":"#\/([^"]+)"/g)].map((match) => match[1] ?? '');
    expect(references.length).toBeGreaterThan(0);
    for (const reference of new Set(references)) {
      const found = reference.split('/').reduce((part, key) => part?.[key], json);
      expect(found, reference).toBeDefined();
    }
  });
});

describe('GET /health', () => {
  it('says that database and store answer', async () => {
    const { status, json } = await send('GET', '/api/v1/health');
    expect(status).toBe(200);
    expect(json).toMatchObject({ status: 'ok', database: true, store: true });
  });
});
