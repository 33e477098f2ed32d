import { markOfState } from '@/components/look/status';
import type { BoreState } from '@/components/tappet/BoreMap';
import type { InspectionAssessment } from '@/domain/inspection/assess-inspection';
import type { JudgedReading } from '@/domain/inspection/capture/readings-that-count';
import type { CheckAsk } from '@/domain/inspection/plan/check-asks';
import type { RackedLifter } from '@/domain/inspection/rack/rack';
import { type BorePosition, boreName } from '@/domain/tappet/layout/bore-layout';
import { keyOf } from './flow/asked';
import { type Asked, isComplete } from './flow/taken';
import type { Part } from './parts';
import { resultAt, shownResult } from './shown';

interface Seen {
  readonly positions: readonly BorePosition[];
  readonly parts: readonly Part[];
  readonly part: Part;
  readonly assessment: InspectionAssessment;
  readonly judged: readonly JudgedReading[];
  readonly outOfReach: ReadonlySet<string>;
  readonly asked: Asked;
}

export interface States {
  readonly bores: Record<string, BoreState>;
  readonly unit: string;
}

/** A result of bore or foot stands on the lifter as well. */
const neededFor = (part: Part, parts: readonly Part[]): readonly Part[] =>
  part.quantity === 'tappet-bore-diameter' || part.quantity === 'foot-diameter'
    ? parts.filter((one) => one === part || one.quantity === 'lifter-body-diameter')
    : [part];

/**
 * What each bore carries on the map for the part that is being read. A result shows only once the
 * bore's set is complete: "outside" while a gauge is still being rocked would bias the hand.
 */
export const boreStates = (seen: Seen): States => {
  const { positions, parts, part, assessment, judged, outOfReach, asked } = seen;
  const { clause } = part;
  const needed = neededFor(part, parts);
  let unit = '';
  const bores = Object.fromEntries(
    positions.map((position): [string, BoreState] => {
      const key = boreName(position);
      if (outOfReach.has(key)) return [key, { status: 'could-not-be-reached' }];
      const result = resultAt(assessment.findings, clause?.number, keyOf(part, position));
      if (result === undefined || clause === undefined) return [key, { status: 'not-measured' }];
      if (!needed.every((one) => isComplete(judged, one, position, 1, asked)))
        return [key, { status: 'not-measured' }];
      const shown = shownResult(clause, result);
      if (shown === undefined) return [key, { status: markOfState(result.state) }];
      unit = shown.unit;
      return [key, { status: markOfState(result.state), value: shown.short }];
    }),
  );
  return { bores, unit };
};

/**
 * What each bore carries while checks are answered: how many of its own are. No check makes a bore
 * "within"; one that does not comply is outside.
 */
export const checkStates = (
  positions: readonly BorePosition[],
  checks: readonly CheckAsk[],
  assessment: InspectionAssessment,
  outOfReach: ReadonlySet<string>,
): States => ({
  unit: '',
  bores: Object.fromEntries(
    positions.map((position): [string, BoreState] => {
      const key = boreName(position);
      if (outOfReach.has(key)) return [key, { status: 'could-not-be-reached' }];
      const here = checks.filter((check) => check.position === key);
      const answered = here.filter(({ answer }) => answer !== undefined);
      const broken = answered.some(
        ({ clause }) =>
          resultAt(assessment.findings, clause.number, key)?.state === 'does-not-comply',
      );
      return [
        key,
        {
          status: broken ? 'outside' : 'not-measured',
          ...(here.length === 0 ? {} : { value: `${answered.length}/${here.length}` }),
        },
      ];
    }),
  ),
});

const RACK_WORDS = { 'in-engine': undefined, racked: 'out', returned: 'in' } as const;

/** What each bore carries while lifters come out and go in. */
export const rackStates = (rack: readonly RackedLifter[]): States => ({
  unit: '',
  bores: Object.fromEntries(
    rack.map(({ lifter, state, into }): [string, BoreState] => [
      lifter,
      {
        status: 'not-measured',
        value: into !== undefined && into !== lifter ? 'moved' : RACK_WORDS[state],
      },
    ]),
  ),
});
