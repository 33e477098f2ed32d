import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import type { Actor } from '@/domain/access/permission';
import { listEngines } from '@/services/engine/list-engines';
import { acceptEngineOffer } from '@/services/engine/transfer/accept-engine-offer';
import { findEngineOffer } from '@/services/engine/transfer/find-engine-offer';
import { type NewOffer, offerEngine } from '@/services/engine/transfer/offer-engine';
import { returnEngine } from '@/services/engine/transfer/return-engine';
import { takeOfferBack } from '@/services/engine/transfer/take-offer-back';
import { decidePaperwork } from '@/services/paperwork/decide-paperwork';
import { handInPaperwork } from '@/services/paperwork/hand-in-paperwork';
import { openPaperwork } from '@/services/paperwork/read/open-paperwork';
import { startPaperwork } from '@/services/paperwork/start-paperwork';
import { emailOf, tokenMailedTo } from '../../support/helping';
import {
  fullDraft,
  handedIn,
  keepPhotograph,
  openPaddock,
  type Paddock,
  picture,
  save,
  start,
} from '../../support/paperwork';
import { openWorld, type World } from '../../support/world';
import { must } from '../rulebook/build';

let world: World;
let paddock: Paddock;

const ABSENT = { ok: false, failure: { name: 'absent' } };

beforeAll(async () => {
  world = await openWorld();
});
afterAll(() => world.close());

const offer = async (to: Actor, change: Partial<NewOffer> = {}) => {
  const asked = { act: paddock.uuid(), engineId: paddock.engineId, kind: 'sold', untilAt: null };
  const email = await emailOf(world, to);
  const offered = await offerEngine(paddock.ports(), paddock.competitor, {
    ...(asked as NewOffer),
    email,
    ...change,
  });
  return { offered, token: offered.ok ? await tokenMailedTo(world, email) : '' };
};

const accept = (token: string, reference = 'Bought 1') =>
  acceptEngineOffer(paddock.ports(), {
    act: paddock.uuid(),
    token,
    name: '',
    reference,
    agent: '',
    previousToken: undefined,
  });

const declare = (actor: Actor, carNumber: string) => {
  const { uuid, seriesId, classId, engineId } = paddock;
  const input = { act: uuid(), id: uuid(), seriesId, classId, engineId, carNumber };
  return startPaperwork(paddock.ports(), actor, input);
};

const names = async (actor: Actor) =>
  (await listEngines(paddock.ports(), actor)).map(({ reference, lentTo }) => [reference, lentTo]);

const linesOf = async () =>
  world
    .ports()
    .db.execute<{ line: string }[]>(
      `select line from record.ledger_line where series_id = ? and kind = 'engine-transferred' order by index`,
      [paddock.seriesId],
    );

describe('an engine sold', () => {
  it('changes hands when the receiver accepts, with a line in the ledger and a row in the record', async () => {
    paddock = await openPaddock(world);
    const { competitor, rival, engineId, ports } = paddock;
    const { paperworkId } = await handedIn(paddock, '12J');
    must(
      await decidePaperwork(ports(), paddock.official, {
        act: paddock.uuid(),
        paperworkId,
        number: 1,
        decision: 'accepted',
        remarks: [],
      }),
    );
    const draft = await start(paddock, '13');
    await keepPhotograph(paddock, draft, await picture());
    const version = await save(paddock, draft, 1, fullDraft());

    const { token } = await offer(rival);
    expect(must(await findEngineOffer(ports(), token))).toMatchObject({
      from: 'Ada Lindqvist',
      kind: 'sold',
      reference: 'VR-2231',
    });
    expect(await names(rival)).toEqual([]);
    must(await accept(token));
    expect(await names(rival)).toEqual([['Bought 1', null]]);
    expect(await names(competitor)).toEqual([]);
    expect(await accept(token)).toMatchObject({ failure: { name: 'link-spent' } });

    const kept = await world
      .ports()
      .db.execute('select kind, from_id, to_id from record.engine_transfer where engine_id = ?', [
        engineId,
      ]);
    expect(kept).toEqual([{ kind: 'sold', from_id: competitor.personId, to_id: rival.personId }]);
    const [line] = await linesOf();
    expect(line?.line).toContain(engineId);
    expect(line?.line).not.toContain('Lindqvist');

    // The former owner keeps what was handed in, and can declare the engine no more.
    expect(await openPaperwork(ports(), competitor, paperworkId)).toMatchObject({ ok: true });
    expect(await declare(competitor, '14')).toMatchObject(ABSENT);
    const late = { act: paddock.uuid(), paperworkId: draft, version };
    expect(await handInPaperwork(ports(), competitor, late)).toMatchObject({
      failure: { name: 'not-in-this-state' },
    });
    // The new owner begins with the engine's own facts; nothing of the sheets came along.
    const begun = must(await declare(rival, '15'));
    const opened = must(await openPaperwork(ports(), rival, begun.paperworkId));
    expect(opened.row.draft.sheets).toEqual([]);
    expect(opened.row.draft.answers.map(({ typed }) => typed)).toEqual(['41-7730']);
    expect(await openPaperwork(ports(), rival, paperworkId)).toMatchObject(ABSENT);
    expect(await openPaperwork(ports(), competitor, begun.paperworkId)).toMatchObject(ABSENT);
  });

  it('is offered once, taken back before it is accepted, and by its owner alone', async () => {
    paddock = await openPaddock(world);
    const { rival, stranger, ports } = paddock;
    const { offered, token } = await offer(rival);
    const { offerId } = must(offered);
    expect((await offer(stranger)).offered).toMatchObject({
      failure: { name: 'not-in-this-state' },
    });
    const theirs = {
      act: paddock.uuid(),
      engineId: paddock.engineId,
      kind: 'sold',
      email: 'x@example.org',
      untilAt: null,
    } as const;
    expect(await offerEngine(ports(), rival, theirs)).toMatchObject(ABSENT);
    expect(await takeOfferBack(ports(), rival, { act: paddock.uuid(), offerId })).toMatchObject(
      ABSENT,
    );
    must(await takeOfferBack(ports(), paddock.competitor, { act: paddock.uuid(), offerId }));
    expect(await accept(token)).toMatchObject({ failure: { name: 'link-spent' } });
    expect(await names(rival)).toEqual([]);
  });

  it('accepted twice at once changes hands once', async () => {
    paddock = await openPaddock(world);
    const { token } = await offer(paddock.rival);
    const both = await Promise.all([accept(token, 'One'), accept(token, 'Two')]);
    expect(both.filter(({ ok }) => ok)).toHaveLength(1);
    const rows = await world
      .ports()
      .db.execute('select 1 from record.engine_transfer where engine_id = ?', [paddock.engineId]);
    expect(rows).toHaveLength(1);
  });
});

describe('an engine lent', () => {
  it('is declared by the borrower until the loan ends, and is back by itself that day', async () => {
    paddock = await openPaddock(world);
    const { competitor, rival } = paddock;
    expect((await offer(rival, { kind: 'lent' })).offered).toMatchObject({
      failure: { faults: [{ pointer: '/until' }] },
    });
    const { token } = await offer(rival, { kind: 'lent', untilAt: '2026-08-01T00:00:00.000Z' });
    must(await accept(token));
    expect(await names(rival)).toEqual([['VR-2231', 'Teo Marsh']]);
    expect(await names(competitor)).toEqual([['VR-2231', 'Teo Marsh']]);
    expect(await declare(competitor, '20')).toMatchObject(ABSENT);
    must(await declare(rival, '20'));
    expect((await offer(paddock.stranger)).offered).toMatchObject({
      failure: { name: 'not-in-this-state' },
    });

    world.clock.set('2026-08-01T00:00:00.000Z');
    expect(await names(rival)).toEqual([]);
    expect(await declare(rival, '21')).toMatchObject(ABSENT);
    must(await declare(competitor, '21'));
    world.clock.set('2026-07-11T20:00:00.000Z');
  });

  it('can be given back before, by the borrower alone', async () => {
    paddock = await openPaddock(world);
    const { competitor, rival, ports, engineId } = paddock;
    const { token } = await offer(rival, { kind: 'lent', untilAt: '2026-08-01T00:00:00.000Z' });
    must(await accept(token));
    expect(
      await returnEngine(ports(), competitor, { act: paddock.uuid(), engineId }),
    ).toMatchObject(ABSENT);
    must(await returnEngine(ports(), rival, { act: paddock.uuid(), engineId }));
    expect(await names(rival)).toEqual([]);
    must(await declare(competitor, '30'));
    const rows = await world
      .ports()
      .db.execute<{ kind: string }[]>(
        'select kind from record.engine_transfer where engine_id = ? order by received_at',
        [engineId],
      );
    expect(rows.map(({ kind }) => kind)).toEqual(['lent', 'returned']);
  });
});
