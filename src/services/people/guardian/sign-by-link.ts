import { GRANT_RIGHTS } from '@/domain/access/helping';
import type { Actor } from '@/domain/access/permission';
import { type Failure, failure } from '@/domain/failure';
import { fail, ok, type Result } from '@/domain/result';
import { GuardianRequest } from '@/entities/people/guardian-request';
import { Guardianship } from '@/entities/people/guardianship';
import { type HandInDeps, handInPaperwork, type Receipt } from '../../paperwork/hand-in-paperwork';
import { type OpenedPaperwork, openPaperwork } from '../../paperwork/read/open-paperwork';
import type { Ports } from '../../ports';
import { tokenHash } from '../../session/token';
import { personOfLink } from '../person-of-link';

const spent = (): Failure =>
  failure('link-spent', 'This was signed already, or the link is too old. Ask for a new one.');

interface Asked {
  readonly request: GuardianRequest;
  readonly guardianship: Guardianship;
}

const findAsked = async (
  { db, clock }: Pick<Ports, 'db' | 'clock'>,
  token: string,
): Promise<Asked | undefined> => {
  const open = { tokenHash: tokenHash(token), usedAt: null, expiresAt: { $gt: clock.now() } };
  const request = await db.findOne(GuardianRequest, open);
  if (request === null) return undefined;
  const { seriesId, guardianshipId: id } = request;
  const guardianship = await db.findOne(Guardianship, { seriesId, id, endedAt: null });
  return guardianship === null ? undefined : { request, guardianship };
};

/** The guardian as the link makes them known: for this series and this competitor, nothing else. */
const guardianActor = (
  { request, guardianship }: Asked,
  person: { readonly id: string; readonly name: string },
  now: Date,
): Actor => ({
  personId: person.id,
  name: person.name,
  sessionId: request.id,
  authenticatedAt: now.toISOString(),
  siteAdmin: false,
  standings: [],
  helping: [
    {
      as: 'guardian',
      competitorId: guardianship.minorId,
      competitorName: '',
      seriesIds: [guardianship.seriesId],
      rights: GRANT_RIGHTS,
    },
  ],
});

export interface GuardianAsked extends OpenedPaperwork {
  readonly guardianName: string;
}

/** The paperwork that a guardian is asked to sign, for whoever holds the link. */
export const findGuardianRequest = async (
  deps: Pick<Ports, 'db' | 'clock'>,
  token: string,
): Promise<Result<GuardianAsked, Failure>> => {
  const asked = await findAsked(deps, token);
  if (asked === undefined) return fail(spent());
  const { guardianName: name, id } = asked.guardianship;
  const reader = guardianActor(asked, { id, name }, deps.clock.now());
  const opened = await openPaperwork(deps, reader, asked.request.paperworkId);
  return opened.ok ? ok({ ...opened.value, guardianName: name }) : opened;
};

/** Signs and hands in by the link that was sent to the guardian's address; it works once. */
export const signByLink = async (
  deps: HandInDeps,
  input: { readonly act: string; readonly token: string; readonly version: number },
): Promise<Result<Receipt, Failure>> => {
  const asked = await findAsked(deps, input.token);
  if (asked === undefined) return fail(spent());
  const { guardianEmail: email, guardianName: name, seriesId, id } = asked.guardianship;
  const person = await deps.db.fork().transactional(async (em) => {
    const found = await personOfLink(deps, em, { email, name });
    if (found.ok)
      await em.nativeUpdate(Guardianship, { seriesId, id }, { guardianId: found.value.id });
    return found;
  });
  if (!person.ok) return person;
  const actor = guardianActor(asked, person.value, deps.clock.now());
  const { act, version } = input;
  const { paperworkId, id: requestId } = asked.request;
  return handInPaperwork(
    deps,
    actor,
    { act, paperworkId, version },
    'e-mailed-link',
    async (em) => {
      const open = { seriesId, id: requestId, usedAt: null };
      const used = await em.nativeUpdate(GuardianRequest, open, { usedAt: deps.clock.now() });
      return used === 1 ? undefined : spent();
    },
  );
};
