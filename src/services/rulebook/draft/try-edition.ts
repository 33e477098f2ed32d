import type { RulebookContent } from '@/contracts/rulebook/read-rulebook';
import { type Actor, may } from '@/domain/access/permission';
import type { RulesInForce } from '@/domain/rulebook/rules-in-force';
import { type Trial, tryRules } from '@/domain/rulebook/trial/try-rules';
import type { Ports } from '../../ports';
import { readAcceptedEngines } from '../bulletin/past-cases';
import { readPastFindings } from '../bulletin/past-findings';
import { findRules } from '../find-rules';

export interface EditionTried {
  /** The rules it follows: of this class, or of the class of the same name in an earlier season. */
  readonly before: RulesInForce | undefined;
  /** On accepted paperwork. */
  readonly trial: Trial;
  /** On what was found in closed inspections. */
  readonly found: Trial;
}

/** A sound draft held against accepted paperwork and findings of this class, in this and earlier seasons. */
export const tryEdition = async (
  deps: Pick<Ports, 'db' | 'clock'>,
  actor: Actor,
  input: {
    readonly seriesId: string;
    readonly classId: string;
    readonly content: RulebookContent;
  },
): Promise<EditionTried | undefined> => {
  const { seriesId, classId, content } = input;
  if (!may(actor, 'rulebook.write', seriesId)) return undefined;
  const classes = await deps.db.execute<{ id: string }[]>(
    `select c.id from public.class c
     join public.season s on s.series_id = c.series_id and s.id = c.season_id
     join public.class own on own.series_id = c.series_id and own.slug = c.slug
     join public.season o on o.series_id = own.series_id and o.id = own.season_id
     where own.series_id = ? and own.id = ? and s.starts_on <= o.starts_on
     order by s.starts_on desc`,
    [seriesId, classId],
  );
  const now = deps.clock.now();
  let before: RulesInForce | undefined;
  for (const { id } of classes) {
    before ??= (await findRules(deps.db, seriesId, id, now))?.rules;
  }
  const ids = classes.map((one) => one.id);
  const engines = await readAcceptedEngines(deps.db, seriesId, ids);
  const findings = await readPastFindings(deps.db, seriesId, ids);
  const after = { clauses: content.clauses, waivers: before?.waivers ?? [] };
  return {
    before,
    trial: tryRules(after, engines, before),
    found: tryRules(after, findings, before),
  };
};
