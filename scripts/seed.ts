import { existsSync, writeFileSync } from 'node:fs';
import { fileURLToPath } from 'node:url';
import { type Composition, composition } from '@/composition';
import type { Person } from './local/identity.mjs';

/** What `src/demo/seed.ts` exports: it writes the demo data and says whom one can sign in as. */
type Seed = (
  app: Composition,
  options: { readonly ownerUrl: string },
) => Promise<readonly Person[]>;

const [peopleFile] = process.argv.slice(2);
const ownerUrl = process.env['MIGRATION_DATABASE_URL'];
if (peopleFile === undefined || ownerUrl === undefined) {
  throw new Error('usage: MIGRATION_DATABASE_URL=… tsx scripts/seed.ts <people file>');
}

const file = fileURLToPath(new URL('../src/demo/seed.ts', import.meta.url));
if (existsSync(file)) {
  const { seed } = (await import(file)) as { seed: Seed };
  const app = await composition();
  try {
    const people = await seed(app, { ownerUrl });
    writeFileSync(peopleFile, JSON.stringify({ people }, null, 2), { mode: 0o600 });
  } finally {
    await app.close();
  }
}
