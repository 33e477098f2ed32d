import { grossLift, netLift } from '../../engine/cam/lift';
import { clearanceVolume, compressionRatio } from '../../engine/compression-ratio';
import type { Derived, Input } from '../../engine/derived';
import { displacement } from '../../engine/displacement';
import type { Dimension, Written } from '../../quantity/dimension';
import { findAs } from '../../quantity/quantity';
import { getWritten } from '../../rulebook/evaluate/decision-of';
import { findNumber, type NumberFact, type Positions } from '../../rulebook/evaluate/facts';
import type { QuantityName } from '../../rulebook/quantity-catalogue';
import type { RulesInForce } from '../../rulebook/rules-in-force';

const factOf = (
  quantity: QuantityName,
  position: string,
  { value, standardUncertainty = 0, contributions }: Derived,
): NumberFact => ({
  quantity,
  position,
  // A rule names no temperature, and nothing derived is one.
  value: value as NumberFact['value'],
  standardUncertainty,
  budget: contributions.map(({ name, uncertainty }) => ({
    name,
    words: `how well the ${name.replace(/([A-Z])/g, ' $1').toLowerCase()} was measured`,
    standardUncertainty: uncertainty,
    sensitivity: 1,
    degreesOfFreedom: null,
  })),
});

/** The lash at which the rules take a valve lift; none where they name none. */
const lashIn = (rules: Pick<RulesInForce, 'clauses'>): Written | undefined => {
  for (const { requirement } of rules.clauses)
    if (requirement?.kind === 'limit' && requirement.quantity === 'valve-lift')
      return requirement.lash;
  return undefined;
};

/**
 * What is worked out from other numbers, wherever all of them were measured and it was not itself:
 * displacement from bores and stroke, a cylinder's compression ratio from its volumes, valve lift from
 * lobe lift × rocker ratio less the lash of the rule.
 */
export const derivedNumbers = (
  numbers: readonly NumberFact[],
  positions: Positions,
  rules?: Pick<RulesInForce, 'clauses'>,
): readonly NumberFact[] => {
  const facts = { numbers } as const;
  const find = <D extends Dimension>(dimension: D, quantity: QuantityName, position: string) => {
    const fact = findNumber(facts, quantity, position, 'mean');
    const value = fact && findAs(dimension, fact.value);
    return fact && value && ({ value, standardUncertainty: fact.standardUncertainty } as Input<D>);
  };
  const isMeasured = (quantity: QuantityName, position: string) =>
    findNumber(facts, quantity, position, 'mean') !== undefined;
  const stroke = find('length', 'stroke', 'engine');

  const engine = (): readonly NumberFact[] => {
    const bores = positions.cylinders.flatMap(
      ({ key }) => find('length', 'cylinder-bore', key) ?? [],
    );
    const cylinders = positions.cylinders.length;
    if (isMeasured('displacement', 'engine') || stroke === undefined) return [];
    if (cylinders === 0 || bores.length < cylinders) return [];
    return [factOf('displacement', 'engine', displacement({ bores, stroke, cylinders }))];
  };

  const ratios = positions.cylinders.flatMap(({ key }): readonly NumberFact[] => {
    const bore = find('length', 'cylinder-bore', key);
    const chamber = find('volume', 'chamber-volume', key);
    const piston = find('volume', 'piston-volume', key);
    const deck = find('length', 'deck-clearance', key);
    const gasketBore = find('length', 'gasket-bore', 'engine');
    const gasketThickness = find('length', 'gasket-thickness', 'engine');
    if (isMeasured('compression-ratio', key)) return [];
    if (!bore || !stroke || !chamber || !piston || !deck || !gasketBore || !gasketThickness)
      return [];
    const sizes = { bore, stroke, chamber, piston, deck, gasketBore, gasketThickness };
    if (clearanceVolume(sizes).n <= 0n) return [];
    return [factOf('compression-ratio', key, compressionRatio(sizes))];
  });

  const lash = rules && lashIn(rules);
  // Without the rules the lash is not known.
  const bores = rules === undefined ? [] : positions.bores;
  const lifts = bores.flatMap(({ key }): readonly NumberFact[] => {
    const lobeLift = find('length', 'lobe-lift', key);
    const rockerRatio = find('ratio', 'rocker-ratio', key);
    if (isMeasured('valve-lift', key) || !lobeLift || !rockerRatio) return [];
    const rocker = { lobeLift, rockerRatio };
    const lift =
      lash === undefined
        ? grossLift(rocker)
        : netLift(rocker, { value: getWritten(lash, 'length') });
    return [factOf('valve-lift', key, lift)];
  });
  return [...engine(), ...ratios, ...lifts];
};
