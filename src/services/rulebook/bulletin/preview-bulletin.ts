import type { BulletinContent } from '@/contracts/rulebook/read-rulebook';
import { type Actor, may } from '@/domain/access/permission';
import { withChanges } from '@/domain/rulebook/ambiguity/bulletin-faults';
import { type Trial, tryRules } from '@/domain/rulebook/trial/try-rules';
import type { Ports } from '../../ports';
import { type Amended, type BulletinChecked, checkBulletin, findAmended } from './check-bulletin';
import { readPastFindings } from './past-findings';

export interface BulletinPreview extends BulletinChecked {
  /** The same change held against what was found on engines before; nothing while there are faults. */
  readonly found: Trial | undefined;
}

/** The rules that a bulletin's writer writes onto. */
export const findRulesToAmend = async (
  deps: Pick<Ports, 'db' | 'clock'>,
  actor: Actor,
  input: {
    readonly seriesId: string;
    readonly classId: string;
    readonly content: BulletinContent;
  },
): Promise<Amended | undefined> =>
  may(actor, 'rulebook.write', input.seriesId)
    ? findAmended(deps.db, input.seriesId, input.classId, input.content, deps.clock.now())
    : undefined;

/** What publishing a bulletin now would do, for those who write it. */
export const previewBulletin = async (
  deps: Pick<Ports, 'db' | 'clock'>,
  actor: Actor,
  input: {
    readonly seriesId: string;
    readonly classId: string;
    readonly content: BulletinContent;
  },
): Promise<BulletinPreview | undefined> => {
  const { seriesId, classId, content } = input;
  if (!may(actor, 'rulebook.write', seriesId)) return undefined;
  const checked = await checkBulletin(deps.db, seriesId, classId, content, deps.clock.now());
  if (checked === undefined || checked.trial === undefined) {
    return checked && { ...checked, found: undefined };
  }
  const { before } = checked;
  const after = { ...before, clauses: withChanges(before.clauses, content.changes) };
  const findings = await readPastFindings(deps.db, seriesId, [classId]);
  return { ...checked, found: tryRules(after, findings, before) };
};
