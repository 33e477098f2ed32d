import type { BulletinContent, RulebookContent } from '@/contracts/rulebook/read-rulebook';
import { readRulebookContent } from '@/contracts/rulebook/read-rulebook';
import type { Actor } from '@/domain/access/permission';
import type { Failure } from '@/domain/failure';
import type { Result } from '@/domain/result';
import type { Effective } from '@/domain/rulebook/bulletin';
import type { Clause } from '@/domain/rulebook/clause';
import { TAPPET_RULE_SET } from '@/domain/rulebook/rule-sets/tappet';
import { publishBulletin } from '@/services/rulebook/bulletin/publish-bulletin';
import { openBulletin } from '@/services/rulebook/draft/open-bulletin';
import { openDraft } from '@/services/rulebook/open-draft';
import { publishEdition } from '@/services/rulebook/publish-edition';
import { addClass } from '@/services/series/add-class';
import { openSeason } from '@/services/series/open-season';
import { addActor, addSeries, type World } from '../../support/world';

export const must = <T>(result: Result<T, Failure>): T => {
  if (!result.ok) {
    const { name, detail, faults } = result.failure;
    throw new Error(`${name}: ${detail} ${JSON.stringify(faults ?? [])}`);
  }
  return result.value;
};

/** The tappet rule set as an official's draft would hold it. */
export const tappetContent = (): RulebookContent =>
  must(
    readRulebookContent({ clauses: TAPPET_RULE_SET.clauses, penalties: TAPPET_RULE_SET.penalties }),
  );

export interface Office {
  readonly seriesId: string;
  readonly seasonId: string;
  readonly classId: string;
  readonly official: Actor;
  readonly second: Actor;
  readonly stranger: Actor;
}

let count = 0;

/** A series of its own with a season, a class and two officials. */
export const openOffice = async (world: World): Promise<Office> => {
  count += 1;
  const seriesId = await addSeries(world, `series-${count}`);
  const official = await addActor(world, 'Ilse Törnkvist', [{ seriesId, role: 'official' }]);
  const second = await addActor(world, 'Bram Okafor', [{ seriesId, role: 'official' }]);
  const stranger = await addActor(world, 'Nell Varga', [{ seriesId, role: 'competitor' }]);
  const ports = world.ports();
  const { random } = ports;
  const { seasonId } = must(
    await openSeason(ports, official, {
      act: random.uuid(),
      seriesId,
      id: random.uuid(),
      name: '2026',
      startsOn: '2026-01-01',
      endsOn: '2026-12-31',
    }),
  );
  const { classId } = must(
    await addClass(world.ports(), official, {
      act: random.uuid(),
      seriesId,
      id: random.uuid(),
      seasonId,
      name: 'Street Eight',
    }),
  );
  return { seriesId, seasonId, classId, official, second, stranger };
};

export const writeDraft = async (
  world: World,
  { seriesId, classId, official }: Office,
  content: RulebookContent = tappetContent(),
): Promise<string> => {
  const ports = world.ports();
  const id = ports.random.uuid();
  const act = ports.random.uuid();
  must(await openDraft(ports, official, { act, seriesId, id, classId, title: 'First', content }));
  return id;
};

/** The class's next edition, published at the clock's time. */
export const putInForce = async (
  world: World,
  office: Office,
  inForceAt: string | null = null,
  content: RulebookContent = tappetContent(),
): Promise<{ readonly number: number; readonly hash: string }> => {
  const draftId = await writeDraft(world, office, content);
  const ports = world.ports();
  const act = ports.random.uuid();
  const { seriesId } = office;
  return must(
    await publishEdition(ports, office.official, { act, seriesId, draftId, version: 1, inForceAt }),
  );
};

export const clauseOf = (number: string, change: Partial<Clause> = {}): Clause => {
  const clause = TAPPET_RULE_SET.clauses.find((one) => one.number === number);
  if (clause === undefined) throw new Error(`no clause ${number}`);
  return { ...clause, ...change };
};

/** A bulletin that replaces one clause by other words. */
export const bulletinOf = (
  clause: Clause,
  effective: Effective,
  title = 'Words',
): BulletinContent =>
  ({
    title,
    reason: 'The old words were read in two ways.',
    changes: [{ kind: 'replace', clause }],
    effective,
  }) as BulletinContent;

export const typeBulletin = async (
  world: World,
  { seriesId, classId, official }: Office,
  content: BulletinContent,
): Promise<string> => {
  const ports = world.ports();
  const id = ports.random.uuid();
  const act = ports.random.uuid();
  must(await openBulletin(ports, official, { act, seriesId, id, classId, content }));
  return id;
};

export const publishTyped = (world: World, { seriesId, official }: Office, draftId: string) => {
  const ports = world.ports();
  const act = ports.random.uuid();
  return publishBulletin(ports, official, { act, seriesId, draftId, version: 1 });
};

export const publish = async (world: World, office: Office, content: BulletinContent) =>
  publishTyped(world, office, await typeBulletin(world, office, content));
