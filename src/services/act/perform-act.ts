import type { EntityManager } from '@mikro-orm/postgresql';
import type { Actor } from '@/domain/access/permission';
import { type Failure, failure } from '@/domain/failure';
import { sha256, utf8 } from '@/domain/ledger/bytes';
import { canonicalJson } from '@/domain/ledger/canonical';
import { fail, type Result } from '@/domain/result';
import type { JobPayloads, Ports } from '../ports';
import { type AppendTable, hexBytes, type NewLedgerLine, nextLine, writeLine } from './append';
import { closeAct, withRows } from './with-rows';

export interface ActRequest {
  /** Client-made UUIDv7: the same one twice is the same act. */
  readonly id: string;
  /** A lasting name, `hand-in-paperwork`. */
  readonly kind: string;
  readonly seriesId: string | null;
  /** What was asked, as plain JSON; its hash tells a repeat from another act under the same id. */
  readonly input: unknown;
  /** Only the record of a restore is written while the record is closed for writing. */
  readonly whileReadOnly?: true;
}

/**
 * What a use case may do inside its act. Mutable rows change through `em`; appended rows, jobs and
 * ledger lines are collected and written after them, the ledger line last.
 */
export interface Act {
  readonly id: string;
  readonly em: EntityManager;
  readonly at: Date;
  append(table: AppendTable, rows: readonly Readonly<Record<string, unknown>>[]): void;
  send<Q extends keyof JobPayloads>(queue: Q, data: JobPayloads[Q], notBefore?: Date): void;
  line(line: NewLedgerLine): void;
  /** Stores a rules document by its hash, at once: rows of this act may point to it. */
  keepRules(seriesId: string, document: string): Promise<Uint8Array>;
}

export type ActDeps = Pick<Ports, 'db' | 'clock' | 'random' | 'jobs'> &
  // Every request's ports carry it; a use case need not name it.
  Partial<Pick<Ports, 'recordState'>>;

class Abandon extends Error {
  constructor(readonly failure: Failure) {
    super(failure.name);
  }
}

/**
 * Runs one act in one transaction: claim, mutable rows, appended rows, jobs, the answer, and last
 * the ledger lines, whose lock is then held through the commit only. A repeat gets the stored
 * answer; the same id with other content is refused; a failure undoes everything, the claim too.
 *
 * @returns the work's own result; the value must be plain JSON, since it is stored as the answer.
 */
export const performAct = async <T>(
  deps: ActDeps,
  actor: Pick<Actor, 'personId'> | null,
  request: ActRequest,
  work: (act: Act) => Promise<Result<T, Failure>>,
): Promise<Result<T, Failure>> => {
  const { id, kind, seriesId, input } = request;
  const obstacle = request.whileReadOnly ? undefined : await deps.recordState?.findObstacle();
  if (obstacle !== undefined) return fail(obstacle);
  const requestHash = sha256(utf8(canonicalJson({ kind, seriesId, input })));
  try {
    return await deps.db.fork().transactional(async (em) => {
      const [claim] = await em.execute<
        { fresh: boolean; same: boolean; answer: { value: T } | null }[]
      >('select * from append.claim_act(?, ?, ?, ?, ?)', [
        id,
        seriesId,
        actor?.personId ?? null,
        kind,
        Buffer.from(requestHash),
      ]);
      if (claim === undefined || !claim.same || (!claim.fresh && claim.answer === null)) {
        return fail(
          failure(
            'same-id-other-content',
            'This was sent before with other content. Open the page again and send it anew.',
          ),
        );
      }
      if (!claim.fresh && claim.answer !== null) return { ok: true, value: claim.answer.value };

      const appends: [AppendTable, readonly Readonly<Record<string, unknown>>[]][] = [];
      const jobs: (() => Promise<void>)[] = [];
      const lines: NewLedgerLine[] = [];
      const act: Act = {
        id,
        em,
        at: deps.clock.now(),
        append: (table, rows) => void (rows.length > 0 && appends.push([table, rows])),
        send: (queue, data, notBefore) =>
          void jobs.push(() => deps.jobs.send(em, queue, data, notBefore)),
        line: (line) => void lines.push(line),
        keepRules: async (series, document) => {
          const [row] = await em.execute<{ rules: Buffer }[]>(
            'select append.rules(?, ?) as rules',
            [series, document],
          );
          if (row === undefined) throw new Error('append.rules gave no hash');
          return row.rules;
        },
      };
      const result = await work(act);
      if (!result.ok) throw new Abandon(result.failure);
      await em.flush();
      for (const [table, rows] of appends) {
        await em.execute(`select append.${table}(?::jsonb)`, [
          JSON.stringify(rows.map((row) => hexBytes({ act_id: id, ...row }))),
        ]);
      }
      for (const line of lines) {
        jobs.push(() => deps.jobs.send(em, 'sign-checkpoint', { seriesId: line.seriesId }));
      }
      for (const send of jobs) await send();
      const answer = JSON.stringify({ value: result.value ?? null });
      const [first, ...others] = lines;
      if (first === undefined) {
        await em.execute('select append.answer_act(?, ?::jsonb)', [id, answer]);
        return result;
      }
      const tables = ['act', ...appends.map(([table]) => table)];
      const { rows, index } = await closeAct(em, id, answer, tables, first.seriesId);
      await writeLine(em, deps.random, { act: id, at: act.at, index }, withRows(first, rows));
      for (const line of others) {
        const of = { act: id, at: act.at, index: await nextLine(em, line.seriesId) };
        await writeLine(em, deps.random, of, withRows(line, rows));
      }
      return result;
    });
  } catch (error) {
    if (error instanceof Abandon) return fail(error.failure);
    throw error;
  }
};
