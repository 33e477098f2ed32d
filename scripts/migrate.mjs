// Brings the database of MIGRATION_DATABASE_URL (the owning role) up to date.
import { register } from 'tsx/esm/api';

const ownerUrl = process.env['MIGRATION_DATABASE_URL'];
if (ownerUrl === undefined || ownerUrl === '') {
  console.error('MIGRATION_DATABASE_URL is not set.');
  console.error(
    'It is the address of the role that owns the schemas; docs/operations.md says how to make both roles.',
  );
  process.exit(1);
}
register();
const { migrate } = await import('../src/adapters/database/migrate.ts');
try {
  const applied = await migrate({
    ownerUrl,
    appRole: process.env['APP_DATABASE_ROLE'] || 'tagwire_app',
  });
  console.info(applied.length === 0 ? 'Nothing to change.' : `Applied: ${applied.join(', ')}`);
} catch (error) {
  console.error(error);
  process.exit(1);
}
