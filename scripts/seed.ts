// Writes the demo data into the database of DATABASE_URL, and whom one can sign in as into a file.
import { writeFileSync } from 'node:fs';
import { composition } from '@/composition';
import { seed } from '@/demo/seed';
import type { Person } from './local/identity.mjs';

const [peopleFile] = process.argv.slice(2);
if (peopleFile === undefined) throw new Error('usage: tsx scripts/seed.ts <people file>');

const app = await composition();
try {
  const people: readonly Person[] = await seed(app);
  const listed = people.map(({ subject, name, email, part }) => ({ subject, name, email, part }));
  writeFileSync(peopleFile, JSON.stringify({ people: listed }, null, 2), { mode: 0o600 });
} finally {
  await app.close();
}
