import { useDeferredValue, useMemo } from 'react';
import { assessInspection } from '@/domain/inspection/assess-inspection';
import { checkAsksOf } from '@/domain/inspection/plan/check-asks';
import { planOf } from '@/domain/inspection/plan/plan';
import { rackOf } from '@/domain/inspection/rack/rack';
import { hideFirst } from '@/domain/inspection/second-set/hide-first';
import { boreName, positionsOf } from '@/domain/tappet/layout/bore-layout';
import type { Bay } from './bay';
import { assessSheet } from './sheet/assess-sheet';
import { askedBy, leadsBy, partsAsked } from './sheet/flow/asked';
import { nextStep, type Step } from './sheet/flow/steps';
import { isComplete } from './sheet/flow/taken';
import { baseFor } from './sheet/keys/typed-base';
import { partsOf } from './sheet/parts';
import type { SheetRows } from './sheet/recorded';
import { gaugeFor, type SetUp, scaleFor } from './sheet/set-up';
import type { Cursor, Sheet } from './sheet/sheet';

/** Works out what the sheet is at this moment; nothing while the engine's map has no bores. */
export const useBay = (
  sheet: Sheet,
  cursor: Cursor,
  setUp: SetUp,
  all: SheetRows,
  whose: Bay['whose'],
): Bay | undefined => {
  const positions = useMemo(() => positionsOf(sheet.layout), [sheet.layout]);
  const parts = useMemo(() => partsOf(sheet.rules, setUp.form), [sheet.rules, setUp.form]);
  const blind = cursor.set > 1;
  const { second } = sheet;
  const rows = useMemo(() => {
    // This device may hold the first set too: its own rows are hidden here, not by the server.
    const asked =
      second ?? (cursor.set > 1 ? { bores: [cursor.bore], set: cursor.set } : undefined);
    return asked === undefined ? all : hideFirst(all, asked);
  }, [all, second, cursor.bore, cursor.set]);
  const settled = useDeferredValue(rows);
  const assessment = useMemo(
    () => assessInspection(assessSheet.record(sheet, settled)),
    [sheet, settled],
  );
  const { judged } = useMemo(() => assessSheet.judge(rows), [rows]);
  const outOfReach = useMemo(() => assessSheet.outOfReach(rows), [rows]);
  const plan = useMemo(
    () => planOf(sheet.rules, assessment, { advice: setUp.advice }),
    [sheet.rules, assessment, setUp.advice],
  );
  const checks = useMemo(
    () => checkAsksOf(sheet.rules, assessment.facts),
    [sheet.rules, assessment.facts],
  );
  const rack = useMemo(() => rackOf(sheet.layout, rows.remarks), [sheet.layout, rows.remarks]);

  const position = positions.find((one) => boreName(one) === cursor.bore) ?? positions[0];
  if (position === undefined) return undefined;
  const part = parts.find((one) => one.key === cursor.part);
  // A second set is a full one: what it is compared with was near a limit.
  const byPlan = askedBy(setUp, plan);
  const asked: Bay['asked'] = blind ? askedBy({ ...setUp, form: 'full' }, plan) : byPlan;
  const led = partsAsked(setUp, plan, parts);
  const reached =
    part &&
    nextStep({
      part,
      parts: led,
      cursor,
      setUp,
      positions,
      position,
      judged,
      outOfReach,
      asked,
      leads: leadsBy(setUp, plan),
      second: second?.bores ?? [cursor.bore],
    });
  const unanswered = checks.some(({ answer }) => answer === undefined);
  const step: Step | undefined =
    reached?.kind === 'done' && unanswered ? { kind: 'checks' } : reached;
  const gauge = part && gaugeFor(setUp, part.quantity, sheet.gauges);
  const scale = part && scaleFor(setUp, part.quantity, gauge);
  const base = part && scale && baseFor(sheet.rules, part.quantity, scale);
  return {
    sheet,
    cursor,
    setUp,
    positions,
    position,
    parts,
    partsAsked: led,
    part,
    plan,
    asked,
    checks,
    rack,
    rows,
    judged,
    assessment,
    outOfReach,
    whose,
    blind,
    step,
    gauge,
    scale,
    base,
  };
};

/** Whether the part's set at this bore is all there. */
export const isSetComplete = ({ part, position, cursor, judged, asked }: Bay): boolean =>
  part !== undefined && isComplete(judged, part, position, cursor.set, asked);
