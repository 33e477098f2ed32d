import type { Client } from 'pg';
import { openDatabase } from '@/adapters/database/orm';
import type { RowsDocument } from '@/services/act/with-rows';
import { digestsNow } from '@/services/ledger/audit/act-digests';
import { auditLedger } from '@/services/ledger/audit/audit-ledger';
import type { Objects } from '@/services/ports';
import { type Bench, demand, perSecond, say, timed } from './measure';

const noObjects: Objects = {
  presignPut: () => Promise.reject(new Error('There are no objects here.')),
  findHead: () => Promise.resolve(undefined),
  read: () => Promise.reject(new Error('There are no objects here.')),
  write: () => Promise.resolve(),
  remove: () => Promise.resolve(),
};

/** The whole audit, and beside it what its digests of rows cost when each line asks for its own. */
export const benchAudit = async (
  { series, total }: Bench,
  app: Client,
  appUrl: string,
): Promise<void> => {
  const orm = await openDatabase(appUrl, 2);
  try {
    const asked = { seriesId: series, heads: [], keys: [] };
    const audit = await timed(() => auditLedger({ db: orm.em.fork(), objects: noObjects }, asked));
    demand(audit.value.faults.length === 0, audit.value.faults[0]?.words ?? 'the audit');
    demand(audit.value.lines === total, 'the number of lines audited');
    say(`audited whole        ${total.toLocaleString('en')} lines, ${perSecond(total, audit.ms)}`);
    const some = Math.min(20_000, total);
    const { rows } = await app.query<{ act: string; content: string }>(
      `select l.act_id as act, c.content from record.ledger_line l
       join record.ledger_content c on c.series_id = l.series_id and c.line_index = l.index
       where l.series_id = $1 and c.role = 'rows' order by l.index limit $2`,
      [series, some],
    );
    const single = await timed(async () => {
      for (const { act, content } of rows) {
        const { columns, digest } = JSON.parse(content) as RowsDocument;
        const now = await app.query<{ digest: string }>(
          "select append.act_digest($1, $2, $3) ->> 'digest' as digest",
          [act, Object.keys(columns), JSON.stringify(columns)],
        );
        demand(now.rows[0]?.digest === digest, 'the digest of an act’s rows');
      }
    });
    const named = rows.map(({ act, content }, line) => ({
      act,
      line,
      document: JSON.parse(content) as RowsDocument,
    }));
    const many = await timed(async () => {
      for (let from = 0; from < named.length; from += 500) {
        const block = named.slice(from, from + 500);
        const digests = await digestsNow(orm.em.fork(), block);
        demand(
          block.every(({ line, document }) => digests.get(line) === document.digest),
          'the digests of a block',
        );
      }
    });
    say(
      `digests of rows      ${some.toLocaleString('en')} lines, ${perSecond(some, many.ms)}, 500 lines a query`,
    );
    say(
      `                     for comparison, by a query a line: ${some.toLocaleString('en')} lines, ${perSecond(some, single.ms)}`,
    );
  } finally {
    await orm.close();
  }
};
