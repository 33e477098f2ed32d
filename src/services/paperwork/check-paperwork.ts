import type { EntityManager } from '@mikro-orm/postgresql';
import type { Need } from '@/domain/access/paperwork-access';
import type { Actor } from '@/domain/access/permission';
import { absent, type Failure, failure } from '@/domain/failure';
import { isId } from '@/domain/is-id';
import { toHex } from '@/domain/ledger/bytes';
import { declare } from '@/domain/paperwork/declare';
import { type Declared, declaredFacts } from '@/domain/paperwork/declared-facts';
import type { PaperworkDocument } from '@/domain/paperwork/document';
import { openRemarks } from '@/domain/paperwork/open-remarks';
import { cellWords } from '@/domain/paperwork/sheet/judge-cells';
import type { ItemRemark } from '@/domain/paperwork/state';
import {
  isComplete,
  missingWords,
  type StillMissing,
  stillMissing,
} from '@/domain/paperwork/still-missing';
import { withUsualUncertainty } from '@/domain/paperwork/usual-uncertainty';
import { fail, ok, type Result } from '@/domain/result';
import type { ClauseResult } from '@/domain/rulebook/clause-result';
import { evaluateRules } from '@/domain/rulebook/evaluate/evaluate-rules';
import type { PaperworkForm } from '@/domain/rulebook/form/form';
import { paperworkForm } from '@/domain/rulebook/form/paperwork-form';
import type { Ports } from '../ports';
import { findRules, type StandingRules } from '../rulebook/find-rules';
import { openTo } from './own-paperwork';
import {
  declaredFile,
  isKept,
  type PaperworkRow,
  readFiles,
  readPaperwork,
  readVersions,
  type StoredFile,
} from './read/read-row';
import { getVersionDocument } from './read/version-document';

export interface Returned {
  readonly document: PaperworkDocument;
  readonly remarks: readonly ItemRemark[];
}

export interface CheckedPaperwork {
  readonly standing: StandingRules;
  readonly form: PaperworkForm;
  readonly files: readonly StoredFile[];
  readonly declared: Declared;
  readonly missing: StillMissing;
  readonly results: readonly ClauseResult[];
  /** The version that came back, with what was remarked on it. */
  readonly returned: Returned | undefined;
}

export const noRules = (): Failure =>
  failure('not-in-this-state', 'No rulebook of this class is in force: there is nothing to check.');

const findReturned = async (
  em: EntityManager,
  { state, seriesId, id, versions }: PaperworkRow,
): Promise<Returned | undefined> => {
  if (state !== 'returned') return undefined;
  const document = await getVersionDocument(em, seriesId, id, versions);
  const [last] = await readVersions(em, seriesId, id);
  return { document, remarks: last?.remarks ?? [] };
};

/** The stored draft against the rules in force at an instant. */
export const checkRow = async (
  em: EntityManager,
  row: PaperworkRow,
  at: Date,
): Promise<CheckedPaperwork | undefined> => {
  const standing = await findRules(em, row.seriesId, row.classId, at);
  if (standing === undefined) return undefined;
  const files = await readFiles(em, row.seriesId, row.id);
  const kept = files.filter(isKept).map(declaredFile);
  const form = paperworkForm(standing.rules);
  const declared = declare(row.draft, form, row.layout, kept);
  const returned = await findReturned(em, row);
  const open =
    returned === undefined
      ? []
      : openRemarks(returned.remarks, returned.document, { ...row.draft, ...declared });
  return {
    standing,
    form,
    files,
    declared,
    missing: stillMissing(row.draft, standing.rules, form, row.layout, kept, open),
    returned,
    results: evaluateRules(
      standing.rules,
      withUsualUncertainty(declaredFacts(declared, standing.rules)),
      {
        carNumber: row.carNumber,
        engineId: row.engineId,
      },
    ),
  };
};

/** Paperwork by id that is the actor's own or open to them for what is needed. */
export const findOwnRow = async (
  em: EntityManager,
  actor: Actor,
  id: string,
  need: Need = 'see',
): Promise<PaperworkRow | undefined> => {
  if (!isId(id)) return undefined;
  const open = openTo(actor, need);
  const [row] = await readPaperwork(em, `p.id = ? and ${open.sql}`, [id, ...open.parameters]);
  return row;
};

/** What the saved draft lacks, and each clause held against what it declares. Nothing is changed. */
export const checkPaperwork = async (
  deps: Pick<Ports, 'db' | 'clock'>,
  actor: Actor,
  { paperworkId }: { readonly paperworkId: string },
): Promise<
  Result<
    {
      readonly rulesHash: string;
      readonly missing: string;
      readonly complete: boolean;
      readonly cells: readonly { readonly place: string; readonly detail: string }[];
      readonly results: readonly ClauseResult[];
    },
    Failure
  >
> => {
  const row = await findOwnRow(deps.db, actor, paperworkId);
  if (row === undefined) return fail(absent());
  const checked = await checkRow(deps.db, row, deps.clock.now());
  if (checked === undefined) return fail(noRules());
  const { missing, results, standing } = checked;
  return ok({
    rulesHash: toHex(standing.hash),
    missing: missingWords(missing),
    complete: isComplete(missing),
    cells: missing.cells.map(({ cell, detail }) => ({
      place: cellWords(cell),
      detail: detail ?? '',
    })),
    results,
  });
};
