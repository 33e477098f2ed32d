import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { readCaseFile } from '@/contracts/case-file/case-file';
import { checkCaseFile } from '@/contracts/case-file/check-case-file';
import { custodyRequest, heldPartRequest, sealRequest } from '@/contracts/custody/custody';
import { toHex } from '@/domain/ledger/bytes';
import { formatVerifierKey } from '@/domain/ledger/note/verifier-key';
import { findPart } from '@/services/custody/find-part';
import { listImpound } from '@/services/custody/list-impound';
import { findEngineKey, readSeals } from '@/services/custody/read-seals';
import { recordCustody } from '@/services/custody/record-custody';
import { recordSeal } from '@/services/custody/record-seal';
import { tagPart } from '@/services/custody/tag-part';
import { signReport } from '@/services/inspection/report/sign-report';
import { auditLedger } from '@/services/ledger/audit/audit-ledger';
import { exportCaseFile } from '@/services/ledger/case-file/export-case-file';
import { publishVerdict } from '@/services/verdict/publish-verdict';
import { readForDecision } from '@/services/verdict/read-for-decision';
import { saveVerdictDraft } from '@/services/verdict/save-verdict-draft';
import { connect } from '../../../scripts/postgres/roles.mjs';
import {
  failureOf,
  fileOf,
  get,
  openInspection,
  openRaceNight,
  type RaceNight,
  rowsFor,
  send,
} from '../../support/bay';
import { openRecordWorld, type RecordWorld, signNow } from '../../support/record';
import { NO_BREACH } from '../../support/verdict-case';
import { FakeObjects } from '../../support/verdict-world';
import { addActor, addSeries } from '../../support/world';

let world: RecordWorld;
let night: RaceNight;
let inspectionId: string;

const uuid = () => world.ports().random.uuid();

beforeAll(async () => {
  world = await openRecordWorld({ objects: new FakeObjects() });
  night = await openRaceNight(world);
  inspectionId = await openInspection(world, night, '12J');
});
afterAll(() => world.close());

const tag = (more = {}, by = night.inspector) =>
  tagPart(
    world.ports(),
    by,
    heldPartRequest.parse({
      act: uuid(),
      id: uuid(),
      kind: 'held',
      inspectionId,
      words: 'Lifter',
      placeOnEngine: 'intake 3',
      clause: '4.2',
      bag: 'B-11',
      takenFrom: 'Tamsin Overley',
      takenBy: 'Oona Brannick',
      place: 'Bay 2',
      takenAt: '2026-07-12T03:10:00.000Z',
      holdUntil: null,
      ...more,
    }),
  );

const act = (partId: string, minute: string, more: object, by = night.inspector) =>
  recordCustody(
    world.ports(),
    by,
    custodyRequest.parse({
      act: uuid(),
      id: uuid(),
      partId,
      place: '',
      reason: 'Overnight',
      occurredAt: `2026-07-12T03:${minute}:00.000Z`,
      ...more,
    }),
  );

const over = (giver: string, receiver: string, place = 'Impound, shelf 4') => ({
  kind: 'hand-over',
  giver,
  receiver,
  place,
});

describe('a held part', () => {
  it('gets the series’ next tag, and its history from the first hand on', async () => {
    const first = get(await tag());
    const second = get(await tag());
    expect([first.tag, second.tag]).toEqual(['T-0001', 'T-0002']);
    get(await act(first.id, '20', over('Oona Brannick', 'Perrin Oakhollow')));
    get(
      await act(first.id, '30', {
        kind: 'bag-opened',
        giver: 'Perrin Oakhollow',
        witness: 'Tamsin Overley',
        bag: 'B-11',
      }),
    );
    get(await act(first.id, '31', { kind: 'bag-closed', giver: 'Perrin Oakhollow', bag: 'B-12' }));
    const part = get(await findPart(world.ports(), night.official, first.id));
    expect(part).toMatchObject({
      tag: 'T-0001',
      carNumber: '12J',
      takenBy: 'Oona Brannick',
      place: 'Impound, shelf 4',
      custody: { holder: 'Perrin Oakhollow', gaps: [], openBag: undefined },
    });
    expect(part.custody.rows.map(({ act: { kind } }) => kind)).toEqual([
      'taken',
      'hand-over',
      'bag-opened',
      'bag-closed',
    ]);
    get(
      await act(first.id, '40', {
        kind: 'returned',
        giver: 'Perrin Oakhollow',
        receiver: 'Tamsin Overley',
      }),
    );
    const back = get(await findPart(world.ports(), night.official, first.id));
    expect(back.custody).toMatchObject({ holder: undefined, gaps: [] });
  });

  it('shows what does not follow as a gap, and keeps it', async () => {
    const { id } = get(await tag());
    get(await act(id, '25', over('Somebody Else', 'Perrin Oakhollow')));
    get(
      await act(id, '35', {
        kind: 'bag-opened',
        giver: 'Perrin Oakhollow',
        witness: '',
        bag: 'B-11',
      }),
    );
    const { custody } = get(await findPart(world.ports(), night.inspector, id));
    expect(custody.gaps.map(({ words }) => words)).toEqual([
      'Somebody Else acted on it; the last on record as holding it is Oona Brannick.',
      'Opened without a witness.',
    ]);
    expect(custody.rows).toHaveLength(3);
  });

  it('is for those who keep custody in its series; others are told that there is none', async () => {
    const { id } = get(await tag());
    const other = await addSeries(world, 'another');
    const stranger = await addActor(world, 'Stranger', [{ seriesId: other, role: 'official' }]);
    const panel = await addActor(world, 'Panel', [{ seriesId: night.seriesId, role: 'panel' }]);
    for (const actor of [stranger, night.competitor]) {
      expect(failureOf(await findPart(world.ports(), actor, id)).name).toBe('absent');
      expect(failureOf(await act(id, '50', over('a', 'b'), actor)).name).toBe('absent');
      expect(failureOf(await tag({}, actor)).name).toBe('absent');
      expect((await listImpound(world.ports(), actor)).held).toEqual([]);
    }
    expect((await findPart(world.ports(), panel, id)).ok).toBe(true);
    expect(failureOf(await act(id, '50', over('a', 'b'), panel)).name).toBe('absent');
    expect(failureOf(await findPart(world.ports(), night.official, uuid())).name).toBe('absent');
    expect(failureOf(await findPart(world.ports(), night.official, 'x')).name).toBe('absent');
  });

  it('said twice under one act is said once', async () => {
    const { id } = get(await tag());
    const same = { act: uuid(), id: uuid(), ...over('Oona Brannick', 'Perrin Oakhollow') };
    get(await act(id, '26', same));
    get(await act(id, '26', same));
    const { custody } = get(await findPart(world.ports(), night.inspector, id));
    expect(custody.rows).toHaveLength(2);
  });
});

describe('seals', () => {
  const seal = (more: object) =>
    recordSeal(
      world.ports(),
      night.inspector,
      sealRequest.parse({
        act: uuid(),
        id: uuid(),
        inspectionId,
        kind: 'applied',
        number: '10441',
        place: 'intake manifold',
        state: null,
        doneBy: 'Oona Brannick',
        note: '',
        occurredAt: '2026-07-12T03:00:00.000Z',
        ...more,
      }),
    );

  it('are kept with the engine, and what does not follow is shown', async () => {
    get(await seal({}));
    const found = { kind: 'found', occurredAt: '2026-07-12T03:05:00.000Z' };
    get(await seal({ ...found, state: 'intact' }));
    get(await seal({ ...found, number: '', state: 'missing', place: 'oil pan' }));
    const engine = await findEngineKey(world.ports().db, night.seriesId, inspectionId);
    const seals = await readSeals(world.ports().db, night.seriesId, engine);
    expect(engine).toBe('VR-2231');
    expect([...seals.onRecord]).toEqual([['intake manifold', '10441']]);
    expect(seals.faults.map(({ words }) => words)).toEqual([
      'The seal at oil pan was found missing.',
    ]);
  });

  it('say how one was found, and its number unless it is missing', () => {
    const asked = (more: object) =>
      sealRequest
        .safeParse({
          act: uuid(),
          id: uuid(),
          inspectionId,
          kind: 'found',
          number: '1',
          place: 'pan',
          state: 'intact',
          doneBy: 'A',
          note: '',
          occurredAt: '2026-07-12T03:00:00.000Z',
          ...more,
        })
        .error?.issues.map(({ path }) => path.join('/'));
    expect(asked({})).toBeUndefined();
    expect(asked({ state: null })).toEqual(['state']);
    expect(asked({ number: '' })).toEqual(['number']);
    expect(asked({ kind: 'applied' })).toEqual(['state']);
  });
});

describe('the impound and the decision', () => {
  it('warn of a gap where the clause relied on a held part, and block nothing', async () => {
    const rows = rowsFor(world, night);
    const other = await openInspection(world, night, '7');
    get(await send(world, night.inspector, other, rows.fullBore('1')));
    const { id } = get(await tag({ inspectionId: other, clause: '4.2' }));
    get(await act(id, '25', over('Somebody Else', 'Perrin Oakhollow')));
    const sound = get(await tag({ inspectionId: other, clause: '' }));
    const head = toHex((await fileOf(world, night.inspector, other)).chain.head);
    const inspector = { ...night.inspector, authenticatedAt: world.clock.now().toISOString() };
    get(await signReport(world.ports(), inspector, { act: uuid(), inspectionId: other, head }));
    const asked = { seriesId: night.seriesId, inspectionId: other };
    const sheet = get(await readForDecision(world.ports(), night.official, asked));
    expect(
      sheet.heldParts.map(({ tag: one, clause, custody }) => [one, clause, custody.gaps.length]),
    ).toEqual([
      [sound.tag, '', 0],
      [expect.stringMatching(/^T-/), '4.2', 1],
    ]);
    expect(sheet.before.every(({ met }) => met)).toBe(true);
    const draft = { act: uuid(), ...asked, version: null, content: NO_BREACH };
    const { version } = get(await saveVerdictDraft(world.ports(), night.official, draft));
    get(await publishVerdict(world.ports(), night.official, { act: uuid(), ...asked, version }));
    const dueOf = async () =>
      (await listImpound(world.ports(), night.official)).held.find((part) => part.id === id)?.due;
    expect(await dueOf()).toBe(false);
    world.clock.set('2026-09-01T12:00:00.000Z');
    expect(await dueOf()).toBe(true);
    const [first] = (await listImpound(world.ports(), night.official)).held;
    expect(first?.due).toBe(true);
    const held = get(await tag({ inspectionId: other, holdUntil: '2026-12-24T00:00:00.000Z' }));
    const parts = (await listImpound(world.ports(), night.official)).held;
    expect(parts.find((part) => part.id === held.id)?.due).toBe(false);
    world.clock.set('2026-07-12T03:50:00.000Z');
  });

  it('go with the case file, whose checks all pass, and stand the audit', async () => {
    await signNow(world.ports(), night.seriesId);
    const text = get(await exportCaseFile(world.ports(), night.official, { inspectionId }));
    const file = get(readCaseFile(text));
    const kinds = file.lines.map(({ proof }) => (JSON.parse(proof.line) as { kind: string }).kind);
    expect(kinds.filter((kind) => kind === 'part-tagged').length).toBeGreaterThan(3);
    expect(kinds).toContain('custody-recorded');
    expect(kinds.filter((kind) => kind === 'seal-recorded')).toHaveLength(3);
    const key = formatVerifierKey(world.keys.signer(night.seriesId).key);
    const failed = checkCaseFile(file, [key]).filter(({ outcome }) => outcome === 'failed');
    expect(failed).toEqual([]);
    const audit = await auditLedger(world.ports(), {
      seriesId: night.seriesId,
      heads: [],
      keys: [],
    });
    expect(audit.faults).toEqual([]);
  });

  it('notice a row of custody that was changed behind the application’s back', async () => {
    const { ownerUrl } = world.database;
    const owner = await connect(ownerUrl);
    await owner.query(
      "update record.custody_act set receiver = 'Somebody' where kind = 'hand-over'",
    );
    await owner.end();
    const audit = await auditLedger(world.ports(), {
      seriesId: night.seriesId,
      heads: [],
      keys: [],
    });
    expect(audit.faults.map(({ where }) => where).join()).toContain('custody_act');
  });
});
