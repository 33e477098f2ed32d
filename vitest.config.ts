import { fileURLToPath } from 'node:url';
import { defineConfig } from 'vitest/config';

const source = fileURLToPath(new URL('./src', import.meta.url));

/** A project is a folder of `tests/`; those that need a database say so. */
const project = (
  name: string,
  options: {
    globalSetup?: string[];
    testTimeout?: number;
    hookTimeout?: number;
    maxWorkers?: number;
  } = {},
) => ({
  resolve: { alias: { '@': source } },
  test: {
    name,
    include: [`tests/${name}/**/*.test.{ts,tsx}`],
    testTimeout: 20_000,
    hookTimeout: 60_000,
    ...options,
  },
});

const database = ['tests/support/database-setup.ts'];

export default defineConfig({
  test: {
    env: { TZ: 'UTC', ASTRO_TELEMETRY_DISABLED: '1' },
    projects: [
      project('domain'),
      project('contracts'),
      project('components'),
      project('services', { globalSetup: database }),
      project('api', { globalSetup: database, testTimeout: 60_000, hookTimeout: 360_000 }),
      project('scripts', { testTimeout: 120_000 }),
      project('browser', {
        globalSetup: ['tests/support/browser-setup.ts'],
        testTimeout: 180_000,
        maxWorkers: 1,
      }),
    ],
  },
});
