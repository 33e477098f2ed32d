import type { Actor } from '@/domain/access/permission';
import { absent, type Failure, failure, invalid } from '@/domain/failure';
import { missingFaults } from '@/domain/paperwork/missing-faults';
import { isWritable } from '@/domain/paperwork/state';
import { isComplete } from '@/domain/paperwork/still-missing';
import { fail, ok, type Result } from '@/domain/result';
import { GuardianRequest } from '@/entities/people/guardian-request';
import { performAct } from '../../act/perform-act';
import { queueMail } from '../../mail/queue-mail';
import { checkRow, findOwnRow, noRules } from '../../paperwork/check-paperwork';
import type { Ports } from '../../ports';
import { newToken, tokenHash } from '../../session/token';
import { findGuardian } from '../find-guardian';

const REQUEST_DAYS = 7;
const MOST_A_DAY = 5;
const DAY = 86_400_000;

/**
 * Sends the guardian a link by which they read this paperwork, sign, and hand it in. The answer names
 * nobody: it is kept for a repeat, and a name there would outlive the erasure of what it belongs to.
 */
export const askGuardian = async (
  deps: Pick<Ports, 'db' | 'clock' | 'random' | 'jobs' | 'site'>,
  actor: Actor,
  { act: id, paperworkId }: { readonly act: string; readonly paperworkId: string },
): Promise<Result<null, Failure>> => {
  const known = await findOwnRow(deps.db, actor, paperworkId, 'hand-in');
  if (known === undefined) return fail(absent());
  const { seriesId } = known;
  return performAct(
    deps,
    actor,
    { id, kind: 'ask-guardian', seriesId, input: { paperworkId } },
    async (act) => {
      const { em, at } = act;
      const row = await findOwnRow(em, actor, paperworkId, 'hand-in');
      if (row === undefined) return fail(absent());
      const guardian = await findGuardian(em, seriesId, row.competitorId);
      if (guardian === undefined || !isWritable(row.state))
        return fail(failure('not-in-this-state', 'Nobody’s signature is needed here.'));
      const checked = await checkRow(em, row, at);
      if (checked === undefined) return fail(noRules());
      if (!isComplete(checked.missing)) return fail(invalid(missingFaults(checked.missing)));
      const lately = { seriesId, paperworkId, askedAt: { $gt: new Date(at.getTime() - DAY) } };
      if ((await em.count(GuardianRequest, lately)) >= MOST_A_DAY) {
        const detail = 'The guardian was asked several times today. The last link still works.';
        return fail(failure('too-many-requests', detail));
      }
      const token = newToken(deps.random);
      em.persist(
        em.create(GuardianRequest, {
          seriesId,
          id: deps.random.uuid(),
          guardianshipId: guardian.id,
          paperworkId,
          tokenHash: tokenHash(token),
          askedBy: actor.personId,
          askedAt: at,
          expiresAt: new Date(at.getTime() + REQUEST_DAYS * DAY),
        }),
      );
      queueMail(deps, em, act, {
        seriesId,
        personId: guardian.guardianId ?? null,
        address: guardian.guardianEmail,
        kind: 'guardian-request',
        subject: `${row.competitorName} needs your signature: engine paperwork, car ${row.carNumber}`,
        paragraphs: [
          `Dear ${guardian.guardianName},`,
          `${row.competitorName} is under age and has prepared the engine paperwork of ${row.reference} for car ${row.carNumber} in ${row.className}, ${row.seriesName}.`,
          `Read it and hand it in with your signature. The link works for ${REQUEST_DAYS} days, once.`,
        ],
        next: 'read the paperwork and sign it, or tell the competitor what is wrong.',
        link: { label: 'Read and sign', path: `/invitations/guardian/${token}` },
      });
      return ok(null);
    },
  );
};
