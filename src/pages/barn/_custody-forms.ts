import type { FieldProblem } from '@/components/form/problems';
import { problemsOf } from '@/components/form/problems';
import { custodyRequest, heldPartRequest, sealRequest } from '@/contracts/custody/custody';
import { readBody } from '@/contracts/read-body';
import { readMoment } from '@/contracts/rulebook/moment';
import type { Actor } from '@/domain/access/permission';
import type { Failure } from '@/domain/failure';
import type { Result } from '@/domain/result';
import { recordCustody } from '@/services/custody/record-custody';
import { recordSeal } from '@/services/custody/record-seal';
import { tagPart } from '@/services/custody/tag-part';
import type { Ports } from '@/services/ports';

export type Typed = ReadonlyMap<string, string>;

/** Where to go next, or what keeps the form here. */
export type Posted = { readonly to: string } | { readonly problems: readonly FieldProblem[] };

const refused = (failure: Failure): Posted => ({ problems: problemsOf(failure) });

const fields = (typed: Typed, zone: string) => {
  const text = (name: string) => (typed.get(name) ?? '').trim();
  /** As typed where it is no moment: the contract says what is wrong with it. */
  const instant = (name: string) => readMoment(text(name), zone)?.toISOString() ?? text(name);
  return { text, instant };
};

const answered = (result: Result<unknown, Failure>, to: string): Posted =>
  result.ok ? { to } : refused(result.failure);

/** A part is taken into custody; leads to its page, with the tag to print. */
export const postTag = async (
  ports: Ports,
  actor: Actor,
  typed: Typed,
  { inspectionId, zone }: { readonly inspectionId: string; readonly zone: string },
): Promise<Posted> => {
  const { text, instant } = fields(typed, zone);
  const id = ports.random.uuid();
  const read = readBody(heldPartRequest, {
    act: text('act'),
    id,
    inspectionId,
    kind: text('kind'),
    words: text('words'),
    placeOnEngine: text('placeOnEngine'),
    clause: text('clause'),
    bag: text('bag'),
    takenFrom: text('takenFrom'),
    takenBy: text('takenBy'),
    place: text('place'),
    takenAt: instant('takenAt'),
    holdUntil: text('holdUntil') === '' ? null : instant('holdUntil'),
  });
  if (!read.ok) return refused(read.failure);
  const done = await tagPart(ports, actor, read.value);
  return done.ok ? { to: `/barn/parts/${done.value.id}?new=yes` } : refused(done.failure);
};

export const postSeal = async (
  ports: Ports,
  actor: Actor,
  typed: Typed,
  where: { readonly inspectionId: string; readonly zone: string; readonly to: string },
): Promise<Posted> => {
  const { text, instant } = fields(typed, where.zone);
  const [kind = '', state = ''] = text('sealAct').split(' ');
  const read = readBody(sealRequest, {
    act: text('act'),
    id: ports.random.uuid(),
    inspectionId: where.inspectionId,
    kind,
    state: state === '' ? null : state,
    number: text('number'),
    place: text('sealPlace'),
    doneBy: text('doneBy'),
    note: text('note'),
    occurredAt: instant('sealAt'),
  });
  if (read.ok) return answered(await recordSeal(ports, actor, read.value), where.to);
  const NAMES: Record<string, string> = {
    kind: 'sealAct',
    state: 'sealAct',
    place: 'sealPlace',
    occurredAt: 'sealAt',
  };
  const problems = problemsOf(read.failure).map(({ field, message }) =>
    field === undefined ? { message } : { field: NAMES[field] ?? field, message },
  );
  return { problems };
};

/** A hand-over, an opening, a closing or the return of a held part. */
export const postCustody = async (
  ports: Ports,
  actor: Actor,
  typed: Typed,
  { partId, zone }: { readonly partId: string; readonly zone: string },
): Promise<Posted> => {
  const { text, instant } = fields(typed, zone);
  const kind = text('kind');
  const only = (kinds: readonly string[], name: string) =>
    kinds.includes(kind) ? { [name]: text(name) } : {};
  const read = readBody(custodyRequest, {
    act: text('act'),
    id: ports.random.uuid(),
    partId,
    kind,
    place: text('place'),
    reason: text('reason'),
    giver: text('giver'),
    occurredAt: instant('occurredAt'),
    ...only(['hand-over', 'returned'], 'receiver'),
    ...only(['bag-opened'], 'witness'),
    ...only(['bag-opened', 'bag-closed'], 'bag'),
  });
  if (!read.ok) return refused(read.failure);
  return answered(await recordCustody(ports, actor, read.value), `/barn/parts/${partId}`);
};
