import { rmSync } from 'node:fs';
import { join } from 'node:path';
import type { TestProject } from 'vitest/node';
import { migrate } from '@/adapters/database/migrate';
import { type Cluster, startCluster } from '../../scripts/postgres/cluster.mjs';
import { connect, createDatabase, withDatabase } from '../../scripts/postgres/roles.mjs';
import { ensurePostgres } from '../../scripts/set-up/packages.mjs';
import { rememberedPorts } from '../../scripts/set-up/ports.mjs';
import { newTemporaryFolder } from '../../scripts/set-up/temporary.mjs';

export interface TestCluster {
  readonly superuserUrl: string;
  readonly ownerUrl: string;
  readonly appUrl: string;
  readonly template: string;
}

declare module 'vitest' {
  interface ProvidedContext {
    cluster: TestCluster;
  }
}

type Urls = Pick<Cluster, 'superuserUrl' | 'ownerUrl' | 'appUrl'>;

interface Shared {
  readonly ready: Promise<{ cluster: TestCluster; close: () => Promise<void> }>;
  users: number;
}

// Each project loads this module anew, in one process: what they share hangs on the process.
const home = globalThis as typeof globalThis & { tagwireTestCluster?: Shared };

const given = (name: string): string => {
  const value = process.env[name];
  if (value === undefined) throw new Error(`${name} must be set beside TEST_CLUSTER_URL.`);
  return value;
};

async function openCluster(): Promise<{ urls: Urls; stop: () => Promise<void> }> {
  const superuserUrl = process.env['TEST_CLUSTER_URL'];
  if (superuserUrl !== undefined && superuserUrl !== '') {
    const urls = {
      superuserUrl,
      ownerUrl: given('TEST_CLUSTER_OWNER_URL'),
      appUrl: given('TEST_CLUSTER_APP_URL'),
    };
    return { urls, stop: async () => undefined };
  }
  await ensurePostgres();
  const folder = await newTemporaryFolder('tagwire-cluster-');
  const ports = await rememberedPorts(join(folder, 'ports.json'), ['database']);
  const cluster = await startCluster({ home: folder, port: ports.database });
  const stop = async () => {
    await cluster.stop();
    rmSync(folder, { recursive: true, force: true });
  };
  return { urls: cluster, stop };
}

async function prepare() {
  const { urls, stop } = await openCluster();
  const template = `template_${process.pid}`;
  try {
    const superuser = await connect(urls.superuserUrl);
    await createDatabase(superuser, template);
    await superuser.end();
    await migrate({ ownerUrl: withDatabase(urls.ownerUrl, template) });
  } catch (error) {
    await stop();
    throw error;
  }
  const { superuserUrl, ownerUrl, appUrl } = urls;
  const close = async () => {
    const superuser = await connect(superuserUrl);
    await superuser.query(`drop database "${template}" with (force)`);
    await superuser.end();
    await stop();
  };
  return { cluster: { superuserUrl, ownerUrl, appUrl, template }, close };
}

/** Vitest's global set-up: one cluster and one migrated template for all projects of a run. */
export default async function setup(project: TestProject): Promise<() => Promise<void>> {
  home.tagwireTestCluster ??= { ready: prepare(), users: 0 };
  const shared = home.tagwireTestCluster;
  shared.users += 1;
  const { cluster, close } = await shared.ready;
  project.provide('cluster', cluster);
  return async () => {
    shared.users -= 1;
    if (shared.users === 0) await close();
  };
}
