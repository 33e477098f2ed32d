import { readFileSync } from 'node:fs';
import * as z from 'zod/mini';
import { openDatabase } from '@/adapters/database/orm';
import { openJobs } from '@/adapters/jobs';
import { openHeadMemory } from '@/adapters/ledger/head-memory';
import { openObjects } from '@/adapters/objects/s3';
import { systemClock, systemRandom } from '@/adapters/system/system';
import { listErasures } from '@/services/ledger/erasure/list-erasures';
import { reapplyErasures } from '@/services/ledger/erasure/reapply-erasures';
import { removeObjects } from '@/services/ledger/erasure/remove-objects';
import { watchRecord } from '@/services/ledger/restore/watch-record';
import { readArguments, run } from './arguments';
import { openInstallation } from './environment';

const usage = `usage: npm run --silent erasures -- list > erasures.json
       npm run erasures -- apply erasures.json
  The first writes what was erased, by line and hash, to be kept apart from the backups. The second
  erases it again after an older backup was restored, with the environment of the server.`;

const listed = z.array(
  z.strictObject({ series: z.string(), line: z.string(), salt: z.string(), document: z.string() }),
);

await run(usage, async () => {
  const [word, file, ...rest] = readArguments([]).files;
  if (
    rest.length > 0 ||
    (word !== 'list' && word !== 'apply') ||
    (word === 'apply') !== (file !== undefined)
  )
    throw new Error('Say list, or apply and a file.');
  const { config } = openInstallation();
  const orm = await openDatabase(config.databaseUrl, 4);
  try {
    if (file === undefined) {
      console.info(JSON.stringify(await listErasures(orm.em.fork()), null, 1));
      return 0;
    }
    const erasures = listed.parse(JSON.parse(readFileSync(file, 'utf8')));
    const objects = openObjects(config.objects);
    const { boss, jobs } = await openJobs(config.databaseUrl, (error) =>
      console.error(error.message),
    );
    try {
      const heads = openHeadMemory(config.storageDir);
      const recordState = watchRecord(() => ({ db: orm.em.fork(), heads }));
      const deps = {
        db: orm.em.fork(),
        clock: systemClock,
        random: systemRandom,
        jobs,
        recordState,
      };
      const done = await reapplyErasures(deps, erasures);
      if (!done.ok) throw new Error(done.failure.detail);
      for (const seriesId of new Set(erasures.map(({ series }) => series)))
        await removeObjects({ db: orm.em.fork(), objects }, { seriesId });
      const { erased, nothingHere } = done.value;
      console.info(`${erased} erased again; of ${nothingHere} nothing is here.`);
      return 0;
    } finally {
      await boss.stop({ graceful: false, wait: true });
      objects.close();
    }
  } finally {
    await orm.close();
  }
});
