import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { decidePaperwork } from '@/services/paperwork/decide-paperwork';
import { previewBulletin } from '@/services/rulebook/bulletin/preview-bulletin';
import { tryEdition } from '@/services/rulebook/draft/try-edition';
import { grantWaiver } from '@/services/rulebook/ruling/grant-waiver';
import { listEngines } from '@/services/rulebook/ruling/list-engines';
import { handedIn, openPaddock, type Paddock } from '../../support/paperwork';
import { openWorld, type World } from '../../support/world';
import { bulletinOf, clauseOf, must, publish, tappetContent } from './build';

let world: World;
let paddock: Paddock;

beforeAll(async () => {
  world = await openWorld();
  paddock = await openPaddock(world);
  const { paperworkId } = await handedIn(paddock, '12J');
  must(
    await decidePaperwork(paddock.ports(), paddock.official, {
      act: paddock.uuid(),
      paperworkId,
      number: 1,
      decision: 'accepted',
      remarks: [],
    }),
  );
  // Handed in, but nobody has accepted it: it is not tried.
  await handedIn(paddock, '13');
});
afterAll(() => world.close());

/** The declared engine has 361.4 in³. */
const displacement = (max: string) => {
  const clause = clauseOf('3.1');
  if (clause.requirement?.kind !== 'limit') throw new Error('no limit');
  return {
    ...clause,
    words: `At most ${max} cubic inches.`,
    requirement: { ...clause.requirement, max: { text: max, unit: 'in³' } },
  };
};
const bulletin = (max: string) => bulletinOf(displacement(max), { kind: 'safety' }, 'Smaller');
const preview = (max: string) =>
  previewBulletin(paddock.ports(), paddock.official, { ...paddock, content: bulletin(max) });
const mails = () =>
  world
    .ports()
    .db.execute<{ address: string; subject: string; content: { paragraphs: string[] } }[]>(
      "select address, subject, content from public.mail where kind = 'bulletin-affects-engine'",
    );

describe('a bulletin before it is published', () => {
  it('names the accepted engines that it would make illegal, with clause and sentence', async () => {
    const checked = await preview('361.0');
    expect(checked?.trial?.sentence).toBe('This would fail 1 of 1 engine.');
    expect(checked?.trial?.failed[0]).toMatchObject({
      name: 'Car 12J, engine VR-2231',
      results: [{ clause: '3.1', pass: false }],
    });
  });

  it('names none that stay legal', async () => {
    expect((await preview('361.4'))?.trial?.failed).toEqual([]);
  });

  it('is shown to nobody but officials', async () => {
    const asked = { ...paddock, content: bulletin('361.0') };
    expect(await previewBulletin(paddock.ports(), paddock.competitor, asked)).toBeUndefined();
    expect(
      await tryEdition(paddock.ports(), paddock.competitor, {
        ...paddock,
        content: tappetContent(),
      }),
    ).toBeUndefined();
  });
});

it('a draft of the next edition is tried on the same engines', async () => {
  const content = tappetContent();
  const clauses = content.clauses.map((clause) =>
    clause.number === '3.1' ? displacement('300.0') : clause,
  ) as typeof content.clauses;
  const tried = await tryEdition(paddock.ports(), paddock.official, {
    ...paddock,
    content: { ...content, clauses },
  });
  expect(tried?.trial.failed.map((one) => one.results.map((result) => result.clause))).toEqual([
    ['3.1'],
  ]);
});

it('a waiver for a declared engine keeps it legal; a published bulletin tells the owners of the others', async () => {
  const { seriesId, classId, official, uuid, engineId } = paddock;
  const done = must(await publish(world, paddock, bulletin('361.0')));
  expect(done.affected).toHaveLength(1);
  const [mail, ...more] = await mails();
  expect(more).toEqual([]);
  expect(mail?.subject).toBe('Street Eight: bulletin 1 affects Car 12J, engine VR-2231');
  expect(mail?.content.paragraphs.at(-2)).toMatch(/^Clause 3\.1, Displacement: /);
  expect(await listEngines(paddock.ports(), official, seriesId, classId)).toEqual([
    { engineId, name: 'VR-2231', carNumber: '12J' },
  ]);
  must(
    await grantWaiver(paddock.ports(), official, {
      act: uuid(),
      id: uuid(),
      seriesId,
      classId,
      clause: '3.1',
      for: { kind: 'engine', engineId, engineName: 'VR-2231' },
      words: 'It may run to the season’s end.',
      reason: 'It was legal when it was built.',
      fromAt: world.clock.now().toISOString(),
      untilAt: '2026-12-31T06:00:00.000Z',
    }),
  );
  expect((await preview('350.0'))?.trial?.failed).toEqual([]);
});
