import type { NumberFact } from '../../rulebook/evaluate/facts';
import type { RulesInForce } from '../../rulebook/rules-in-force';
import { type BoreLayout, boreName, positionsOf } from '../../tappet/layout/bore-layout';
import { checkingLiftIn, type LiftReading, lobesOf } from './cam-table';

/**
 * What a cam table declares of every bore: the largest lift of its lobe, and the duration at the lift the
 * rules name. A cam card that gives a bore its own goes before it.
 */
export const lobeFacts = (
  readings: readonly LiftReading[],
  layout: BoreLayout,
  known: readonly NumberFact[],
  rules?: Pick<RulesInForce, 'clauses'>,
): readonly NumberFact[] =>
  lobesOf(readings, checkingLiftIn(rules)).flatMap(({ lobe, quantity, largest, duration }) =>
    positionsOf(layout)
      .filter(({ valve }) => valve === lobe)
      .map(boreName)
      .flatMap((position): readonly NumberFact[] => [
        { quantity, position, value: largest.lift, standardUncertainty: 0 },
        ...(duration === undefined
          ? []
          : [
              {
                quantity: 'duration' as const,
                position,
                value: duration.value,
                standardUncertainty: 0,
              },
            ]),
      ])
      .filter(
        (fact) =>
          !known.some((own) => own.quantity === fact.quantity && own.position === fact.position),
      ),
  );
