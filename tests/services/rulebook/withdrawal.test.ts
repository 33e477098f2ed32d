import { afterAll, beforeAll, expect, it } from 'vitest';
import { findPublicRulebook } from '@/services/rulebook/public/find-public-rulebook';
import { publishClarification } from '@/services/rulebook/ruling/publish-clarification';
import { withdrawClarification } from '@/services/rulebook/ruling/withdraw-clarification';
import { openWorld, type World } from '../../support/world';
import { must, type Office, openOffice, putInForce } from './build';

let world: World;
let office: Office;
beforeAll(async () => {
  world = await openWorld();
  office = await openOffice(world);
  await putInForce(world, office);
  const { seriesId, classId } = office;
  must(
    await publishClarification(world.ports(), office.official, {
      ...ids(),
      seriesId,
      classId,
      clause: '4.1',
      question: 'Are ceramic feet flat?',
      answer: 'Yes.',
    }),
  );
});
afterAll(() => world.close());

const ids = () => {
  const { random } = world.ports();
  return { act: random.uuid(), id: random.uuid() };
};
const withdraw = (change: object = {}, actor = office.official) =>
  withdrawClarification(world.ports(), actor, {
    ...ids(),
    seriesId: office.seriesId,
    classId: office.classId,
    clarification: 1,
    reason: 'A later bulletin says it better.',
    ...change,
  });
const book = async (at: Date) => {
  const [series] = await world
    .ports()
    .db.execute<{ slug: string }[]>('select slug from public.series where id = ?', [
      office.seriesId,
    ]);
  return findPublicRulebook(world.ports(), {
    series: series?.slug ?? '',
    raceClass: 'street-eight',
    on: () => at,
  });
};

it('names what is missing, and is for officials', async () => {
  expect(await withdraw({ reason: ' ' })).toMatchObject({
    failure: { faults: [{ pointer: '/reason' }] },
  });
  expect(await withdraw({ clarification: 2 })).toMatchObject({ failure: { name: 'absent' } });
  expect(await withdraw({}, office.stranger)).toMatchObject({ failure: { name: 'absent' } });
});

it('ends the clarification from its millisecond on, in the rules and in their hash', async () => {
  world.clock.advance(3_600_000);
  const at = world.clock.now();
  const before = await book(at);
  expect(must(await withdraw()).number).toBe(1);
  const after = await book(at);
  const eve = await book(new Date(at.getTime() - 1));
  expect(after?.standing?.rules.clarifications).toEqual([]);
  expect(after?.standing?.rules.withdrawals).toEqual([1]);
  expect(after?.standing?.hash).not.toEqual(before?.standing?.hash);
  expect(eve?.standing?.rules.clarifications).toHaveLength(1);
  expect(eve?.standing?.hash).toEqual(before?.standing?.hash);
});

it('leaves the clarification to be read, with its withdrawal, and happens once', async () => {
  const found = await book(world.clock.now());
  expect(found?.published.clarifications).toHaveLength(1);
  expect(found?.published.withdrawals).toMatchObject([{ number: 1, clarification: 1 }]);
  expect(found?.publications.map((one) => `${one.kind} ${one.number}`).sort()).toEqual([
    'clarification 1',
    'edition 1',
    'withdrawal 1',
  ]);
  expect(await withdraw()).toMatchObject({ failure: { name: 'not-in-this-state' } });
  const lines = await world
    .ports()
    .db.execute(`select index from record.ledger_line where kind = 'clarification-withdrawn'`);
  expect(lines).toHaveLength(1);
});
