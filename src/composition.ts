import type { MikroORM } from '@mikro-orm/postgresql';
import { openBarnFeed } from '@/adapters/database/barn-news';
import { openDatabase } from '@/adapters/database/orm';
import { openIdentityProvider } from '@/adapters/identity/oidc';
import { images } from '@/adapters/images/sharp';
import { openJobs } from '@/adapters/jobs';
import { openHeadMemory } from '@/adapters/ledger/head-memory';
import { openLedgerKeys } from '@/adapters/ledger/keys';
import { openMailer } from '@/adapters/mail/smtp';
import { openObjects } from '@/adapters/objects/s3';
import { noticePrinter } from '@/adapters/pdf/notice-printer';
import { nonCompliancePrinter } from '@/adapters/pdf/part/non-compliance-printer';
import { tagPrinter } from '@/adapters/pdf/part/tag-printer';
import { rulebookPrinter } from '@/adapters/pdf/rulebook-printer';
import { systemClock, systemRandom } from '@/adapters/system/system';
import { type Config, readConfig } from '@/config';
import { watchRecord } from '@/services/ledger/restore/watch-record';
import type { Ports } from '@/services/ports';
import { startWorker } from '@/worker/start-worker';

export interface Composition {
  readonly config: Config;
  /** The ports of one request or job, with an entity manager of its own. */
  ports(): Ports;
  /** Whether database and object store answer. */
  ready(): Promise<boolean>;
  startWorker(): Promise<void>;
  /** Ends the answers that stay open, so that a stop need not wait for them. */
  endStreams(): Promise<void>;
  close(): Promise<void>;
}

/** The only place where adapters are built and handed out. */
export const compose = async (config: Config): Promise<Composition> => {
  const orm: MikroORM = await openDatabase(config.databaseUrl);
  const { boss, jobs } = await openJobs(config.databaseUrl, (error) =>
    console.error(`jobs: ${error.message}`),
  );
  const barn = openBarnFeed(config.databaseUrl, (error) => console.error(`barn: ${error.message}`));
  const objects = openObjects(config.objects);
  const mailer = openMailer(config.mail.url, config.mail.bounces);
  const identity = openIdentityProvider({
    ...config.identity,
    redirectUri: `${config.publicUrl}/sign-in/return`,
  });
  const keys = openLedgerKeys(config.ledger);
  const heads = openHeadMemory(config.storageDir);
  const recordState = watchRecord(() => ({ db: orm.em.fork(), heads }));
  const ports = (): Ports => ({
    db: orm.em.fork(),
    clock: systemClock,
    random: systemRandom,
    jobs,
    objects,
    uploads: objects.uploads,
    images,
    mailer,
    identity,
    notices: noticePrinter,
    rulebooks: rulebookPrinter,
    tags: tagPrinter,
    nonCompliances: nonCompliancePrinter,
    keys,
    heads,
    recordState,
    barn,
    site: { publicUrl: config.publicUrl, mailFrom: config.mail.from },
  });
  return {
    config,
    ports,
    ready: () => orm.isConnected(),
    startWorker: () => startWorker(boss, ports),
    endStreams: () => barn.close(),
    close: async () => {
      await barn.close();
      await boss.stop({ graceful: true, wait: true, timeout: 10_000 });
      mailer.close();
      objects.close();
      await orm.close();
    },
  };
};

let running: Promise<Composition> | undefined;

/** The process's one composition, made on first use from the environment. */
export const composition = (): Promise<Composition> => {
  running ??= compose(readConfig());
  return running;
};
