import { getQuantityEntry, type QuantityName, readingsFor } from '../rulebook/quantity-catalogue';
import type { RulesInForce } from '../rulebook/rules-in-force';
import { type Completeness, completenessOf } from '../tappet/completeness';
import {
  type BoreLayout,
  type BorePosition,
  boreName,
  positionsOf,
} from '../tappet/layout/bore-layout';
import type { JudgedReading } from './capture/readings-that-count';
import { positionKey, type RemarkRow } from './capture/rows';

/** What is read at every bore for the mandatory clauses; advisory ones are optional. */
export const neededPerBore = (rules: Pick<RulesInForce, 'clauses'>): readonly QuantityName[] => [
  ...new Set(
    rules.clauses.flatMap(({ force, requirement }) => {
      if (force !== 'mandatory' || requirement?.kind !== 'limit') return [];
      const { source, per } = getQuantityEntry(requirement.quantity);
      const all = requirement.sample.kind === 'all' && (per === 'bore' || per === 'lifter');
      return all && source === 'lifter-sheet' ? readingsFor(requirement.quantity) : [];
    }),
  ),
];

const positionFor = (layout: BoreLayout, { place }: JudgedReading): BorePosition | undefined => {
  const key = positionKey(place, 'bore');
  const known = positionsOf(layout).find((position) => boreName(position) === key);
  if (known !== undefined || place.valve === '') return known;
  return {
    bank: place.bank,
    cylinder: Number(place.cylinder),
    valve: place.valve,
    index: place.index,
  };
};

/**
 * Which bores have everything that the mandatory clauses need, which lack some, and which readings
 * stand at no bore of this engine. Where no clause needs a bore, any reading makes it measured.
 */
export const completenessBy = (
  rules: Pick<RulesInForce, 'clauses'>,
  layout: BoreLayout,
  counting: readonly JudgedReading[],
  remarks: readonly RemarkRow[],
): Completeness => {
  const needed = neededPerBore(rules);
  const byKey = new Map<string, { position: BorePosition; read: Set<QuantityName> }>();
  for (const reading of counting) {
    const position = positionFor(layout, reading);
    if (position === undefined || reading.row.referencePart !== undefined) continue;
    const key = boreName(position);
    const entry = byKey.get(key) ?? { position, read: new Set() };
    byKey.set(key, entry);
    entry.read.add(reading.row.quantity);
  }
  const expected = new Set(positionsOf(layout).map(boreName));
  const measured = [...byKey]
    .filter(([key, { read }]) => !expected.has(key) || needed.every((name) => read.has(name)))
    .map(([, { position }]) => position);
  const unreached = remarks
    .filter((row) => row.kind === 'not-reached' && row.standing === 'accepted')
    .flatMap(({ place, reason }) => {
      const key = positionKey(place, 'bore');
      const position = positionsOf(layout).find((row) => boreName(row) === key);
      return position === undefined ? [] : [{ position, reason }];
    });
  return completenessOf(layout, measured, unreached);
};
