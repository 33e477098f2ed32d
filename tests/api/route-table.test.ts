import { readdirSync } from 'node:fs';
import { join } from 'node:path';
import { describe, expect, it } from 'vitest';
import { ROUTES } from '@/http/route-table';
import { allOperations } from '@/pages/api/openapi.json';

const pages = join(import.meta.dirname, '../../src/pages');

/** `src/pages/api/files/[file].ts` is the route `/api/files/[file]`; names with `_` are no routes. */
const routes = readdirSync(pages, { recursive: true, withFileTypes: true })
  .filter((entry) => entry.isFile() && /\.(ts|astro)$/.test(entry.name))
  .map((entry) => join(entry.parentPath, entry.name).slice(pages.length))
  .filter((path) => !path.split('/').some((part) => part.startsWith('_')))
  .map((path) => path.replace(/\.(ts|astro)$/, '').replace(/\/index$/, '') || '/');

describe('the route table', () => {
  it('names every route there is, and no other', () => {
    expect(Object.keys(ROUTES).sort()).toEqual([...routes].sort());
  });

  it('describes every API route in the contracts, and no other', () => {
    const described = new Set(
      allOperations.map((operation) => operation.path.replaceAll('{', '[').replaceAll('}', ']')),
    );
    const served = routes.filter(
      (route) => route.startsWith('/api/') && route !== '/api/openapi.json',
    );
    expect([...described].sort()).toEqual(served.sort());
  });

  it('opens to the public only what its contract calls public', () => {
    for (const operation of allOperations) {
      const route = operation.path.replaceAll('{', '[').replaceAll('}', ']');
      expect([route, ROUTES[route]?.access === 'public']).toEqual([
        route,
        operation.access === 'public',
      ]);
    }
  });
});
