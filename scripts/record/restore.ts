import { readArguments, run } from './arguments';
import { openBucket } from './bucket';
import { openInstallation } from './environment';
import { restoreBackup } from './restore-backup';

const usage = `usage: npm run restore -- <backup folder>
  Checks the backup, then fills an empty database and the bucket. Needs MIGRATION_DATABASE_URL and the
  server's environment. Afterwards: npm run migrate, npm run audit, and start.`;

await run(usage, async () => {
  const { files } = readArguments([]);
  const [folder] = files;
  if (folder === undefined || files.length > 1) throw new Error('Name one backup folder.');
  const { config, ownerUrl } = openInstallation();
  if (ownerUrl === '') throw new Error('MIGRATION_DATABASE_URL is not set.');
  const bucket = openBucket(config.objects);
  try {
    const { objects, heads, madeAt } = await restoreBackup({ ownerUrl, bucket, folder });
    console.info(`Restored as of ${madeAt}: ${objects.length} objects, ${heads.length} ledgers.`);
    return 0;
  } finally {
    bucket.close();
  }
});
