import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import type { GrantRight } from '@/domain/access/helping';
import type { Actor } from '@/domain/access/permission';
import { createEngine } from '@/services/engine/create-engine';
import { openOriginal } from '@/services/file/open-file';
import { handInPaperwork } from '@/services/paperwork/hand-in-paperwork';
import { listOwnPaperwork } from '@/services/paperwork/read/list-own-paperwork';
import { openPaperwork } from '@/services/paperwork/read/open-paperwork';
import { openOwnVersion } from '@/services/paperwork/read/open-version';
import { saveDraft } from '@/services/paperwork/save-draft';
import { startPaperwork } from '@/services/paperwork/start-paperwork';
import { withdrawPaperwork } from '@/services/paperwork/withdraw-paperwork';
import { acceptBuilderInvitation } from '@/services/people/builder/accept-builder-invitation';
import { findBuilderInvitation } from '@/services/people/builder/find-builder-invitation';
import { inviteBuilder } from '@/services/people/builder/invite-builder';
import { listGrants } from '@/services/people/builder/list-grants';
import { withdrawGrant } from '@/services/people/builder/withdraw-grant';
import { asNow, emailOf, tokenMailedTo } from '../../support/helping';
import {
  fullDraft,
  keepPhotograph,
  layout,
  openPaddock,
  type Paddock,
  picture,
  save,
  start,
} from '../../support/paperwork';
import { addActor, openWorld, type World } from '../../support/world';
import { must } from '../rulebook/build';

let world: World;
let paddock: Paddock;
let builder: Actor;

const ABSENT = { ok: false, failure: { name: 'absent' } };

beforeAll(async () => {
  world = await openWorld();
  paddock = await openPaddock(world);
  builder = await addActor(world, 'Edda Sorrel');
});
afterAll(() => world.close());

const invite = async (
  competitor: Actor,
  rights: readonly GrantRight[],
  engineIds: readonly string[] | null,
  untilAt = '2026-12-31T00:00:00.000Z',
) => {
  const { grantId } = must(
    await inviteBuilder(paddock.ports(), competitor, {
      act: paddock.uuid(),
      email: await emailOf(world, builder),
      engineIds,
      rights,
      untilAt,
    }),
  );
  const token = await tokenMailedTo(world, await emailOf(world, builder));
  const holder = { token, name: '', agent: 'test', previousToken: undefined };
  must(await acceptBuilderInvitation(paddock.ports(), holder));
  return { grantId, actor: await asNow(world, builder) };
};

const engineOf = async (owner: Actor, reference: string): Promise<string> => {
  const id = paddock.uuid();
  const casting = { blockCasting: '41-1', headCastings: '', serial: '' };
  must(
    await createEngine(paddock.ports(), owner, {
      act: paddock.uuid(),
      id,
      reference,
      layout,
      ...casting,
    }),
  );
  return id;
};

const begun = async (owner: Actor, engineId: string, carNumber: string): Promise<string> => {
  const { seriesId, classId, uuid } = paddock;
  const input = { act: uuid(), id: uuid(), seriesId, classId, engineId, carNumber };
  return must(await startPaperwork(paddock.ports(), owner, input)).paperworkId;
};

const write = (actor: Actor, paperworkId: string, version: number, draft = fullDraft()) =>
  saveDraft(paddock.ports(), actor, { act: paddock.uuid(), paperworkId, version, draft });

describe('an invitation to a builder', () => {
  it('names the competitor, the engines and the rights, and opens nothing before it is taken up', async () => {
    const { competitor, engineId, ports, uuid } = paddock;
    const paperwork = await start(paddock, '1');
    const email = await emailOf(world, builder);
    const untilAt = '2026-12-31T00:00:00.000Z';
    const grant = {
      act: uuid(),
      email,
      engineIds: [engineId],
      rights: ['sheets'] as const,
      untilAt,
    };
    must(await inviteBuilder(ports(), competitor, grant));
    const token = await tokenMailedTo(world, email);
    expect(must(await findBuilderInvitation(ports(), token))).toEqual({
      competitor: 'Ada Lindqvist',
      email,
      engines: ['VR-2231'],
      rights: ['sheets'],
      untilAt,
      known: true,
    });
    expect(await openPaperwork(ports(), await asNow(world, builder), paperwork)).toMatchObject(
      ABSENT,
    );
    const holder = { token, name: '', agent: '', previousToken: undefined };
    must(await acceptBuilderInvitation(ports(), holder));
    expect(must(await openPaperwork(ports(), await asNow(world, builder), paperwork)).row.id).toBe(
      paperwork,
    );
    expect(await acceptBuilderInvitation(ports(), holder)).toMatchObject({
      failure: { name: 'link-spent' },
    });
  });

  it('refuses somebody else’s engine, no engine, no right, and a day that is past', async () => {
    const { competitor, rival, engineId, ports, uuid } = paddock;
    const grant = {
      act: uuid(),
      email: 'new@example.org',
      engineIds: [engineId],
      rights: ['sheets'] as const,
      untilAt: '2026-12-31T00:00:00.000Z',
    };
    expect(await inviteBuilder(ports(), rival, grant)).toMatchObject(ABSENT);
    const faulty = {
      ...grant,
      act: uuid(),
      email: 'nobody',
      engineIds: [],
      rights: [],
      untilAt: '2026-01-01T00:00:00Z',
    };
    expect(await inviteBuilder(ports(), competitor, faulty)).toMatchObject({
      failure: {
        faults: ['/email', '/engines', '/rights', '/until'].map((pointer) => ({ pointer })),
      },
    });
  });

  it('adds a builder who was not known, under the name given', async () => {
    const { competitor, engineId, ports, uuid } = paddock;
    const email = 'quill@example.org';
    const untilAt = '2026-12-31T00:00:00.000Z';
    must(
      await inviteBuilder(ports(), competitor, {
        act: uuid(),
        email,
        engineIds: [engineId],
        rights: ['sheets'],
        untilAt,
      }),
    );
    const token = await tokenMailedTo(world, email);
    const link = { token, agent: '', previousToken: undefined };
    expect(await acceptBuilderInvitation(ports(), { ...link, name: ' ' })).toMatchObject({
      failure: { faults: [{ pointer: '/name' }] },
    });
    must(await acceptBuilderInvitation(ports(), { ...link, name: 'Quill Ferrant' }));
    expect((await listGrants(ports(), competitor)).map((grant) => grant.builder)).toContain(
      'Quill Ferrant',
    );
  });
});

describe('a builder', () => {
  it('does for each of three customers what that one allows, and nothing else', async () => {
    const { ports, seriesId } = paddock;
    const [a, b, c] = await Promise.all(
      ['Ansel Reave', 'Brin Castor', 'Cyra Dane'].map((name) =>
        addActor(world, name, [{ seriesId, role: 'competitor' }]),
      ),
    );
    if (!a || !b || !c) throw new Error('three customers');
    const engines = {
      a1: await engineOf(a, 'A-1'),
      a2: await engineOf(a, 'A-2'),
      b: await engineOf(b, 'B-1'),
      c: await engineOf(c, 'C-1'),
    };
    const papers = {
      a1: await begun(a, engines.a1, '101'),
      a2: await begun(a, engines.a2, '102'),
      b: await begun(b, engines.b, '103'),
      c: await begun(c, engines.c, '104'),
    };
    await invite(a, ['sheets'], [engines.a1]);
    await invite(b, ['sheets', 'answers', 'hand-in'], null);
    const { actor } = await invite(c, ['verdicts'], null);

    const seen = await listOwnPaperwork(ports(), actor);
    const mine = seen.filter(({ carNumber }) => carNumber.startsWith('10'));
    expect(mine.map(({ competitorName, reference }) => [competitorName, reference]).sort()).toEqual(
      [
        ['Ansel Reave', 'A-1'],
        ['Brin Castor', 'B-1'],
      ],
    );
    // Sheets only: the numbers are taken, an answer is not.
    const sheets = {
      ...fullDraft(),
      answers: [{ subject: 'block-casting-number', position: 'engine', typed: '41-1' }],
    };
    expect(await write(actor, papers.a1, 1, sheets)).toMatchObject({ ok: true });
    expect(await write(actor, papers.a1, 2)).toMatchObject({
      failure: { faults: [{ pointer: '/draft/answers' }] },
    });
    expect(await write(actor, papers.a2, 1)).toMatchObject(ABSENT);
    expect(await write(actor, papers.c, 1)).toMatchObject(ABSENT);
    expect(await openPaperwork(ports(), actor, papers.c)).toMatchObject(ABSENT);
    // Everything for the second customer, handing in included.
    const paddockOfB = { ...paddock, competitor: b };
    await keepPhotograph({ ...paddockOfB, competitor: actor }, papers.b, await picture());
    const version = await save({ ...paddockOfB, competitor: actor }, papers.b, 1, fullDraft());
    const handed = { act: paddock.uuid(), paperworkId: papers.b, version };
    expect(await handInPaperwork(ports(), actor, handed)).toMatchObject({ ok: true });
    // And not for the first, where the right is missing.
    const other = { act: paddock.uuid(), paperworkId: papers.a1, version: 2 };
    expect(await handInPaperwork(ports(), actor, other)).toMatchObject({
      failure: { name: 'not-in-this-state' },
    });
    const back = { act: paddock.uuid(), paperworkId: papers.a1, version: 2, reason: '' };
    expect(await withdrawPaperwork(ports(), actor, back)).toMatchObject(ABSENT);
  });

  it('loses everything with the grant, at once, and by its date', async () => {
    const { ports, competitor, uuid, engineId } = paddock;
    const id = await start(paddock, '55');
    const photograph = await keepPhotograph(paddock, id, await picture(100, 80));
    const { grantId, actor } = await invite(
      competitor,
      ['answers', 'sheets', 'hand-in'],
      [engineId],
    );
    const file = { fileId: photograph.fileId };
    expect(await openOriginal(ports(), actor, file)).toMatchObject({ ok: true });
    expect(await withdrawGrant(ports(), paddock.rival, { act: uuid(), grantId })).toMatchObject(
      ABSENT,
    );
    for (const { id: open } of await listGrants(ports(), competitor))
      must(await withdrawGrant(ports(), competitor, { act: uuid(), grantId: open }));
    const after = await asNow(world, builder);
    expect(await openPaperwork(ports(), after, id)).toMatchObject(ABSENT);
    expect(await openOriginal(ports(), after, file)).toMatchObject(ABSENT);
    expect(await openOwnVersion(ports(), after, { paperworkId: id, number: 1 })).toMatchObject(
      ABSENT,
    );

    await invite(competitor, ['answers'], [engineId], '2026-07-12T00:00:00.000Z');
    expect(await openPaperwork(ports(), await asNow(world, builder), id)).toMatchObject({
      ok: true,
    });
    world.clock.set('2026-07-12T00:00:00.000Z');
    expect(await openPaperwork(ports(), await asNow(world, builder), id)).toMatchObject(ABSENT);
  });

  it('has nothing where the competitor’s own standing has ended', async () => {
    const { ports, rival, seriesId } = paddock;
    const engine = await engineOf(rival, 'TM-1');
    const id = await begun(rival, engine, '77');
    const { actor } = await invite(rival, ['answers'], null);
    expect(await openPaperwork(ports(), actor, id)).toMatchObject({ ok: true });
    await ports().db.execute(
      'update public.membership set ended_at = ? where person_id = ? and series_id = ?',
      [world.clock.now(), rival.personId, seriesId],
    );
    expect(await openPaperwork(ports(), await asNow(world, builder), id)).toMatchObject(ABSENT);
  });
});
