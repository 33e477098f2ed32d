import { markOfState } from '@/components/look/status';
import type { BoreState } from '@/components/tappet/BoreMap';
import type { InspectionAssessment } from '@/domain/inspection/assess-inspection';
import type { JudgedReading } from '@/domain/inspection/capture/readings-that-count';
import type { RulesInForce } from '@/domain/rulebook/rules-in-force';
import { type BorePosition, boreName } from '@/domain/tappet/layout/bore-layout';
import type { Part } from './parts';
import { checksOf } from './parts';
import { resultAt, shownResult } from './shown';
import { isComplete } from './taken';

interface Seen {
  readonly positions: readonly BorePosition[];
  readonly parts: readonly Part[];
  /** Absent: the checks without numbers. */
  readonly part: Part | undefined;
  readonly assessment: InspectionAssessment;
  readonly judged: readonly JudgedReading[];
  readonly rules: RulesInForce;
  readonly outOfReach: ReadonlySet<string>;
}

/**
 * What each bore carries on the map for the part that is being read. A result shows only once the
 * bore's set is complete: "outside" while a gauge is still being rocked would bias the hand.
 */
export const boreStates = ({
  positions,
  parts,
  part,
  assessment,
  judged,
  rules,
  outOfReach,
}: Seen): { readonly bores: Record<string, BoreState>; readonly unit: string } => {
  const clause =
    part === undefined
      ? checksOf(rules).find(
          (one) =>
            one.requirement &&
            'per' in one.requirement &&
            ['bore', 'lifter'].includes(one.requirement.per),
        )
      : part.clause;
  const needed =
    part?.quantity === 'tappet-bore-diameter' || part?.quantity === 'foot-diameter'
      ? parts.filter((one) => one === part || one.quantity === 'lifter-body-diameter')
      : part === undefined
        ? []
        : [part];
  let unit = '';
  const bores = Object.fromEntries(
    positions.map((position): [string, BoreState] => {
      const key = boreName(position);
      if (outOfReach.has(key)) return [key, { status: 'could-not-be-reached' }];
      const at =
        part?.per === 'cylinder'
          ? String(position.cylinder)
          : part?.per === 'engine'
            ? 'engine'
            : key;
      const result = resultAt(assessment.findings, clause?.number, at);
      if (result === undefined || clause === undefined) return [key, { status: 'not-measured' }];
      if (!needed.every((one) => isComplete(judged, one, position, 1)))
        return [key, { status: 'not-measured' }];
      const shown = shownResult(clause, result);
      if (shown === undefined) return [key, { status: markOfState(result.state) }];
      unit = shown.unit;
      return [key, { status: markOfState(result.state), value: shown.short }];
    }),
  );
  return { bores, unit };
};
