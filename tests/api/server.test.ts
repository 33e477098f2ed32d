import { afterAll, beforeAll, expect, test } from 'vitest';
import { createTestDatabase, type TestDatabase } from '../support/database';
import { startServer, startServices, type TestServer, type TestServices } from '../support/servers';

let database: TestDatabase;
let services: TestServices;
let server: TestServer;

beforeAll(async () => {
  database = await createTestDatabase();
  services = await startServices();
  server = await startServer({ database, services });
});
afterAll(async () => {
  await server?.stop();
  await services?.stop();
  await database?.drop();
});

test('the built server answers on an empty database, with its security headers, and ends when asked', async () => {
  const health = await fetch(`${server.url}/healthz`);
  expect([health.status, await health.text()]).toEqual([200, 'ok']);
  const front = await fetch(server.url);
  expect(front.status).toBe(200);
  const policy = front.headers.get('content-security-policy') ?? '';
  expect(policy).toContain("default-src 'none'");
  expect(policy).not.toContain('unsafe-inline');
  expect(front.headers.get('x-content-type-options')).toBe('nosniff');
  expect((await fetch(`${server.url}/_image?href=/x.png`)).status).toBe(404);
  await server.stop();
  await expect(fetch(server.url)).rejects.toThrow();
});
