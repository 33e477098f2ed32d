import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { sha256, toHex, utf8 } from '@/domain/ledger/bytes';
import { parseLine } from '@/domain/ledger/line';
import { lineCommitsTo } from '@/domain/ledger/verify/check-opening';
import { findNotice } from '@/services/public/find-notice';
import { listNotices } from '@/services/public/list-notices';
import { listOwnVerdicts, openOwnVerdict } from '@/services/verdict/open-own-verdict';
import { previewNotice } from '@/services/verdict/preview-notice';
import { publishVerdict } from '@/services/verdict/publish-verdict';
import { readForDecision } from '@/services/verdict/read-for-decision';
import { BIG_FEET, BREACH, NO_BREACH } from '../../support/verdict-case';
import { openVerdictWorld, type VerdictWorld } from '../../support/verdict-world';
import { addActor, addSeries, openWorld, type World } from '../../support/world';

let world: World;
let v: VerdictWorld;

beforeAll(async () => {
  world = await openWorld();
  v = await openVerdictWorld(world);
  world.clock.set('2026-07-12T14:20:00.000Z');
});
afterAll(() => world.close());

const uuid = () => world.ports().random.uuid();
const failureOf = (result: { ok: boolean; failure?: unknown }) =>
  result.ok
    ? undefined
    : (result.failure as { name: string; detail: string; faults?: readonly { pointer: string }[] });

describe('publishing a verdict', () => {
  it('needs a signed report', async () => {
    const inspection = await v.addInspection('1');
    expect(failureOf(await v.save(inspection, BREACH, null))).toMatchObject({
      name: 'not-in-this-state',
      detail: 'The inspector has not signed the report yet.',
    });
  });

  it('gives verdict, numbered notice, ledger line and print job in one act', async () => {
    const inspection = await v.addInspection('12J');
    await v.sign(inspection, BIG_FEET);
    const done = await v.decide(inspection, BREACH);
    expect(done).toMatchObject({ ok: true, value: { number: '2026-001' } });
    const found = await findNotice(world.ports(), { slug: 'corran-valley', number: '2026-001' });
    if (found === undefined) throw new Error('no notice');
    expect(found.notice).toMatchObject({
      car: '12J',
      decision: 'breach',
      computed: 'fail',
      provisionalUntil: '2026-07-12T16:20:00.000Z',
      appeal: { until: '2026-07-16T05:00:00.000Z' },
      penalty: { row: 'A', step: '1' },
    });
    expect(found.notice.people.map(({ role, name }) => [role, name])).toEqual([
      ['found', 'Oona Brannick'],
      ['witness', 'Wren Halloway'],
      ['decided', 'Ilse Törnkvist'],
    ]);
    const line = parseLine(found.line);
    if (!line.ok) throw new Error('no line');
    expect(line.value.kind).toBe('verdict-published');
    expect(lineCommitsTo(line.value, 'notice', found.salt, sha256(utf8(found.document)))).toBe(
      true,
    );
    expect(
      lineCommitsTo(line.value, 'notice', found.salt, sha256(utf8(`${found.document} `))),
    ).toBe(false);
    const contents = await world
      .ports()
      .db.execute<{ role: string; open: boolean }[]>(
        'select role, open from record.ledger_content where line_index = ? order by role',
        [found.index],
      );
    expect(contents).toEqual([
      { role: 'decision', open: false },
      { role: 'notice', open: true },
      { role: 'rows', open: false },
    ]);
    const [verdict] = await world
      .ports()
      .db.execute<{ hash: string; notice_hash: string }[]>(
        "select encode(hash, 'hex') as hash, encode(notice_hash, 'hex') as notice_hash from record.verdict where number = '2026-001'",
      );
    expect(verdict?.notice_hash).toBe(toHex(sha256(utf8(found.document))));
    const jobs = await world
      .ports()
      .db.execute<{ n: string }[]>(
        "select count(*) as n from jobs.job where name = 'render-notice'",
      );
    expect(Number(jobs[0]?.n)).toBe(1);
  });

  it('shows in the preview exactly what is published', async () => {
    const inspection = await v.addInspection('13');
    await v.sign(inspection, BIG_FEET);
    const saved = await v.save(inspection, BREACH, null);
    if (!saved.ok) throw new Error(saved.failure.detail);
    const ask = { seriesId: v.seriesId, inspectionId: inspection };
    const preview = await previewNotice(world.ports(), v.official, ask);
    if (!preview.ok) throw new Error(preview.failure.detail);
    expect(preview.value.faults).toEqual([]);
    const done = await publishVerdict(world.ports(), v.official, {
      act: uuid(),
      ...ask,
      version: preview.value.version,
    });
    if (!done.ok) throw new Error(done.failure.detail);
    const found = await findNotice(world.ports(), {
      slug: 'corran-valley',
      number: done.value.number,
    });
    expect(found?.notice).toEqual(JSON.parse(JSON.stringify(preview.value.notice)));
  });

  it('sent six times at once publishes once, with one answer', async () => {
    const inspection = await v.addInspection('6');
    await v.sign(inspection, BIG_FEET);
    const saved = await v.save(inspection, BREACH, null);
    if (!saved.ok) throw new Error(saved.failure.detail);
    const act = uuid();
    const answers = await Promise.all(
      Array.from({ length: 6 }, () =>
        publishVerdict(world.ports(), v.official, {
          act,
          seriesId: v.seriesId,
          inspectionId: inspection,
          version: saved.value.version,
        }),
      ),
    );
    for (const answer of answers) expect(answer).toEqual(answers[0]);
    expect(answers[0]?.ok).toBe(true);
    const [row] = await world
      .ports()
      .db.execute<{ n: string }[]>(
        'select count(*) as n from record.verdict where inspection_id = ?',
        [inspection],
      );
    expect(Number(row?.n)).toBe(1);
  });

  it('by two officials at once is done by one; the other is told which notice stands', async () => {
    const other = await addActor(world, 'Second Official', [
      { seriesId: v.seriesId, role: 'official' },
    ]);
    const inspection = await v.addInspection('22');
    await v.sign(inspection, BIG_FEET);
    const saved = await v.save(inspection, BREACH, null);
    if (!saved.ok) throw new Error(saved.failure.detail);
    const answers = await Promise.all(
      [v.official, other].map((actor) =>
        publishVerdict(world.ports(), actor, {
          act: uuid(),
          seriesId: v.seriesId,
          inspectionId: inspection,
          version: saved.value.version,
        }),
      ),
    );
    const won = answers.filter((answer) => answer.ok);
    const lost = answers.filter((answer) => !answer.ok);
    expect([won.length, lost.length]).toEqual([1, 1]);
    expect(lost[0] && failureOf(lost[0])).toMatchObject({
      name: 'not-in-this-state',
      detail: expect.stringMatching(/^Notice 2026-\d{3} has been published on this report\.$/),
    });
  });

  it('numbers the notices of a season without a gap, whoever publishes at once', async () => {
    const inspections = await Promise.all(
      ['31', '32', '33', '34'].map((car) => v.addInspection(car)),
    );
    for (const inspection of inspections) await v.sign(inspection);
    const done = await Promise.all(
      inspections.map((inspection) => v.decide(inspection, NO_BREACH)),
    );
    expect(done.every((answer) => answer.ok)).toBe(true);
    const rows = await world
      .ports()
      .db.execute<{ number: string }[]>('select number from record.verdict order by number');
    expect(rows.map(({ number }) => number)).toEqual(
      rows.map((_, i) => `2026-${String(i + 1).padStart(3, '0')}`),
    );
  });
});

describe('who may decide', () => {
  it('is neither who signed nor the competitor; to a stranger there is nothing', async () => {
    const both = await addActor(world, 'Inspecting Official', [
      { seriesId: v.seriesId, role: 'official' },
      { seriesId: v.seriesId, role: 'inspector' },
    ]);
    const racing = await addActor(world, 'Racing Official', [
      { seriesId: v.seriesId, role: 'official' },
      { seriesId: v.seriesId, role: 'competitor' },
    ]);
    const elsewhere = await addActor(world, 'Other Official', [
      { seriesId: await addSeries(world, 'elsewhere'), role: 'official' },
    ]);
    const inspection = await v.addInspection('41', racing);
    await v.sign(inspection, BIG_FEET, both);
    const name = async (by: typeof both) => failureOf(await v.decide(inspection, BREACH, by))?.name;
    expect(await name(both)).toBe('conflict-of-interest');
    expect(await name(racing)).toBe('conflict-of-interest');
    expect(await name(v.inspector)).toBe('absent');
    expect(await name(v.competitor)).toBe('absent');
    expect(await name(elsewhere)).toBe('absent');
    const read = (by: typeof both) =>
      readForDecision(world.ports(), by, { seriesId: v.seriesId, inspectionId: inspection });
    expect(failureOf(await read(v.competitor))?.name).toBe('absent');
    expect(failureOf(await read(v.inspector))?.name).toBe('absent');
    const preview = await previewNotice(world.ports(), v.competitor, {
      seriesId: v.seriesId,
      inspectionId: inspection,
    });
    expect(failureOf(preview)?.name).toBe('absent');
    const publish = (by: typeof both) =>
      publishVerdict(world.ports(), by, {
        act: uuid(),
        seriesId: v.seriesId,
        inspectionId: inspection,
        version: 1,
      });
    expect(failureOf(await publish(both))?.name).toBe('absent');
    expect((await v.save(inspection, BREACH, null)).ok).toBe(true);
    expect(failureOf(await publish(both))?.name).toBe('conflict-of-interest');
    expect(failureOf(await publish(v.competitor))?.name).toBe('absent');
    const [row] = await world
      .ports()
      .db.execute<{ n: string }[]>(
        'select count(*) as n from record.verdict where inspection_id = ?',
        [inspection],
      );
    expect(Number(row?.n)).toBe(0);
  });
});

describe('a decision', () => {
  const refused = async (car: string, draft: typeof BREACH, engine = BIG_FEET) => {
    const inspection = await v.addInspection(car);
    await v.sign(inspection, engine);
    return failureOf(await v.decide(inspection, draft))?.faults?.map(({ pointer }) => pointer);
  };

  it('of breach names a mandatory clause that the report has a finding on', async () => {
    expect(await refused('51', { ...BREACH, clauses: [] })).toContain('/clauses');
    expect(await refused('52', { ...BREACH, clauses: ['4.6'] })).toContain('/clauses');
    expect(await refused('53', { ...BREACH, clauses: ['9.9'] })).toContain('/clauses');
  });

  it('takes its penalty from the schedule of the class', async () => {
    expect(await refused('54', { ...BREACH, penalty: null })).toEqual(['/penalty']);
    expect(await refused('55', { ...BREACH, penalty: { row: 'B', step: 1 } })).toEqual([
      '/penalty',
    ]);
    expect(await refused('56', { ...BREACH, penalty: { row: 'A', step: 4 } })).toEqual([
      '/penalty',
    ]);
  });

  it('against the computed statement needs its reason', async () => {
    expect(await refused('57', NO_BREACH)).toEqual(['/againstComputedBecause']);
    expect(await refused('58', BREACH, {})).toEqual(['/againstComputedBecause']);
    const inspection = await v.addInspection('59');
    await v.sign(inspection, BIG_FEET);
    const because = 'The lifters were swapped after the car left the scale.';
    const done = await v.decide(inspection, { ...NO_BREACH, againstComputedBecause: because });
    if (!done.ok) throw new Error(done.failure.detail);
    const found = await findNotice(world.ports(), {
      slug: 'corran-valley',
      number: done.value.number,
    });
    expect(found?.notice).toMatchObject({
      decision: 'no-breach',
      computed: 'fail',
      againstComputedBecause: because,
      breached: [],
      gauges: [],
    });
  });

  it('has reasons', async () => {
    expect(await refused('60', { ...BREACH, reasons: '  ' })).toEqual(['/reasons']);
  });

  it('on a report that was corrected meanwhile is stale', async () => {
    const inspection = await v.addInspection('61');
    await v.sign(inspection, BIG_FEET);
    const saved = await v.save(inspection, BREACH, null);
    if (!saved.ok) throw new Error(saved.failure.detail);
    await v.sign(inspection, {});
    const done = await publishVerdict(world.ports(), v.official, {
      act: uuid(),
      seriesId: v.seriesId,
      inspectionId: inspection,
      version: saved.value.version,
    });
    expect(failureOf(done)?.name).toBe('stale');
  });

  it('saved by two from the same version is kept from the first', async () => {
    const inspection = await v.addInspection('62');
    await v.sign(inspection, BIG_FEET);
    expect(await v.save(inspection, BREACH, null)).toMatchObject({
      ok: true,
      value: { version: 1 },
    });
    expect(failureOf(await v.save(inspection, NO_BREACH, null))?.name).toBe('stale');
    expect(await v.save(inspection, NO_BREACH, 1)).toMatchObject({
      ok: true,
      value: { version: 2 },
    });
    expect(failureOf(await v.save(inspection, BREACH, 1))?.name).toBe('stale');
  });

  it('is made anew on a corrected report; both notices stay and point at each other', async () => {
    const inspection = await v.addInspection('63');
    await v.sign(inspection, BIG_FEET);
    const first = await v.decide(inspection, BREACH);
    const at = (number: string) => findNotice(world.ports(), { slug: 'corran-valley', number });
    if (!first.ok) throw new Error('not published');
    const asked = { seriesId: v.seriesId, inspectionId: inspection };
    const earlier = async () => {
      const sheet = await readForDecision(world.ports(), v.official, asked);
      return sheet.ok ? sheet.value.earlierNotice : undefined;
    };
    expect([(await at(first.value.number))?.correctedAt, await earlier()]).toEqual([null, null]);
    await v.sign(inspection, {});
    expect([(await at(first.value.number))?.correctedAt, await earlier()]).toEqual([
      '2026-07-12T03:48:00.000Z',
      first.value.number,
    ]);
    const saved = await v.save(inspection, { ...NO_BREACH, reportRevision: 2 }, 2);
    if (!saved.ok) throw new Error(saved.failure.detail);
    const second = await publishVerdict(world.ports(), v.official, {
      act: uuid(),
      seriesId: v.seriesId,
      inspectionId: inspection,
      version: saved.value.version,
    });
    if (!second.ok) throw new Error('not published');
    expect(await at(first.value.number)).toMatchObject({
      replacedBy: second.value.number,
      correctedAt: null,
    });
    expect(await at(second.value.number)).toMatchObject({ replaces: first.value.number });
    const board = await listNotices(world.ports(), { seriesId: v.seriesId, find: '63' });
    expect(board.notices.map(({ number, replacedBy }) => [number, replacedBy])).toEqual([
      [second.value.number, null],
      [first.value.number, second.value.number],
    ]);
  });

  it('suggests the next step of the schedule after an earlier breach', async () => {
    const repeat = await addActor(world, 'Repeat Entrant');
    const first = await v.addInspection('71', repeat);
    await v.sign(first, BIG_FEET);
    const step = async (inspectionId: string) => {
      const sheet = await readForDecision(world.ports(), v.official, {
        seriesId: v.seriesId,
        inspectionId,
      });
      if (!sheet.ok) throw new Error(sheet.failure.detail);
      return sheet.value.penalties.map(({ row, nextStep }) => [row, nextStep]);
    };
    expect(await step(first)).toEqual([
      ['A', 1],
      ['B', 1],
    ]);
    expect((await v.decide(first, BREACH)).ok).toBe(true);
    const second = await v.addInspection('72', repeat);
    await v.sign(second, BIG_FEET);
    expect(await step(second)).toEqual([
      ['A', 2],
      ['B', 1],
    ]);
  });
});

describe('the notice board', () => {
  it('finds by number, car and breached clause, and by nothing else', async () => {
    const find = async (text: string) =>
      (await listNotices(world.ports(), { seriesId: v.seriesId, find: text })).notices;
    expect((await find('12j')).map(({ car }) => car)).toEqual(['12J']);
    expect((await find('2026-001')).map(({ number }) => number)).toEqual(['2026-001']);
    expect((await find('4.3')).every(({ decision }) => decision === 'breach')).toBe(true);
    expect((await find('4.3')).length).toBeGreaterThan(0);
    expect(await find('4.6')).toEqual([]);
    expect(await find('%')).toEqual([]);
    expect(await find("' or 1=1 --")).toEqual([]);
  });

  it('says provisional until the protest window shuts, and final from then on', async () => {
    const [before] = (await listNotices(world.ports(), { seriesId: v.seriesId, find: '2026-001' }))
      .notices;
    expect(before?.final).toBe(false);
    world.clock.set('2026-07-12T16:20:00.001Z');
    const [after] = (await listNotices(world.ports(), { seriesId: v.seriesId, find: '2026-001' }))
      .notices;
    expect(after?.final).toBe(true);
  });
});

describe('a competitor', () => {
  it('sees all findings on their own engine, and nobody else does', async () => {
    const other = await addActor(world, 'Other Entrant', [
      { seriesId: v.seriesId, role: 'competitor' },
    ]);
    const inspection = await v.addInspection('81');
    await v.sign(inspection, BIG_FEET);
    const done = await v.decide(inspection, BREACH);
    if (!done.ok) throw new Error(done.failure.detail);
    const open = (by: typeof other, series = 'corran-valley') =>
      openOwnVerdict(world.ports(), by, { number: done.value.number, series });
    const own = await open(v.competitor);
    if (!own.ok) throw new Error(own.failure.detail);
    expect(own.value.report.findings.find(({ clause }) => clause === '4.6')).toMatchObject({
      advisory: true,
      state: 'outside',
    });
    expect(failureOf(await open(other))?.name).toBe('absent');
    expect(failureOf(await open(v.official))?.name).toBe('absent');
    expect(failureOf(await open(v.competitor, 'elsewhere'))?.name).toBe('absent');
    const listed = await listOwnVerdicts(world.ports(), v.competitor);
    expect(listed.map(({ number }) => number)).toContain(done.value.number);
    expect(await listOwnVerdicts(world.ports(), other)).toEqual([]);
  });
});
