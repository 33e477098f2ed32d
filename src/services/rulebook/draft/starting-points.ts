import { type RulebookContent, readRulebookContent } from '@/contracts/rulebook/read-rulebook';
import { type Actor, may } from '@/domain/access/permission';
import { isId } from '@/domain/is-id';
import { ENGINE_RULE_SET } from '@/domain/rulebook/rule-sets/engine';
import { TAPPET_RULE_SET } from '@/domain/rulebook/rule-sets/tappet';
import { WEIGHTS_RULE_SET } from '@/domain/rulebook/rule-sets/weights';
import type { Ports } from '../../ports';
import { findRules } from '../find-rules';

export interface StartingPoint {
  /** `nothing`, `set:tappet`, `edition:<id>`, or `rules:<class>` for an edition with its bulletins. */
  readonly key: string;
  readonly label: string;
  readonly about: string;
  /** The class it comes from, where it comes from one. */
  readonly classId?: string;
}

const SETS = [TAPPET_RULE_SET, ENGINE_RULE_SET, WEIGHTS_RULE_SET];

const fixed: readonly StartingPoint[] = [
  { key: 'nothing', label: 'Nothing', about: 'An empty rulebook.' },
  ...SETS.map(({ id, title, about }) => ({
    key: `set:${id}`,
    label: `Rule set: ${title}`,
    about: `${about} Numbers are common practice or examples, for the series to set.`,
  })),
];

/** What a new edition can be copied from: rule sets, and every edition ever published in the series. */
export const listStartingPoints = async (
  deps: Pick<Ports, 'db' | 'clock'>,
  actor: Actor,
  seriesId: string,
): Promise<readonly StartingPoint[]> => {
  if (!may(actor, 'rulebook.write', seriesId)) return [];
  const rows = await deps.db.execute<
    {
      id: string;
      number: number;
      title: string;
      class_id: string;
      class: string;
      season: string;
    }[]
  >(
    `select p.id, p.number, p.title, p.class_id, c.name as class, s.name as season
     from record.rule_publication p
     join public.class c on c.series_id = p.series_id and c.id = p.class_id
     join public.season s on s.series_id = c.series_id and s.id = c.season_id
     where p.series_id = ? and p.kind = 'edition'
     order by s.starts_on desc, c.name, p.number desc`,
    [seriesId],
  );
  const classes = await deps.db.execute<{ id: string; class: string; season: string }[]>(
    `select c.id, c.name as class, s.name as season from public.class c
     join public.season s on s.series_id = c.series_id and s.id = c.season_id
     where c.series_id = ? and exists (select from record.rule_publication p
       where p.series_id = c.series_id and p.class_id = c.id and p.kind = 'bulletin')
     order by s.starts_on desc, c.name`,
    [seriesId],
  );
  return [
    ...fixed,
    ...classes.map((row) => ({
      key: `rules:${row.id}`,
      label: `${row.class}, season ${row.season}, as in force now`,
      about: 'The edition with its bulletins taken in.',
      classId: row.id,
    })),
    ...rows.map((row) => ({
      key: `edition:${row.id}`,
      label: `${row.class}, season ${row.season}, edition ${row.number}`,
      about: row.title,
      classId: row.class_id,
    })),
  ];
};

/** The content to start from; nothing if there is no such thing in this series. */
export const findStartingContent = async (
  deps: Pick<Ports, 'db' | 'clock'>,
  actor: Actor,
  seriesId: string,
  key: string,
): Promise<RulebookContent | undefined> => {
  if (!may(actor, 'rulebook.write', seriesId)) return undefined;
  if (key === 'nothing') return { clauses: [], penalties: [] };
  const [kind = '', id = ''] = key.split(':');
  if (kind === 'set') {
    const set = SETS.find((one) => one.id === id);
    return set && read({ clauses: set.clauses, penalties: set.penalties });
  }
  if (!isId(id)) return undefined;
  if (kind === 'rules') {
    const standing = await findRules(deps.db, seriesId, id, deps.clock.now());
    return standing && read(standing.rules);
  }
  const [row] = await deps.db.execute<{ content: unknown }[]>(
    `select document::jsonb -> 'content' as content from record.rule_publication
     where series_id = ? and id = ? and kind = 'edition'`,
    [seriesId, id],
  );
  return row && read(row.content as Pick<RulebookContent, 'clauses' | 'penalties'>);
};

const read = (from: { readonly clauses: unknown; readonly penalties: unknown }) => {
  const content = readRulebookContent({ clauses: from.clauses, penalties: from.penalties });
  return content.ok ? content.value : undefined;
};
