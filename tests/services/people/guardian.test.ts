import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import type { Actor } from '@/domain/access/permission';
import { handInPaperwork } from '@/services/paperwork/hand-in-paperwork';
import { openPaperwork } from '@/services/paperwork/read/open-paperwork';
import { askGuardian } from '@/services/people/guardian/ask-guardian';
import { endGuardianship, markMinor } from '@/services/people/guardian/mark-minor';
import { findGuardianRequest, signByLink } from '@/services/people/guardian/sign-by-link';
import { asNow, emailOf, tokenMailedTo } from '../../support/helping';
import {
  fullDraft,
  keepPhotograph,
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
const GUARDIAN = 'guardian@example.org';

beforeAll(async () => {
  world = await openWorld();
  paddock = await openPaddock(world);
});
afterAll(() => world.close());

const mark = (email: string, by: Actor = paddock.official) =>
  markMinor(paddock.ports(), by, {
    act: paddock.uuid(),
    seriesId: paddock.seriesId,
    personId: paddock.competitor.personId,
    guardianName: 'Maud Lindqvist',
    guardianEmail: email,
  });

const end = () =>
  endGuardianship(paddock.ports(), paddock.official, {
    act: paddock.uuid(),
    seriesId: paddock.seriesId,
    personId: paddock.competitor.personId,
  });

const complete = async (carNumber: string) => {
  const paperworkId = await start(paddock, carNumber);
  await keepPhotograph(paddock, paperworkId, await picture());
  return { paperworkId, version: await save(paddock, paperworkId, 1, fullDraft()) };
};

const handIn = (actor: Actor, paper: { paperworkId: string; version: number }) =>
  handInPaperwork(paddock.ports(), actor, { act: paddock.uuid(), ...paper });

const signatures = (paperworkId: string) =>
  world.ports().db.execute<{ method: string; minor: string; guardian: string }[]>(
    `select g.method, m.name as minor, p.name as guardian from record.guardian_signature g
     join public.person m on m.id = g.minor_id join public.person p on p.id = g.guardian_id
     where g.paperwork_id = ?`,
    [paperworkId],
  );

describe('a competitor under age', () => {
  it('is marked by an official, with a guardian of another address and no birth date', async () => {
    expect(await mark(GUARDIAN, paddock.rival)).toMatchObject({ failure: { name: 'absent' } });
    expect(await mark(await emailOf(world, paddock.competitor))).toMatchObject({
      failure: { faults: [{ pointer: '/guardianEmail' }] },
    });
    must(await mark(GUARDIAN));
    expect(await mark(GUARDIAN)).toMatchObject({ failure: { name: 'not-in-this-state' } });
  });

  it('writes everything and does not hand in; the guardian is asked and signs by the link, once', async () => {
    const paper = await complete('1');
    expect(await handIn(paddock.competitor, paper)).toMatchObject({
      failure: { name: 'not-in-this-state' },
    });
    const { paperworkId } = paper;
    const ask = { act: paddock.uuid(), paperworkId };
    expect(await askGuardian(paddock.ports(), paddock.rival, ask)).toMatchObject({
      failure: { name: 'absent' },
    });
    must(await askGuardian(paddock.ports(), paddock.competitor, ask));
    // What is kept for a repeat names nobody: no erasure would reach it.
    const [answered] = await world
      .ports()
      .db.execute<{ kept: string }[]>('select a::text as kept from record.act a where a.id = ?', [
        ask.act,
      ]);
    expect(answered?.kept).toContain('ask-guardian');
    expect(answered?.kept).not.toContain('Lindqvist');
    const token = await tokenMailedTo(world, GUARDIAN);
    const seen = must(await findGuardianRequest(paddock.ports(), token));
    expect([seen.guardianName, seen.row.id, seen.row.version]).toEqual([
      'Maud Lindqvist',
      paperworkId,
      2,
    ]);
    // Written in after the guardian looked: what was read is not what would be handed in.
    const version = await save(paddock, paperworkId, 2, fullDraft({ '1 intake bore': '0.8441' }));
    const sign = (at: number) =>
      signByLink(paddock.ports(), { act: paddock.uuid(), token, version: at });
    expect(await sign(2)).toMatchObject({ failure: { name: 'stale' } });
    must(await sign(version));
    expect(await sign(version)).toMatchObject({ failure: { name: 'link-spent' } });
    expect(await signatures(paperworkId)).toEqual([
      { method: 'e-mailed-link', minor: 'Ada Lindqvist', guardian: 'Maud Lindqvist' },
    ]);
    const [kept] = await world.ports().db.execute<{ name: string }[]>(
      `select p.name from record.paperwork_version v join public.person p on p.id = v.handed_in_by
       where v.paperwork_id = ?`,
      [paperworkId],
    );
    expect(kept?.name).toBe('Maud Lindqvist');
    const receipts = await world
      .ports()
      .db.execute<{ address: string }[]>(
        "select address from public.mail where kind = 'paperwork-receipt' order by address",
      );
    expect(receipts).toHaveLength(2);
  });

  it('has nothing incomplete sent to the guardian', async () => {
    const paperworkId = await start(paddock, '2');
    const ask = { act: paddock.uuid(), paperworkId };
    expect(await askGuardian(paddock.ports(), paddock.competitor, ask)).toMatchObject({
      failure: { name: 'invalid' },
    });
  });

  it('has a guardian with an account sign after a fresh sign-in, and nobody else', async () => {
    must(await end());
    const guardian = await addActor(world, 'Maud Lindqvist the Elder');
    must(await mark(await emailOf(world, guardian)));
    const paper = await complete('3');
    const actor = await asNow(world, guardian);
    expect(await openPaperwork(paddock.ports(), actor, paper.paperworkId)).toMatchObject({
      ok: true,
    });
    const stale = { ...actor, authenticatedAt: '2026-07-11T19:30:00.000Z' };
    expect(await handIn(stale, paper)).toMatchObject({
      failure: { name: 'fresh-sign-in-required' },
    });
    must(await handIn(actor, paper));
    expect(await signatures(paper.paperworkId)).toEqual([
      { method: 'fresh-sign-in', minor: 'Ada Lindqvist', guardian: 'Maud Lindqvist the Elder' },
    ]);
    must(await end());
    expect(
      await openPaperwork(paddock.ports(), await asNow(world, guardian), paper.paperworkId),
    ).toMatchObject({
      failure: { name: 'absent' },
    });
    must(await handIn(paddock.competitor, await complete('4')));
  });
});
