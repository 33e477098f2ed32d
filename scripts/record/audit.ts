import { readFileSync } from 'node:fs';
import { openDatabase } from '@/adapters/database/orm';
import { openObjects } from '@/adapters/objects/s3';

import { auditLedger } from '@/services/ledger/audit/audit-ledger';
import { readArguments, run } from './arguments';
import { openInstallation } from './environment';

const usage = `usage: npm run audit -- [signed head…] [--key <verifier key>]
  Holds everything in the database and the object store against the ledgers, with the environment of
  the server. Each file is a signed head from a receipt, a notice or the feed: what nobody here could change.
  --key  the series' key as you got it elsewhere
  Ends with 0: all is as it was recorded; 1: not.`;

await run(usage, async () => {
  const { files, flags } = readArguments(['key']);
  const heads = files.map((file) => readFileSync(file, 'utf8'));
  const { config } = openInstallation();
  const orm = await openDatabase(config.databaseUrl, 2);
  const objects = openObjects(config.objects);
  try {
    const series = await orm.em
      .fork()
      .execute<{ id: string; name: string }[]>('select id, name from public.series order by name');
    const known = new Set(series.map(({ id }) => id));
    let faults = 0;
    const seriesOf = (head: string) => head.split('\n', 1)[0]?.split('/').at(-1) ?? '';
    for (const head of heads) {
      if (known.has(seriesOf(head))) continue;
      console.error(`A head was brought of ${seriesOf(head)}, which is not kept here.`);
      faults += 1;
    }
    for (const { id, name } of series) {
      const audit = await auditLedger(
        { db: orm.em.fork(), objects },
        {
          seriesId: id,
          heads: heads.filter((head) => seriesOf(head) === id),
          keys: (flags['key'] ?? '').includes(id) ? [flags['key'] ?? ''] : [],
        },
      );
      console.info(
        `${name}: ${audit.lines} lines, ${audit.heads} signed heads, ${audit.faults.length} faults`,
      );
      for (const { where, what, words } of audit.faults)
        console.info(`  ${where}: ${what}: ${words}`);
      faults += audit.faults.length;
    }
    return faults === 0 ? 0 : 1;
  } finally {
    objects.close();
    await orm.close();
  }
});
