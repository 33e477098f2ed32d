import type pg from 'pg';

/**
 * Route parameters of the demo by what stands before them; all of them Wren Halloway's or the series'.
 *
 * @throws Error when the demo has none of a kind
 */
export async function demoParameters(client: pg.Client): Promise<ReadonlyMap<string, string>> {
  const one = async (sql: string, values: unknown[] = []): Promise<string> => {
    const found = await client.query(sql, values);
    const value: unknown = Object.values(found.rows[0] ?? {})[0];
    if (value === undefined) throw new Error(`The demo has nothing for: ${sql}`);
    return String(value);
  };
  const seriesId = await one("select id from public.series where slug = 'corran-valley'");
  const wren = await one("select id from public.person where name = 'Wren Halloway'");
  const paperwork = await one('select id from public.paperwork where competitor_id = $1', [wren]);
  const inspection = await one(
    `select i.id from public.inspection i join public.entry e on e.series_id = i.series_id and e.id = i.entry_id
     where e.car_number = '12J'`,
  );
  const event = await one("select id from public.event where slug = 'round-1'");
  const raceClass = await one("select id from public.class where slug = 'street-eight'");
  const notice = await one('select number from record.verdict where inspection_id = $1', [
    inspection,
  ]);
  const all: Record<string, string> = {
    '/api/paperwork/[paperwork]': paperwork,
    '/paddock/paperwork/[id]': paperwork,
    '/paddock/engines/[id]': await one('select engine_id from public.paperwork where id = $1', [
      paperwork,
    ]),
    '/office/paperwork/[id]': paperwork,
    '/barn/inspections/[id]': inspection,
    '/api/inspections/[id]': inspection,
    '/office/verdicts/[inspection]': inspection,
    '/office/strokes/[inspection]': inspection,
    '/api/files/[file]': await one(
      "select id from public.file where paperwork_id = $1 and purpose = 'photograph'",
      [paperwork],
    ),
    '/api/sheets/[file]': await one(
      "select id from public.file where paperwork_id = $1 and purpose = 'sheet' and item = 'lifter-sheet'",
      [paperwork],
    ),
    '/series/[slug]/rulebooks/[class]': 'street-eight',
    '/series/[slug]/events/[event]': 'round-1',
    '/series/[slug]/verdicts/[number]': notice,
    '/paddock/verdicts/[number]': notice,
    '/api/verdicts/[series]/[number]': notice,
    '/api/ledger/[series]/notices/[number]': notice,
    '[width]': '160',
    '[sheet]': 'lifter-sheet',
    '[series]': seriesId,
    '[event]': event,
    '[entry]': await one("select id from public.entry where event_id = $1 and car_number = '12J'", [
      event,
    ]),
    '[class]': raceClass,
    '[draft]': await one('select id from public.rulebook_draft where class_id = $1', [raceClass]),
    '[gauge]': await one("select id from public.gauge where code = 'MIC-014'"),
    '[part]': await one('select id from record.held_part where inspection_id = $1', [inspection]),
    '/crib/[series]/[gauge]/faults/[fault]': await one('select id from record.gauge_fault'),
    '[slug]': 'corran-valley',
    '[number]': '1',
  };
  return new Map(Object.entries(all));
}

/** The route with the demo's own parameters, or with ones that nothing has. */
export function pathOf(
  route: string,
  parameters: ReadonlyMap<string, string>,
  known = true,
): string {
  const parts = route.split('/');
  return parts
    .map((part, at) => {
      if (!part.startsWith('[')) return part;
      if (!known) return part === '[slug]' ? 'no-such-series' : NOBODYS;
      return parameters.get(parts.slice(0, at + 1).join('/')) ?? parameters.get(part) ?? NOBODYS;
    })
    .join('/');
}

const NOBODYS = '01900000-0000-7000-8000-000000000000';
