import { positionKey, type ReadingRow, type ZeroRow } from '../capture/rows';

type Read = Pick<
  ReadingRow,
  'id' | 'quantity' | 'place' | 'set' | 'method' | 'zeroRunId' | 'occurredAt'
>;
type Zeroed = Pick<ZeroRow, 'runId' | 'kind' | 'occurredAt'>;

export const NOT_NEW =
  'An independent second set needs a zero of its own, taken after the first set.';

const at = (row: { readonly occurredAt: string }) => Date.parse(row.occurredAt);

/**
 * Readings of a second set that do not stand on a new zero: their run has no opening zero, was opened
 * before the last reading of an earlier set at that bore, or served such a reading. Readings off a
 * gauge without a zero run are not among them.
 *
 * @returns the ids of those readings
 */
export const withoutNewZero = (
  readings: readonly Read[],
  zeros: readonly Zeroed[],
): ReadonlySet<string> => {
  const isStale = (reading: Read): boolean => {
    if (reading.set < 2 || reading.method !== 'comparative') return false;
    const key = positionKey(reading.place, 'bore');
    const earlier = readings.filter(
      (one) =>
        one.quantity === reading.quantity &&
        one.set < reading.set &&
        positionKey(one.place, 'bore') === key,
    );
    const opening = zeros.find(
      (zero) => zero.kind === 'opening' && zero.runId === reading.zeroRunId,
    );
    return (
      opening === undefined ||
      earlier.some((one) => one.zeroRunId === reading.zeroRunId || at(one) > at(opening))
    );
  };
  return new Set(readings.filter(isStale).map(({ id }) => id));
};
