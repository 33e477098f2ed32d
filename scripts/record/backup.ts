import { readArguments, run } from './arguments';
import { openBucket } from './bucket';
import { openInstallation } from './environment';
import { makeBackup } from './make-backup';

const usage = `usage: npm run backup -- <new folder>
  Writes database and objects together, with a manifest of hashes. Needs MIGRATION_DATABASE_URL and the
  server's environment, or a product that npm start runs here. The ledger's key is kept apart.`;

await run(usage, async () => {
  const { files } = readArguments([]);
  const [folder] = files;
  if (folder === undefined || files.length > 1) throw new Error('Name one new folder.');
  const { config, ownerUrl } = openInstallation();
  if (ownerUrl === '') throw new Error('MIGRATION_DATABASE_URL is not set.');
  const bucket = openBucket(config.objects);
  try {
    const { manifest, sum } = await makeBackup({ ownerUrl, bucket, folder });
    console.info(`${manifest.objects.length} objects, ${manifest.heads.length} ledgers.`);
    console.info(`SHA-256 of the manifest: ${sum}`);
    return 0;
  } finally {
    bucket.close();
  }
});
