import { randomUUID } from 'node:crypto';
import { rmSync } from 'node:fs';
import { join } from 'node:path';
import { migrate } from '@/adapters/database/migrate';
import { startCluster } from '../postgres/cluster.mjs';
import { connect } from '../postgres/roles.mjs';
import { ensurePostgres } from '../set-up/packages.mjs';
import { rememberedPorts } from '../set-up/ports.mjs';
import { newTemporaryFolder } from '../set-up/temporary.mjs';
import { benchAppending } from './ledger/append';
import { benchAudit } from './ledger/audit';
import type { Bench } from './ledger/measure';
import { benchMemory } from './ledger/memory';
import { benchVerifying } from './ledger/verify';

/**
 * Appends lines to a ledger on a throw-away PostgreSQL, beside plain inserts of the same rows, then
 * verifies and audits all of it. A line is written as an act writes it: claimed, answered, with the
 * digest of its rows. Usage: npx tsx scripts/bench/ledger.ts [lines, default 100000]
 */
const bench: Bench = { series: randomUUID(), total: Number(process.argv[2] ?? 100_000) };

await ensurePostgres();
const home = await newTemporaryFolder('tagwire-bench-');
const { database } = await rememberedPorts(join(home, 'ports.json'), ['database']);
if (database === undefined) throw new Error('No free port.');
const cluster = await startCluster({ home, port: database });
try {
  await migrate({ ownerUrl: cluster.ownerUrl });
  const [app, owner] = await Promise.all([connect(cluster.appUrl), connect(cluster.ownerUrl)]);
  await benchMemory(bench);
  await benchAppending(bench, app, owner);
  await benchVerifying(bench, app);
  await benchAudit(bench, app, cluster.appUrl);
  await Promise.all([app.end(), owner.end()]);
} finally {
  await cluster.stop();
  rmSync(home, { recursive: true, force: true });
}
