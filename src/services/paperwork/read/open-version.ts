import type { EntityManager } from '@mikro-orm/postgresql';
import { type Actor, seriesWhere } from '@/domain/access/permission';
import { absent, type Failure } from '@/domain/failure';
import { isId } from '@/domain/is-id';
import { declaredFacts } from '@/domain/paperwork/declared-facts';
import type { PaperworkDocument } from '@/domain/paperwork/document';
import { withUsualUncertainty } from '@/domain/paperwork/usual-uncertainty';
import { fail, ok, type Result } from '@/domain/result';
import type { ClauseResult } from '@/domain/rulebook/clause-result';
import { evaluateRules } from '@/domain/rulebook/evaluate/evaluate-rules';
import type { RulesInForce } from '@/domain/rulebook/rules-in-force';
import type { Ports } from '../../ports';
import { getRules } from '../../rulebook/find-rules';
import { findOwnRow } from '../check-paperwork';
import { type PaperworkRow, readPaperwork, readVersions, type VersionRow } from './read-row';
import { getVersionDocument } from './version-document';

export interface OpenedVersion {
  readonly row: PaperworkRow;
  readonly version: VersionRow;
  readonly document: PaperworkDocument;
  /** As they stood when it was handed in. */
  readonly rules: RulesInForce;
  readonly results: readonly ClauseResult[];
  readonly versions: readonly VersionRow[];
}

/** Whether the version's content was erased; its hash, its line and its place stay. */
const isErased = async (
  em: EntityManager,
  seriesId: string,
  paperworkId: string,
  number: number,
): Promise<boolean> => {
  const [row] = await em.execute<{ erased: boolean }[]>(
    `select document is null as erased from record.paperwork_version
     where series_id = ? and paperwork_id = ? and number = ?`,
    [seriesId, paperworkId, number],
  );
  return row?.erased === true;
};

export const openRow = async (
  em: EntityManager,
  row: PaperworkRow,
  number: number,
): Promise<OpenedVersion | undefined> => {
  const versions = await readVersions(em, row.seriesId, row.id);
  const version = versions.find((one) => one.number === number);
  if (version === undefined || (await isErased(em, row.seriesId, row.id, number))) return undefined;
  const document = await getVersionDocument(em, row.seriesId, row.id, number);
  const rules = await getRules(em, row.seriesId, Buffer.from(version.rulesHash, 'hex'));
  const results = evaluateRules(rules, withUsualUncertainty(declaredFacts(document, rules)), {
    carNumber: document.carNumber,
    engineId: document.engine.id,
  });
  return { row, version, document, rules, results, versions };
};

/** One version of the actor's own paperwork. */
export const openOwnVersion = async (
  deps: Pick<Ports, 'db'>,
  actor: Actor,
  input: { readonly paperworkId: string; readonly number: number },
): Promise<Result<OpenedVersion, Failure>> => {
  const row = await findOwnRow(deps.db, actor, input.paperworkId);
  const opened = row && (await openRow(deps.db, row, input.number));
  return opened === undefined ? fail(absent()) : ok(opened);
};

/** Paperwork that was handed in to a series where the actor decides on it. */
export const findDecidableRow = async (
  em: EntityManager,
  actor: Actor,
  id: string,
): Promise<PaperworkRow | undefined> => {
  const open = seriesWhere(actor, 'paperwork.decide');
  if (!isId(id) || open.length === 0) return undefined;
  const where = 'p.id = ? and p.versions > 0 and p.series_id = any(?::uuid[])';
  const [row] = await readPaperwork(em, where, [id, `{${open.join(',')}}`]);
  return row;
};
