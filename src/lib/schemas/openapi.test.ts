import { readdirSync, readFileSync } from 'node:fs';
import path from 'node:path';
import { describe, expect, it } from 'vitest';
import { openApiDocument } from './openapi';

const ROUTES = path.resolve(import.meta.dirname, '../../pages/api/v1');
/** People and one-time links are the affair of the pages, scripts have no part in them; and the document itself. */
const NOT_PUBLISHED = /^\/api\/v1\/(people|invitations|openapi\.json)/u;
const METHODS = ['GET', 'POST', 'PATCH', 'PUT', 'DELETE'];

/** Every route and method that the site answers, from its files: `POST /api/v1/runs/{id}/steps`. */
function answered(folder = ROUTES): string[] {
  return readdirSync(folder, { withFileTypes: true }).flatMap((entry) => {
    const place = path.join(folder, entry.name);
    if (entry.isDirectory()) return answered(place);
    const route = `/api/v1/${path.relative(ROUTES, place)}`
      .replace(/\.ts$/u, '')
      .replace(/\/index$/u, '')
      .replaceAll(/\[(\w+)\]/gu, '{$1}');
    const source = readFileSync(place, 'utf8');
    const has = (method: string): boolean => new RegExp(`export const ${method}\\b`, 'u').test(source);
    return METHODS.filter(has).map((method) => `${method} ${route}`);
  });
}

describe('the OpenAPI document', () => {
  const document = openApiDocument();
  const described = Object.entries(document.paths ?? {}).flatMap(([route, item]) =>
    Object.keys(item ?? {}).map((method) => `${method.toUpperCase()} ${route}`),
  );

  it('describes every route that the site answers, and no other', () => {
    expect(described.sort()).toEqual(
      answered()
        .filter((one) => !NOT_PUBLISHED.test(one.split(' ')[1] ?? ''))
        .sort(),
    );
  });

  it('refers only to what it holds', () => {
    const text = JSON.stringify(document);
    const names = new Set(Object.keys(document.components?.schemas ?? {}));
    const used = [...text.matchAll(/"#\/components\/schemas\/([^"]+)"/gu)].map(([, name]) => name ?? '');
    expect(used.length).toBeGreaterThan(50);
    expect(used.filter((name) => !names.has(name))).toEqual([]);
  });

  it('names every operation once', () => {
    const ids = Object.values(document.paths ?? {}).flatMap((item) =>
      Object.values(item ?? {}).map((operation) => (operation as { operationId?: string }).operationId),
    );
    expect(ids).toEqual([...new Set(ids)]);
    expect(ids).not.toContain(undefined);
  });
});
