import { randomBytes, randomUUID } from 'node:crypto';
import type { Client } from 'pg';
import { toHex, utf8 } from '@/domain/ledger/bytes';
import { canonicalJson } from '@/domain/ledger/canonical';
import { commit } from '@/domain/ledger/commitment';
import { lineLeaf, lineText } from '@/domain/ledger/line';

interface Content {
  readonly role: string;
  readonly salt: Uint8Array;
  readonly content: string;
}

const lineOf = (
  seriesId: string,
  index: number,
  act: string,
  contents: readonly Content[],
): string =>
  lineText({
    series: seriesId,
    index,
    kind: 'report-signed',
    at: new Date().toISOString(),
    act,
    commitments: Object.fromEntries(
      contents.map(({ role, salt, content }) => [role, toHex(commit(salt, utf8(content)))]),
    ),
  });

const newContent = (role: string, content: string): Content => ({
  role,
  salt: randomBytes(32),
  content,
});

export const newLine = (seriesId: string, index: number): string =>
  lineOf(seriesId, index, randomUUID(), [newContent('report', `report ${index}`)]);

/** A line as an act writes it: claimed, answered, with the digest of its rows. */
export const appendLine = async (client: Client, seriesId: string): Promise<void> => {
  const act = randomUUID();
  await client.query('select append.claim_act($1, $2, null, $3, $4)', [
    act,
    seriesId,
    'bench',
    randomBytes(32),
  ]);
  const closed = await client.query<{ rows: object; index: string }>(
    'select * from append.close_act($1, $2, $3, $4)',
    [act, '{"value":null}', ['act'], seriesId],
  );
  const rows = canonicalJson({
    document: 'tagwire/act-rows',
    version: '1',
    ...closed.rows[0]?.rows,
    open: ['report'],
  });
  const index = Number(closed.rows[0]?.index);
  const contents = [newContent('report', `report ${index}`), newContent('rows', rows)];
  await client.query('select append.ledger_line($1, $2, $3, $4, $5, $6::jsonb)', [
    seriesId,
    index,
    'report-signed',
    lineOf(seriesId, index, act, contents),
    act,
    JSON.stringify(
      contents.map(({ role, salt, content }) => ({
        role,
        open: role === 'report',
        salt: `\\x${toHex(salt)}`,
        content,
      })),
    ),
  ]);
};

/** The same row by a plain insert. */
export const insertPlainly = async (
  client: Client,
  seriesId: string,
  index: number,
): Promise<void> => {
  const line = newLine(seriesId, index);
  await client.query('insert into public.bench_plain values ($1, $2, $3, $4, $5, $6)', [
    seriesId,
    index,
    'report-signed',
    line,
    lineLeaf(line),
    randomUUID(),
  ]);
};
