import type { EntityManager } from '@mikro-orm/postgresql';
import * as z from 'zod/mini';
import { findHex, sha256, utf8 } from '@/domain/ledger/bytes';
import { opens } from '@/domain/ledger/commitment';
import type { Line } from '@/domain/ledger/line';

/** What a `content-erased` line commits to under the role `erasure`: what was erased, not what it said. */
export const erasureDocument = z.strictObject({
  document: z.literal('tagwire/erasure'),
  version: z.literal('1'),
  reason: z.string(),
  /** Numbers and leaf hashes of the lines whose content went, and the roles. */
  contents: z.array(z.strictObject({ line: z.string(), leaf: z.string(), role: z.string() })),
  /** SHA-256 of the files that went. */
  files: z.array(z.string()),
});

export type ErasureDocument = z.infer<typeof erasureDocument>;

export interface Erasures {
  /** `line 7, report` */
  readonly contents: ReadonlySet<string>;
  /** Acts whose rows held the erased content. */
  readonly acts: ReadonlySet<string>;
  readonly files: ReadonlySet<string>;
}

/** What the ledger itself says was erased; only documents that their line commits to count. */
export const readErasures = async (
  em: EntityManager,
  seriesId: string,
  lines: ReadonlyMap<number, Line>,
): Promise<Erasures> => {
  const rows = await em.execute<{ index: string; salt: string | null; content: string | null }[]>(
    `select c.line_index as index, encode(c.salt, 'hex') as salt, c.content
     from record.ledger_content c
     join record.ledger_line l on l.series_id = c.series_id and l.index = c.line_index
     where c.series_id = ? and l.kind = 'content-erased' and c.role = 'erasure'`,
    [seriesId],
  );
  const contents = new Set<string>();
  const acts = new Set<string>();
  const files = new Set<string>();
  for (const { index, salt, content } of rows) {
    const line = lines.get(Number(index));
    const commitment = line?.commitments.find(({ role }) => role === 'erasure')?.commitment;
    const expected = findHex(commitment ?? '', 32);
    const salted = findHex(salt ?? '', 32);
    if (expected === undefined || salted === undefined || content === null) continue;
    if (!opens(expected, salted, sha256(utf8(content)))) continue;
    const read = erasureDocument.safeParse(JSON.parse(content));
    if (!read.success) continue;
    for (const { line: erased, role } of read.data.contents) {
      contents.add(`line ${erased}, ${role}`);
      const act = lines.get(Number(erased))?.act;
      if (act !== undefined) acts.add(act);
    }
    for (const file of read.data.files) files.add(file);
  }
  return { contents, acts, files };
};
