import { afterAll, beforeAll, expect, it } from 'vitest';
import type { Actor } from '@/domain/access/permission';
import { Engine } from '@/entities/paperwork/engine';
import { Paperwork } from '@/entities/paperwork/paperwork';
import { readCorrections } from '@/services/engine/engine-history';
import { correctEngine } from '@/services/engine/facts/correct-engine';
import { decidePaperwork } from '@/services/paperwork/decide-paperwork';
import { withdrawPaperwork } from '@/services/paperwork/withdraw-paperwork';
import { handedIn, openPaddock, type Paddock, save, start } from '../../support/paperwork';
import { openWorld, type World } from '../../support/world';
import { must } from '../rulebook/build';

let world: World;
let paddock: Paddock;

beforeAll(async () => {
  world = await openWorld();
  paddock = await openPaddock(world);
});
afterAll(() => world.close());

const db = () => paddock.ports().db;
const engine = () => db().findOneOrFail(Engine, { id: paddock.engineId }, { refresh: true });
const WAS = { blockCasting: '41-7730', headCastings: '62-118, 62-118', serial: '0417' };

const correct = async (change: object = {}, actor: Actor = paddock.competitor) =>
  correctEngine(paddock.ports(), actor, {
    act: paddock.uuid(),
    engineId: paddock.engineId,
    version: (await engine()).version,
    ...WAS,
    ...change,
  });

const lines = () =>
  db().execute<{ text: string; refs: object }[]>(
    `select c.content as text, l.line::jsonb -> 'refs' as refs from record.ledger_line l
     join record.ledger_content c on c.series_id = l.series_id and c.line_index = l.index
       and c.role = 'correction'
     where l.kind = 'engine-corrected' and l.series_id = ? order by l.index`,
    [paddock.seriesId],
  );

const answersOf = async (id: string) => {
  const { draft } = await db().findOneOrFail(Paperwork, { id }, { refresh: true });
  return (draft as { answers: { subject: string; typed: string }[] }).answers;
};

it('is the owner’s act; what stood there before stays on record, and in the ledger', async () => {
  for (const other of [paddock.rival, paddock.official])
    expect(await correct({ serial: '0418' }, other)).toMatchObject({
      failure: { name: 'absent' },
    });
  must(await correct({ serial: ' 0418 ' }));
  expect(await engine()).toMatchObject({ ...WAS, serial: '0418' });
  const [correction] = await readCorrections(db(), paddock.engineId);
  expect(correction).toMatchObject({
    by: 'Ada Lindqvist',
    before: WAS,
    now: { ...WAS, serial: '0418' },
  });
  const [line, ...more] = await lines();
  expect(more).toEqual([]);
  expect(JSON.parse(line?.text ?? '')).toEqual({ before: WAS, now: { ...WAS, serial: '0418' } });
  expect(line?.refs).toEqual({ engine: paddock.engineId, correction: correction?.id });
});

it('done twice by one act is done once; nothing changed, too much written or an old page is refused', async () => {
  const asked = {
    act: paddock.uuid(),
    engineId: paddock.engineId,
    version: (await engine()).version,
    ...WAS,
    serial: '0419',
  };
  must(await correctEngine(paddock.ports(), paddock.competitor, asked));
  must(await correctEngine(paddock.ports(), paddock.competitor, asked));
  expect((await lines()).length).toBe(2);
  const again = { ...asked, act: paddock.uuid(), serial: '0420' };
  expect(await correctEngine(paddock.ports(), paddock.competitor, again)).toMatchObject({
    failure: { name: 'stale' },
  });
  expect(await correct({ serial: '0419' })).toMatchObject({
    failure: { faults: [{ pointer: '/blockCasting' }] },
  });
  expect(await correct({ headCastings: 'x'.repeat(121) })).toMatchObject({
    failure: { faults: [{ pointer: '/headCastings' }] },
  });
});

it('a draft that said the same follows; one that said otherwise is left as it is', async () => {
  const said = await start(paddock, '31');
  const subject = 'block-casting-number';
  expect(await answersOf(said)).toContainEqual(
    expect.objectContaining({ subject, typed: '41-7730' }),
  );
  const otherwise = await start(paddock, '32');
  const answers = [{ subject, position: 'engine', typed: '41-9999' }];
  await save(paddock, otherwise, 1, { answers, sheets: [], note: '' });
  must(await correct({ serial: '0419', blockCasting: '41-7780' }));
  expect(await answersOf(said)).toContainEqual(
    expect.objectContaining({ subject, typed: '41-7780' }),
  );
  expect(await answersOf(otherwise)).toEqual(answers);
});

it('no more once paperwork of it is accepted, until that is withdrawn', async () => {
  const { ports, uuid, official, competitor } = paddock;
  const { paperworkId } = await handedIn(paddock, '33');
  const facts = { blockCasting: '41-7780', serial: '0421' };
  must(await correct(facts));
  must(
    await decidePaperwork(ports(), official, {
      act: uuid(),
      paperworkId,
      number: 1,
      decision: 'accepted',
      remarks: [],
    }),
  );
  expect(await correct({ ...facts, serial: '0422' })).toMatchObject({
    failure: { name: 'not-in-this-state' },
  });
  const { version } = await db().findOneOrFail(Paperwork, { id: paperworkId }, { refresh: true });
  const withdrawn = { act: uuid(), paperworkId, version, reason: 'Wrong serial.' };
  must(await withdrawPaperwork(ports(), competitor, withdrawn));
  must(await correct({ ...facts, serial: '0422' }));
  expect((await engine()).serial).toBe('0422');
});
