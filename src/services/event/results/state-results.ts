import { type Actor, may } from '@/domain/access/permission';
import { absent, type Failure, type Fault, failure, invalid } from '@/domain/failure';
import { isId } from '@/domain/is-id';
import { sha256, utf8 } from '@/domain/ledger/bytes';
import { canonicalJson } from '@/domain/ledger/canonical';
import { fail, ok, type Result } from '@/domain/result';
import { Entry } from '@/entities/event/entry';
import { performAct } from '../../act/perform-act';
import type { Ports } from '../../ports';
import { lockEvent } from '../lock-event';
import { officialClasses, resultsStateOf } from './official-classes';
import { type ClassResults, readResults } from './read-results';

export interface ResultsStated {
  readonly number: number;
}

interface Asked {
  readonly act: string;
  readonly seriesId: string;
  readonly eventId: string;
  readonly classId: string;
}

type Deps = Pick<Ports, 'db' | 'clock' | 'random' | 'jobs'>;

const state = (
  deps: Deps,
  actor: Actor,
  { act, seriesId, eventId, classId }: Asked,
  kind: 'official' | 'taken-back',
  input: unknown,
  say: (results: ClassResults) => Result<Readonly<Record<string, unknown>>, Failure>,
): Promise<Result<ResultsStated, Failure>> =>
  performAct(
    deps,
    actor,
    { id: act, kind: `results-${kind}`, seriesId, input },
    async ({ em, at, append, line }) => {
      const event = await lockEvent(em, seriesId, eventId);
      if (event === null) return fail(absent());
      const results = (await readResults(em, { seriesId, eventId })).find(
        (one) => one.classId === classId,
      );
      if (results === undefined) return fail(absent());
      const said = say(results);
      if (!said.ok) return said;
      const number = results.statements.length + 1;
      const document = canonicalJson({
        v: '1',
        type: 'tagwire/results',
        series: seriesId,
        event: eventId,
        subject: results.className,
        number: String(number),
        state: kind,
        ...said.value,
      });
      append('result_statement', [
        {
          series_id: seriesId,
          event_id: eventId,
          class_id: classId,
          number,
          kind,
          document,
          hash: sha256(utf8(document)),
          stated_by: actor.personId,
          stated_at: at.toISOString(),
        },
      ]);
      const official = new Set((await officialClasses(em, { seriesId, eventId })).keys());
      if (kind === 'official') official.add(classId);
      else official.delete(classId);
      event.resultsState = resultsStateOf(await em.find(Entry, { seriesId, eventId }), official);
      line({
        seriesId,
        kind: kind === 'official' ? 'results-official' : 'results-taken-back',
        contents: { results: { text: document, open: true } },
        refs: { event: eventId },
      });
      return ok({ number });
    },
  );

/**
 * Makes a class's results official, as they stand: by a person, once every picked car has its verdict.
 * A car that has none is named with the reason why it does not hold the results up.
 */
export const makeOfficial = async (
  deps: Deps,
  actor: Actor,
  input: Asked & {
    readonly exceptions: readonly { readonly entryId: string; readonly reason: string }[];
  },
): Promise<Result<ResultsStated, Failure>> => {
  const { seriesId, eventId, classId, exceptions } = input;
  if (!may(actor, 'event.manage', seriesId) || !isId(eventId) || !isId(classId))
    return fail(absent());
  const asked = { eventId, classId, exceptions };
  return state(deps, actor, input, 'official', asked, ({ official, className, lines }) => {
    if (official)
      return fail(
        failure('not-in-this-state', `The results of ${className} are official already.`),
      );
    if (!lines.some(({ position }) => position !== null))
      return fail(failure('not-in-this-state', `No position is written in ${className} yet.`));
    const faults: Fault[] = [];
    const excepted = lines
      .filter(({ held }) => held)
      .map(({ entryId, carNumber: car }) => {
        const reason = exceptions.find((one) => one.entryId === entryId)?.reason.trim() ?? '';
        if (reason === '')
          faults.push({
            pointer: `/exceptions/${entryId}`,
            detail: `Car ${car} is held for inspection. Decide on it, or write why the results do not wait for it.`,
          });
        return { car, reason };
      });
    if (faults.length > 0) return fail(invalid(faults));
    return ok({
      exceptions: excepted,
      cars: lines.map(({ carNumber: car, position, scratched, notice, decision }) => ({
        car,
        position: position === null ? '' : String(position),
        scratched: scratched ? 'yes' : 'no',
        ...(notice === null ? {} : { notice, decision }),
      })),
    });
  });
};

/** Makes official results unofficial again, in public and with the reason. */
export const takeBackResults = async (
  deps: Deps,
  actor: Actor,
  input: Asked & { readonly reason: string },
): Promise<Result<ResultsStated, Failure>> => {
  const { seriesId, eventId, classId } = input;
  const reason = input.reason.trim();
  if (!may(actor, 'event.manage', seriesId) || !isId(eventId) || !isId(classId))
    return fail(absent());
  if (reason === '')
    return fail(
      invalid([{ pointer: `/takeBack-${classId}`, detail: 'Write why they are taken back.' }]),
    );
  return state(deps, actor, input, 'taken-back', { eventId, classId, reason }, (results) =>
    results.official
      ? ok({ reason })
      : fail(failure('not-in-this-state', `The results of ${results.className} are not official.`)),
  );
};
