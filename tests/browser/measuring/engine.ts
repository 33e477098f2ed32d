import { createHash, randomBytes, randomUUID } from 'node:crypto';
import pg from 'pg';
import type { Page } from 'playwright-core';
import type { Clause } from '@/domain/rulebook/clause';
import { TAPPET_RULE_SET } from '@/domain/rulebook/rule-sets/tappet';
import { SESSION_COOKIE } from '@/http/session-cookie';
import type { Visitor } from '../../support/browser';
import { readProduct } from '../../support/product';

export const INSPECTOR = 'Oona Brannick';
export const CHIEF = 'Marit Quell';

const query = async <R extends pg.QueryResultRow>(
  sql: string,
  values: readonly unknown[],
): Promise<readonly R[]> => {
  const client = new pg.Client({ connectionString: readProduct().superuserUrl });
  await client.connect();
  try {
    return (await client.query<R>(sql, [...values])).rows;
  } finally {
    await client.end();
  }
};

const clause = (number: string): Clause => {
  const found = TAPPET_RULE_SET.clauses.find((one) => one.number === number);
  if (found === undefined) throw new Error(`The rule set has no clause ${number}.`);
  return found;
};

/** Body, clearance and a go gauge, all mandatory: what a screened engine is held against. */
export const SCREENED: readonly Clause[] = [
  clause('4.2'),
  { ...clause('4.6'), force: 'mandatory' },
  {
    number: '4.8',
    heading: 'Go gauge',
    words: 'A go gauge of 0.8430 in passes through every lifter bore.',
    force: 'mandatory',
    requirement: {
      kind: 'plug-gauge',
      subject: 'bore-go-gauge',
      size: { text: '0.8430', unit: 'in' },
      gauge: 'go',
      where: 'through the lifter bore',
      per: 'bore',
    },
  },
];

export interface OpenEngine {
  readonly id: string;
  readonly path: string;
}

let made = 0;

/**
 * Puts an open inspection into the demo by hand: the engine of car 88 with sixteen lifter bores, under
 * rules of its own, with nothing read yet.
 */
export const openEngine = async (clauses: readonly Clause[]): Promise<OpenEngine> => {
  const [found] = await query<{ series_id: string; entry_id: string; id: string; rules: string }>(
    `select i.series_id, i.entry_id, i.id, r.document as rules
     from public.inspection i
     join public.entry e on e.series_id = i.series_id and e.id = i.entry_id
     join record.rules r on r.series_id = i.series_id and r.hash = i.rules_hash
     where e.car_number = '88'`,
    [],
  );
  if (found === undefined) throw new Error('The demo has no car 88.');
  const rules = JSON.stringify({ ...JSON.parse(found.rules), clauses, bulletins: [], waivers: [] });
  const [entry, inspection] = [randomUUID(), randomUUID()];
  made += 1;
  const car = `9${(Date.now() + made).toString(36).slice(-5)}`.toUpperCase();
  const copy = async (table: string, id: string, change: Readonly<Record<string, unknown>>) => {
    await query(
      `insert into public.${table}
       select (jsonb_populate_record(t, $3::jsonb)).* from public.${table} t
       where t.series_id = $1 and t.id = $2`,
      [found.series_id, id, JSON.stringify(change)],
    );
  };
  await copy('entry', found.entry_id, {
    id: entry,
    car_number: car,
    competitor_id: null,
    paperwork_id: null,
    position: null,
  });
  const [hash] = await query<{ hash: string }>(
    `select encode(append.rules($1, $2), 'hex') as hash`,
    [found.series_id, rules],
  );
  await copy('inspection', found.id, {
    id: inspection,
    entry_id: entry,
    paperwork_id: null,
    paperwork_number: null,
    rules_hash: `\\x${hash?.hash ?? ''}`,
    state: 'open',
    state_reason: '',
    correction_reason: '',
    closed_at: null,
  });
  return { id: inspection, path: `/barn/inspections/${inspection}/measure` };
};

/** Puts a gauge into the demo's register by hand, in calibration tonight. */
export const addGauge = async (
  code: string,
  description: Readonly<Record<string, unknown>>,
): Promise<void> => {
  await query(
    `insert into public.gauge
     select (jsonb_populate_record(g, $1::jsonb)).* from public.gauge g where g.code = 'MIC-014'`,
    [
      JSON.stringify({
        id: randomUUID(),
        code,
        description: {
          calibratedOn: '2020-01-01',
          dueOn: '2099-12-31',
          ...description,
        },
      }),
    ],
  );
};

export interface Kept {
  readonly readings: readonly {
    readonly quantity: string;
    readonly place: string;
    readonly value: string;
    readonly set: number;
    readonly by: string;
    readonly standing: string;
  }[];
  readonly zeros: number;
  readonly remarks: Readonly<Record<string, number>>;
}

/** What the server has of an inspection. */
export const keptOf = async (id: string): Promise<Kept> => {
  const readings = await query<Kept['readings'][number]>(
    `select quantity, cylinder || ' ' || valve as place, value_text as value, set_number as set,
            taken_by as by, standing
     from record.reading where inspection_id = $1 order by occurred_at, id`,
    [id],
  );
  const [zeros] = await query<{ n: number }>(
    'select count(*)::int as n from record.zero where inspection_id = $1',
    [id],
  );
  const remarks = await query<{ kind: string; n: number }>(
    'select kind, count(*)::int as n from record.remark where inspection_id = $1 group by kind',
    [id],
  );
  return {
    readings,
    zeros: zeros?.n ?? 0,
    remarks: Object.fromEntries(remarks.map(({ kind, n }) => [kind, n])),
  };
};

/** A session of a person, put in by hand; gives the cookie's value. */
export const sessionOf = async (name: string): Promise<string> => {
  const token = randomBytes(32).toString('hex');
  await query(
    `insert into public.session (id, token_hash, person_id, method, created_at, authenticated_at, seen_at, expires_at)
     select $1, $2, id, 'email-link', now(), now(), now(), now() + interval '1 hour'
     from public.person where name = $3`,
    [randomUUID(), createHash('sha256').update(token).digest(), name],
  );
  return token;
};

/** Enters the sheet as this person, by a session put in by hand, and waits until it takes keys. */
export const openSheet = async (
  { context, page, open }: Pick<Visitor, 'context' | 'page' | 'open'>,
  path: string,
  name = INSPECTOR,
): Promise<void> => {
  const value = await sessionOf(name);
  await context.addCookies([{ name: SESSION_COOKIE, value, url: readProduct().publicUrl }]);
  await open(path);
  await sheetReady(page);
};

export const sheetReady = (page: Page): Promise<void> =>
  page.locator('.measuring[data-ready="yes"]').waitFor();
