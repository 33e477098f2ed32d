import type PgBoss from 'pg-boss';
import { makePreviews } from '@/services/file/make-previews';
import { sweepUpload } from '@/services/file/upload/sweep-upload';
import { signCheckpoint } from '@/services/ledger/checkpoint/sign-checkpoint';
import { removeObjects } from '@/services/ledger/erasure/remove-objects';
import { proveForNotice } from '@/services/ledger/proof/prove-for-notice';
import { sendMail } from '@/services/mail/send-mail';
import { renderNotice } from '@/services/notice/render-notice';
import { remindDue } from '@/services/paperwork/remind-due';
import { remindOverdue } from '@/services/paperwork/remind-overdue';
import type { JobPayloads, Ports } from '@/services/ports';

type Handlers = {
  readonly [Q in keyof JobPayloads]: (ports: Ports, data: JobPayloads[Q]) => Promise<void>;
};

const handlers: Handlers = {
  'send-mail': (ports, mail) =>
    sendMail(ports, mail, async (seriesId, line) => {
      const proven = await proveForNotice(ports, seriesId, line);
      return proven.proof.checkpoint;
    }),
  'make-previews': makePreviews,
  'sign-checkpoint': signCheckpoint,
  'sweep-uploads': sweepUpload,
  'remind-due': async (ports) => {
    await remindDue(ports);
    await remindOverdue(ports);
  },
  'remove-objects': removeObjects,
  'render-notice': (ports, verdict) =>
    renderNotice(ports, verdict, (line) => proveForNotice(ports, verdict.seriesId, line)),
};

/** Done once an hour, however many processes work. */
const HOURLY = new Set(['remind-due']);

/** Works the queues in this process: one job of a kind at a time; a failed one is tried again later. */
export const startWorker = async (boss: PgBoss, ports: () => Ports): Promise<void> => {
  const nextHour = (queue: string) =>
    boss.send(queue, {}, { singletonKey: queue, singletonSeconds: 3_600, singletonNextSlot: true });
  for (const [queue, handle] of Object.entries(handlers)) {
    await boss.work(queue, { batchSize: 1, pollingIntervalSeconds: 0.5 }, async (jobs) => {
      for (const job of jobs) await handle(ports(), job.data as never);
      if (HOURLY.has(queue)) await nextHour(queue);
    });
    if (HOURLY.has(queue)) await nextHour(queue);
  }
};
