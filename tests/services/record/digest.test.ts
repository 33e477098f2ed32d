import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import type { RowsDocument } from '@/services/act/with-rows';
import { get } from '../../support/bay';
import { openRecordWorld, type RecordWorld, writeLine } from '../../support/record';
import { addSeries } from '../../support/world';

let world: RecordWorld;
beforeAll(async () => {
  world = await openRecordWorld();
});
afterAll(() => world.close());

describe('the digest of an act’s rows', () => {
  it('covers every column of the act’s own row, and is the same read by its columns’ names', async () => {
    const seriesId = await addSeries(world);
    const index = get(await writeLine(world.ports(), seriesId, 'car 1'));
    const { db } = world.ports();
    const [kept] = await db.execute<{ act: string; content: string }[]>(
      `select l.act_id as act, c.content from record.ledger_line l
       join record.ledger_content c on c.series_id = l.series_id and c.line_index = l.index
       where l.series_id = ? and l.index = ? and c.role = 'rows'`,
      [seriesId, index],
    );
    const { columns, digest } = JSON.parse(kept?.content ?? '{}') as RowsDocument;
    const catalogue = await db.execute<{ name: string }[]>(
      `select attname as name from pg_attribute
       where attrelid = 'record.act'::regclass and attnum > 0 and not attisdropped order by attnum`,
    );
    expect(columns['act']).toEqual(catalogue.map(({ name }) => name));
    for (const zone of ['Asia/Tokyo', 'UTC']) {
      const [now] = await db.fork().transactional(async (em) => {
        await em.execute(`set local timezone = '${zone}'`);
        return em.execute<{ named: string; own: string }[]>(
          `select append.act_digest(?, ?::text[], ?::jsonb) ->> 'digest' as named,
                  append.act_digest(?, ?::text[], null) ->> 'digest' as own`,
          [kept?.act, '{act}', JSON.stringify(columns), kept?.act, '{act}'],
        );
      });
      expect(now).toEqual({ named: digest, own: digest });
    }
  });
});
