import type { SentRow } from '@/contracts/inspection/rows';
import type { Actor } from '@/domain/access/permission';
import type { ReadingRow } from '@/domain/inspection/capture/rows';
import { NOT_NEW, withoutNewZero } from '@/domain/inspection/second-set/new-zero';
import { acceptsReadings, STATE_WORDS } from '@/domain/inspection/state';
import type { Inspection } from '@/entities/event/inspection';
import { worksOn } from '../read/find-inspection';
import type { RecordedRows } from '../read/rows';

export interface Standing {
  readonly actor: Actor;
  readonly inspection: Inspection;
  /** Why this person may not inspect this car at all. */
  readonly interest: string | undefined;
  /** What the inspection has already; asked for only where a row's standing hangs on it. */
  readonly recorded: () => Promise<RecordedRows>;
}

const forAll = ({ actor, inspection, interest }: Standing): string | undefined => {
  if (interest !== undefined) return `${actor.name} ${interest}.`;
  if (acceptsReadings(inspection.state) || inspection.correctionReason !== '') return undefined;
  return inspection.state === 'closed'
    ? 'This arrived after the report was signed.'
    : `The inspection was ${STATE_WORDS[inspection.state]} when this arrived.`;
};

const isSecond = (row: { readonly set: number }): boolean => row.set > 1;

/** What an inspector who was not named for the car may add: a second set, its zeros, strikes of their own. */
const belongsToSecond = (row: SentRow, readings: readonly ReadingRow[], by: string): boolean => {
  if (row.kind === 'reading') return isSecond(row);
  if (row.kind === 'zero')
    return readings.filter((one) => one.zeroRunId === row.runId).every(isSecond);
  if (row.remark !== 'strike') return false;
  const struck = readings.find((one) => one.id === row.readingId);
  return struck !== undefined && isSecond(struck) && struck.takenBy === by;
};

/** Nothing is measured any more, and the report is still to be signed. */
const awaitsSignature = (state: Inspection['state']): boolean =>
  state === 'stopped' || state === 'refused';

/** What the competitor's side says at the end, whichever way a teardown ended. */
const isWitnessWord = (row: SentRow): boolean =>
  row.kind === 'remark' && (row.remark === 'witness' || row.remark === 'own-reading');

/**
 * Why rows are kept and do not count, by their ids; a row that is missing here is accepted. The named
 * inspector and a chief record everything. Another inspector without an interest takes an independent
 * second set. Readings of a second set need a zero of their own, whoever takes them.
 */
export const rowsNotCounted = async (
  standing: Standing,
  rows: readonly SentRow[],
): Promise<ReadonlyMap<string, string>> => {
  const { actor, inspection } = standing;
  const because = forAll(standing);
  const named = worksOn(actor, inspection);
  if (because !== undefined) {
    const heard = named && standing.interest === undefined && awaitsSignature(inspection.state);
    return new Map(
      rows.filter((row) => !(heard && isWitnessWord(row))).map((row) => [row.id, because]),
    );
  }
  const sent = rows.flatMap((row) => (row.kind === 'reading' ? [row] : []));
  if (named && !sent.some(isSecond)) return new Map();
  const recorded = await standing.recorded();
  const accepted = recorded.readings.filter((row) => row.standing === 'accepted');
  const readings = [
    ...accepted,
    ...sent.map((row) => ({ ...row, takenBy: actor.personId, standing: 'accepted' }) as ReadingRow),
  ];
  const zeros = [
    ...recorded.zeros.filter((row) => row.standing === 'accepted'),
    ...rows.flatMap((row) => (row.kind === 'zero' ? [{ ...row, kind: row.end }] : [])),
  ];
  const stale = withoutNewZero(readings, zeros);
  return new Map(
    rows.flatMap((row): readonly (readonly [string, string])[] => {
      if (!named && !belongsToSecond(row, readings, actor.personId))
        return [[row.id, `${actor.name} was not the inspector named for this car.`]];
      return stale.has(row.id) ? [[row.id, NOT_NEW]] : [];
    }),
  );
};
