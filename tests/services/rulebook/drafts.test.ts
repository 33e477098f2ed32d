import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import type { Actor } from '@/domain/access/permission';
import { discardDraft } from '@/services/rulebook/draft/discard-draft';
import { findDraft } from '@/services/rulebook/draft/find-draft';
import { saveDraft } from '@/services/rulebook/draft/save-draft';
import { findStartingContent, listStartingPoints } from '@/services/rulebook/draft/starting-points';
import { openDraft } from '@/services/rulebook/open-draft';
import { publishEdition } from '@/services/rulebook/publish-edition';
import { openWorld, type World } from '../../support/world';
import { must, type Office, openOffice, putInForce, tappetContent, writeDraft } from './build';

let world: World;
beforeAll(async () => {
  world = await openWorld();
});
afterAll(() => world.close());

const save = (
  office: Office,
  actor: Actor,
  draftId: string,
  version: number,
  content: unknown,
  act = world.ports().random.uuid(),
) =>
  saveDraft(world.ports(), actor, {
    act,
    seriesId: office.seriesId,
    draftId,
    kind: 'edition',
    version,
    title: 'First',
    content,
  });

describe('a draft', () => {
  it('is kept unfinished, and grows by versions', async () => {
    const office = await openOffice(world);
    const id = await writeDraft(world, office);
    const unfinished = {
      clauses: [{ number: '1', heading: '', words: '', force: 'mandatory' }],
      penalties: [],
    };
    expect(must(await save(office, office.official, id, 1, unfinished)).version).toBe(2);
    const found = await findDraft(world.ports(), office.second, id);
    expect(found).toMatchObject({ version: 2, content: unfinished, updatedBy: 'Ilse Törnkvist' });
  });

  it('saved twice under one act is saved once', async () => {
    const office = await openOffice(world);
    const id = await writeDraft(world, office);
    const act = world.ports().random.uuid();
    const answers = await Promise.all(
      Array.from({ length: 4 }, () => save(office, office.official, id, 1, tappetContent(), act)),
    );
    expect(answers.map((answer) => must(answer).version)).toEqual([2, 2, 2, 2]);
    expect((await findDraft(world.ports(), office.official, id))?.version).toBe(2);
  });

  it('of two officials at once takes one and tells the other', async () => {
    const office = await openOffice(world);
    const id = await writeDraft(world, office);
    const mine = { ...tappetContent(), penalties: [] };
    const [one, two] = await Promise.all([
      save(office, office.official, id, 1, mine),
      save(office, office.second, id, 1, tappetContent()),
    ]);
    const outcomes = [one, two].map((result) => (result.ok ? 'kept' : result.failure.name));
    expect(outcomes.sort()).toEqual(['kept', 'stale']);
    expect((await findDraft(world.ports(), office.official, id))?.version).toBe(2);
  });

  it('names what is wrong in its content by place and keeps the old', async () => {
    const office = await openOffice(world);
    const id = await writeDraft(world, office);
    const refused = await save(office, office.official, id, 1, {
      clauses: [{ number: '7.', heading: 'x', words: '', force: 'text' }],
      penalties: [],
    });
    expect(refused).toMatchObject({
      ok: false,
      failure: { name: 'invalid', faults: [{ pointer: '/clauses/0/number' }] },
    });
    expect((await findDraft(world.ports(), office.official, id))?.version).toBe(1);
  });

  it('does not exist for anybody but the officials of its series', async () => {
    const office = await openOffice(world);
    const other = await openOffice(world);
    const id = await writeDraft(world, office);
    for (const actor of [office.stranger, other.official]) {
      expect(await findDraft(world.ports(), actor, id)).toBeUndefined();
      expect(await save(office, actor, id, 1, tappetContent())).toMatchObject({
        failure: { name: 'absent' },
      });
    }
    const borrowed = await save({ ...office, seriesId: other.seriesId }, other.official, id, 1, {
      clauses: [],
      penalties: [],
    });
    expect(borrowed).toMatchObject({ failure: { name: 'absent' } });
  });

  it('is thrown away only as it was seen, and never once published', async () => {
    const office = await openOffice(world);
    const { seriesId, official } = office;
    const id = await writeDraft(world, office);
    must(await save(office, office.second, id, 1, tappetContent()));
    const discard = (version: number, draftId = id) =>
      discardDraft(world.ports(), official, {
        act: world.ports().random.uuid(),
        seriesId,
        draftId,
        version,
      });
    expect(await discard(1)).toMatchObject({ failure: { name: 'stale' } });
    must(await discard(2));
    expect(await findDraft(world.ports(), official, id)).toBeUndefined();
    const next = await writeDraft(world, office);
    const ports = world.ports();
    must(
      await publishEdition(ports, official, {
        act: ports.random.uuid(),
        seriesId,
        draftId: next,
        version: 1,
        inForceAt: null,
      }),
    );
    const current = await findDraft(world.ports(), official, next);
    expect(await discard(current?.version ?? 0, next)).toMatchObject({
      failure: { name: 'not-in-this-state' },
    });
  });

  it('can start from a rule set or from any earlier edition of the series', async () => {
    const office = await openOffice(world);
    const { seriesId, official } = office;
    await putInForce(world, office);
    const points = await listStartingPoints(world.ports(), official, seriesId);
    const edition = points.find((point) => point.key.startsWith('edition:'));
    expect(points.map((point) => point.key)).toEqual(
      expect.arrayContaining(['nothing', 'set:tappet', 'set:engine', 'set:weights']),
    );
    const content = (key: string, actor = official) =>
      findStartingContent(world.ports(), actor, seriesId, key);
    expect(await content(edition?.key ?? '')).toEqual(tappetContent());
    expect(await content('nothing')).toEqual({ clauses: [], penalties: [] });
    expect((await content('set:weights'))?.clauses[1]?.heading).toBe('Car');
    expect(await content(`edition:${seriesId}`)).toBeUndefined();
    expect(await content(edition?.key ?? '', office.stranger)).toBeUndefined();
  });
});

describe('an edition', () => {
  it('is not published while anything in it is ambiguous', async () => {
    const office = await openOffice(world);
    const { seriesId, official } = office;
    const content = tappetContent();
    const clauses = content.clauses.map((clause) =>
      clause.number === '4.5' && clause.requirement?.kind === 'limit'
        ? { ...clause, requirement: { ...clause.requirement, datum: '', lash: undefined } }
        : clause,
    );
    const at = clauses.findIndex((clause) => clause.number === '4.5');
    const draftId = await writeDraft(world, office, { ...content, clauses });
    const ports = world.ports();
    const request = { act: ports.random.uuid(), seriesId, draftId, version: 1, inForceAt: null };
    const refused = await publishEdition(ports, official, request);
    const pointers = refused.ok ? [] : refused.failure.faults?.map((fault) => fault.pointer);
    expect(pointers).toEqual([
      `/clauses/${at}/requirement/datum`,
      `/clauses/${at}/requirement/lash`,
    ]);
    expect(await publishEdition(world.ports(), office.stranger, request)).toMatchObject({
      failure: { name: 'absent' },
    });
  });

  it('has one draft at a time', async () => {
    const office = await openOffice(world);
    await writeDraft(world, office);
    const ports = world.ports();
    const again = await openDraft(ports, office.second, {
      act: ports.random.uuid(),
      seriesId: office.seriesId,
      id: ports.random.uuid(),
      classId: office.classId,
      title: 'Another',
      content: tappetContent(),
    });
    expect(again).toMatchObject({ failure: { name: 'not-in-this-state' } });
  });
});
