import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { readCaseFile } from '@/contracts/case-file/case-file';
import { checkCaseFile } from '@/contracts/case-file/check-case-file';
import { toHex } from '@/domain/ledger/bytes';
import { formatVerifierKey } from '@/domain/ledger/note/verifier-key';
import { findGaugeHistory } from '@/services/gauge/find-gauge-history';
import { recordGaugeCheck } from '@/services/gauge/record-gauge-check';
import { reportGaugeBad } from '@/services/gauge/report-gauge-bad';
import { actOnReview } from '@/services/gauge/review/act-on-review';
import { findFault } from '@/services/gauge/review/find-fault';
import { listReviews } from '@/services/gauge/review/list-reviews';
import { saveGauge } from '@/services/gauge/save-gauge';
import { assessFile } from '@/services/inspection/read/assess-file';
import { signReport } from '@/services/inspection/report/sign-report';
import { exportCaseFile } from '@/services/ledger/case-file/export-case-file';
import { findNotice } from '@/services/public/find-notice';
import { publishVerdict } from '@/services/verdict/publish-verdict';
import { saveVerdictDraft } from '@/services/verdict/save-verdict-draft';
import {
  failureOf,
  fileOf,
  gaugeFigures,
  get,
  openInspection,
  openRaceNight,
  type RaceNight,
  rowsFor,
  send,
} from '../../support/bay';
import { openRecordWorld, type RecordWorld, signNow } from '../../support/record';
import { BREACH, NO_BREACH } from '../../support/verdict-case';
import { addActor } from '../../support/world';

let world: RecordWorld;
let night: RaceNight;

const uuid = () => world.ports().random.uuid();
const inch = (text: string) => ({ text, unit: 'in' });

beforeAll(async () => {
  world = await openRecordWorld();
  night = await openRaceNight(world);
});
afterAll(() => world.close());

const check = (more: Partial<Parameters<typeof recordGaugeCheck>[2]> = {}, by = night.inspector) =>
  recordGaugeCheck(world.ports(), by, {
    act: uuid(),
    id: uuid(),
    seriesId: night.seriesId,
    gaugeId: night.micrometer,
    kind: 'ring',
    ringId: night.ring,
    eventId: night.eventId,
    inspectionId: null,
    readings: [inch('0.8440'), inch('0.8441')],
    expected: inch('0.8440'),
    allowed: inch('0.0001'),
    witness: '',
    note: '',
    checkedAt: '2026-07-12T02:10:00.000Z',
    ...more,
  });

const sign = async (inspectionId: string) => {
  const head = toHex((await fileOf(world, night.inspector, inspectionId)).chain.head);
  const inspector = { ...night.inspector, authenticatedAt: world.clock.now().toISOString() };
  get(await signReport(world.ports(), inspector, { act: uuid(), inspectionId, head }));
};

const decide = async (inspectionId: string, content: typeof BREACH) => {
  const asked = { seriesId: night.seriesId, inspectionId };
  const draft = { act: uuid(), ...asked, version: null, content };
  const { version } = get(await saveVerdictDraft(world.ports(), night.official, draft));
  return publishVerdict(world.ports(), night.official, { act: uuid(), ...asked, version });
};

const gauge = (id: string) => ({
  calibrated: (calibratedOn: string, dueOn: string, more = {}) =>
    saveGauge(world.ports(), night.chief, {
      act: uuid(),
      seriesId: night.seriesId,
      id,
      code: 'MC-02',
      status: 'in-use',
      version: 0,
      description: { ...gaugeFigures.micrometer, calibratedOn, dueOn },
      ...more,
    }),
});

const linesOf = async (kind: string) =>
  world
    .ports()
    .db.execute<{ line: { refs: Record<string, string> } }[]>(
      'select line::jsonb as line from record.ledger_line where series_id = ? and kind = ? order by index',
      [night.seriesId, kind],
    );

describe('a check on the ring', () => {
  it('is kept with its largest difference, and whether that is within what is allowed', async () => {
    expect(get(await check())).toMatchObject({ difference: inch('0.0001'), good: true });
    const off = get(await check({ readings: [inch('0.8438')] }));
    expect(off).toMatchObject({ difference: inch('-0.0002'), good: false });
    const lines = await linesOf('gauge-checked');
    expect(lines.map(({ line }) => line.refs['gauge'])).toEqual([
      night.micrometer,
      night.micrometer,
    ]);
  });

  it('is for those who inspect in the series', async () => {
    for (const actor of [night.competitor, night.official])
      expect(failureOf(await check({}, actor)).name).toBe('absent');
    const stranger = await addActor(world, 'A Stranger', []);
    expect(failureOf(await check({}, stranger)).name).toBe('absent');
    expect(failureOf(await check({ gaugeId: uuid() })).name).toBe('absent');
  });

  it('is no check on a ring that is none, that is overdue, or in the future', async () => {
    const pointers = async (more: Parameters<typeof check>[0]) =>
      failureOf(await check(more)).faults?.map(({ pointer }) => pointer);
    expect(await pointers({ ringId: night.dial })).toEqual(['/ringId']);
    expect(await pointers({ kind: 'zero' })).toEqual(['/ringId']);
    expect(await pointers({ checkedAt: '2026-07-12T04:00:00.000Z' })).toEqual(['/checkedAt']);
    const ring = uuid();
    const overdue = { ...gaugeFigures.ring, dueOn: '2026-07-01' };
    const entered = {
      seriesId: night.seriesId,
      id: ring,
      code: 'SR-09',
      status: 'in-use',
    } as const;
    get(
      await saveGauge(world.ports(), night.chief, {
        act: uuid(),
        ...entered,
        description: overdue,
        version: 0,
      }),
    );
    const refused = failureOf(await check({ ringId: ring }));
    expect(refused.faults?.[0]?.detail).toMatch(/proves nothing: gauge SR-09 was overdue/);
  });

  it('done twice under one act is done once', async () => {
    const same = { act: uuid(), id: uuid() };
    expect(get(await check(same))).toEqual(get(await check(same)));
  });
});

describe('a gauge past its due day', () => {
  it('supports no breach: the reading is kept and marked, and publishing is refused', async () => {
    const overdue = uuid();
    get(await gauge(overdue).calibrated('2025-03-02', '2026-03-02'));
    const inspectionId = await openInspection(world, night, '21');
    const rows = rowsFor(world, night);
    const reading = rows.reading({ gaugeId: overdue, value: inch('0.8460') });
    const answer = get(await send(world, night.inspector, inspectionId, [reading]));
    expect(answer.marked).toEqual([
      { id: reading.id, reason: 'gauge MC-02 was overdue for calibration' },
    ]);
    await sign(inspectionId);
    const refused = failureOf(
      await decide(inspectionId, {
        ...BREACH,
        clauses: ['4.2'],
        againstComputedBecause: 'It is far too large by any gauge.',
      }),
    );
    expect(refused.faults?.map(({ pointer }) => pointer)).toEqual(['/clauses']);
    expect(refused.faults?.[0]?.detail).toMatch(
      /No breach of clause 4\.2 can be decided.*gauge MC-02 was overdue for calibration/,
    );
    const { rows: kept } = await fileOf(world, night.inspector, inspectionId);
    expect(kept.readings.map(({ value }) => value.text)).toEqual(['0.8460']);
  });
});

describe('a gauge found bad', () => {
  let breach: string;
  let sound: string;
  let notice: string;

  const bad = (more = {}, by = night.chief) =>
    reportGaugeBad(world.ports(), by, {
      act: uuid(),
      id: uuid(),
      seriesId: night.seriesId,
      gaugeId: night.micrometer,
      foundAt: '2026-07-14T15:00:00.000Z',
      off: inch('0.0004'),
      reason: 'It was dropped; it reads large on the ring.',
      ...more,
    });

  const mails = () =>
    world
      .ports()
      .db.execute<{ subject: string }[]>(
        "select subject from public.mail where kind = 'gauge-found-bad' order by subject",
      );

  const reports = () =>
    world.ports().db.execute<{ hash: string }[]>(
      `select encode(hash, 'hex') as hash from record.report
         union all select encode(hash, 'hex') from record.verdict order by 1`,
    );

  beforeAll(async () => {
    breach = await openInspection(world, night, '12J');
    sound = await openInspection(world, night, '7');
    const rows = rowsFor(world, night);
    const large = rows.reading({ value: inch('0.8460') });
    get(await send(world, night.inspector, breach, [large]));
    get(await send(world, night.inspector, sound, rows.fullBore('1')));
    await sign(breach);
    await sign(sound);
    notice = get(await decide(breach, { ...BREACH, clauses: ['4.2'] })).number;
  });

  it('is for the chief inspector to say, and not of the future', async () => {
    for (const actor of [night.inspector, night.official, night.competitor])
      expect(failureOf(await bad({}, actor)).name).toBe('absent');
    expect(failureOf(await bad({ gaugeId: uuid() })).name).toBe('absent');
    const ahead = failureOf(await bad({ foundAt: '2027-01-01T00:00:00.000Z' }));
    expect(ahead.faults?.[0]?.pointer).toBe('/foundAt');
  });

  it('before its last good check leaves what came before alone', async () => {
    world.clock.set('2026-07-14T16:00:00.000Z');
    get(await check({ gaugeId: night.dial, checkedAt: '2026-07-13T12:00:00.000Z' }));
    const id = uuid();
    const { reviews } = get(await bad({ id, gaugeId: night.dial }));
    expect(reviews).toBe(0);
    const fault = get(await findFault(world.ports(), night.official, { id }));
    expect(fault).toMatchObject({
      goodUntil: '2026-07-13T12:00:00.000Z',
      goodBecause: 'its last good check on the ring SR-03',
      lookBack: { reports: [], unsigned: [] },
    });
  });

  it('is withdrawn, opens a review of each verdict that relied on it, and changes none', async () => {
    const before = await reports();
    get(await check({ readings: [inch('0.8447')], checkedAt: '2026-07-14T14:00:00.000Z' }));
    const id = uuid();
    // The good check of the night came before the readings; the last one, of the 14th, was not good.
    const { reviews } = get(await bad({ id }));
    expect(reviews).toBe(1);
    expect(await reports()).toEqual(before);
    const fault = get(await findFault(world.ports(), night.official, { id }));
    expect(fault.goodUntil).toBe('2026-07-12T02:10:00.000Z');
    const relied = fault.lookBack.reports.map(({ carNumber, findings, verdict }) => ({
      carNumber,
      clauses: findings.map(({ clause }) => clause),
      verdict: verdict?.number ?? null,
    }));
    expect(relied.map(({ carNumber }) => carNumber)).toEqual(['12J', '7']);
    expect(relied[0]).toMatchObject({ clauses: expect.arrayContaining(['4.2']), verdict: notice });
    expect(relied[1]?.verdict).toBeNull();
    const file = await fileOf(world, night.inspector, sound);
    expect(file.gauges.find(({ id: one }) => one === night.micrometer)?.withdrawn).toBe(true);
    expect([...new Set((await mails()).map(({ subject }) => subject))]).toEqual([
      'Gauge DB-07 was found bad: no verdict relied on it',
      'Gauge MC-01 was found bad: 1 under review',
    ]);
    expect(await linesOf('gauge-found-bad')).toHaveLength(2);
  });

  it('makes what it read since support no breach in reports that are still open', async () => {
    const open = await openInspection(world, night, '31');
    const rows = rowsFor(world, night);
    get(await send(world, night.inspector, open, [rows.reading({ value: inch('0.8460') })]));
    const { findings } = assessFile(await fileOf(world, night.inspector, open));
    const finding = findings.find(({ clause }) => clause === '4.2');
    expect(finding?.perPosition.map(({ sentence }) => sentence).join()).toMatch(
      /gauge MC-01 was found bad/,
    );
  });

  it('leaves its verdict’s page alone until an official makes the review public', async () => {
    const [review] = get(await listReviews(world.ports(), night.official));
    if (review === undefined) throw new Error('no review');
    expect(review).toMatchObject({ notice, state: 'open', public: false, gauge: 'MC-01' });
    const shown = async () =>
      (await findNotice(world.ports(), { slug: 'corran-valley', number: notice }))?.review;
    expect(await shown()).toBeNull();
    const act = (to: 'made-public' | 'stands' | 'decide-again', reason = '', by = night.official) =>
      actOnReview(world.ports(), by, {
        act: uuid(),
        seriesId: night.seriesId,
        reviewId: review.reviewId,
        to,
        reason,
      });
    expect(failureOf(await act('stands', 'x', night.chief)).name).toBe('absent');
    get(await act('made-public'));
    expect(await shown()).toMatchObject({ state: 'open' });
    expect(failureOf(await act('made-public')).name).toBe('not-in-this-state');
    expect(failureOf(await act('stands')).faults?.[0]?.pointer).toBe('/reason');
    get(await act('stands', 'A second micrometer gave the same that night.'));
    expect(await shown()).toMatchObject({ state: 'stands' });
    expect(failureOf(await act('decide-again', 'x')).name).toBe('not-in-this-state');
    const open = await world.ports().db.execute<{ content: string; open: boolean }[]>(
      `select c.content, c.open from record.ledger_content c
         join record.ledger_line l on l.series_id = c.series_id and l.index = c.line_index
         where l.kind = 'verdict-review' and c.open order by l.index`,
    );
    expect(open.map(({ content }) => (JSON.parse(content) as { state: string }).state)).toEqual([
      'made-public',
      'stands',
    ]);
    expect(open.map(({ content }) => content).join()).not.toMatch(/second micrometer|Törnkvist/);
  });

  it('does not let whoever signed or read there say whether the verdict stands', async () => {
    const again = uuid();
    get(await bad({ id: again, foundAt: '2026-07-14T15:30:00.000Z' }));
    const fault = get(await findFault(world.ports(), night.official, { id: again }));
    const reviewId = fault.reviews[0]?.reviewId ?? '';
    const both = {
      ...night.inspector,
      standings: [{ seriesId: night.seriesId, role: 'official' as const }],
    };
    const asked = {
      act: uuid(),
      seriesId: night.seriesId,
      reviewId,
      to: 'stands',
      reason: 'x',
    } as const;
    expect(failureOf(await actOnReview(world.ports(), both, asked)).name).toBe(
      'conflict-of-interest',
    );
  });

  it('stands in its history with certificates, checks and what it measured', async () => {
    const history = get(
      await findGaugeHistory(world.ports(), night.inspector, { gaugeId: night.micrometer }),
    );
    expect(history.entries.map(({ status }) => status)).toEqual([
      'in-use',
      'withdrawn',
      'withdrawn',
    ]);
    expect(history.entries[0]?.certificate).toMatchObject({ number: 'C-1' });
    expect(history.checks.map(({ good }) => good)).toContain(false);
    expect(history.faults).toHaveLength(2);
    expect(history.measured.map(({ carNumber, readings }) => [carNumber, readings])).toEqual(
      expect.arrayContaining([
        ['12J', 1],
        ['7', 1],
      ]),
    );
    expect(
      failureOf(
        await findGaugeHistory(world.ports(), night.competitor, { gaugeId: night.micrometer }),
      ).name,
    ).toBe('absent');
  });

  it('goes with the case file, which still works out anew', async () => {
    await signNow(world.ports(), night.seriesId);
    const text = get(await exportCaseFile(world.ports(), night.official, { inspectionId: breach }));
    const file = get(readCaseFile(text));
    const kinds = file.lines.map(({ proof }) => (JSON.parse(proof.line) as { kind: string }).kind);
    expect(kinds.filter((kind) => kind === 'verdict-review')).toHaveLength(2);
    const key = formatVerifierKey(world.keys.signer(night.seriesId).key);
    expect(checkCaseFile(file, [key]).filter(({ outcome }) => outcome !== 'passed')).toEqual([]);
  });
});

describe('a report signed with a check on the ring', () => {
  it('carries the check, and works out anew with it', async () => {
    const inspectionId = await openInspection(world, night, '44');
    const rows = rowsFor(world, night);
    const other = uuid();
    get(await gauge(other).calibrated('2026-03-02', '2027-03-02', { code: 'MC-03' }));
    get(await check({ gaugeId: other, checkedAt: '2026-07-12T02:10:00.000Z' }));
    get(await send(world, night.inspector, inspectionId, [rows.reading({ gaugeId: other })]));
    await sign(inspectionId);
    get(await decide(inspectionId, NO_BREACH));
    await signNow(world.ports(), night.seriesId);
    const text = get(await exportCaseFile(world.ports(), night.official, { inspectionId }));
    expect(text).toContain('gauge MC-03 checked on the ring SR-03 at 21:10, off by 0.0001 in');
    const key = formatVerifierKey(world.keys.signer(night.seriesId).key);
    const steps = checkCaseFile(get(readCaseFile(text)), [key]);
    expect(steps.filter(({ outcome }) => outcome !== 'passed')).toEqual([]);
  });
});
