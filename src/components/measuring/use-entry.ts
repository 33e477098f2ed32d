import { useCallback, useEffect, useRef, useState } from 'react';
import type { PadKey } from '@/components/tappet/keys';
import type { SentReading, SentRow } from '@/contracts/inspection/rows';
import { assessInspection } from '@/domain/inspection/assess-inspection';
import { planOf } from '@/domain/inspection/plan/plan';
import { boreName } from '@/domain/tappet/layout/bore-layout';
import type { Bay, Hands } from './bay';
import { uuidV7 } from './queue/uuid-v7';
import { assessSheet } from './sheet/assess-sheet';
import { askedBy, leadsBy } from './sheet/flow/asked';
import { nextStep, type Step, scopeOf } from './sheet/flow/steps';
import { takenAt } from './sheet/flow/taken';
import { questionOf } from './sheet/keys/question';
import { NOTHING, press, type Typed, typedNumber } from './sheet/keys/typing';
import { closingRow, openingRow, readingRow, strikeRow } from './sheet/rows';
import { isComparative } from './sheet/set-up';
import type { Cursor } from './sheet/sheet';
import { useHold } from './use-hold';

/** The step after a reading, by a plan that knows it: a value near a limit asks for more at once. */
const stepAfter = (bay: Bay, row: SentReading): Step | undefined => {
  const { sheet, setUp, rows, part, cursor } = bay;
  if (part === undefined) return undefined;
  const then = assessSheet.withReading(rows, row);
  const plan = planOf(sheet.rules, assessInspection(assessSheet.record(sheet, then)), {
    advice: setUp.advice,
  });
  return nextStep({
    ...bay,
    part,
    parts: bay.partsAsked,
    cursor: { ...cursor, cell: undefined },
    judged: assessSheet.judge(then).judged,
    asked: bay.blind ? bay.asked : askedBy(setUp, plan),
    leads: leadsBy(setUp, plan),
    second: sheet.second?.bores ?? [cursor.bore],
  });
};

/** Where Enter alone leads; nothing where a number is wanted. A bore after another is of the same set. */
const onward = (step: Step, set: number): Parameters<Hands['go']>[0] | undefined => {
  if (step.kind === 'bore') return { bore: boreName(step.to), cell: undefined, set };
  if (step.kind === 'part')
    return { part: step.part.key, bore: boreName(step.to), cell: undefined, set: 1 };
  if (step.kind === 'checks') return { part: 'checks', cell: undefined, set: 1 };
  return undefined;
};

/**
 * Takes the keys: digits gather into a number, Enter keeps it on the device and goes on. Keys that come
 * while a reading is being kept wait until the screen has moved on to the next cell: no number is entered
 * twice, and none runs into the next.
 */
export const useEntry = (bay: Bay | undefined, hands: Hands) => {
  const { go, record } = hands;
  const [typed, setTyped] = useState<Typed>(NOTHING);
  const [asked, setAsked] = useState<string>();
  const [problem, setProblem] = useState<string>();
  const [turn, settle] = useState(0);
  const busy = useRef(false);
  const waiting = useRef<(PadKey | (() => void))[]>([]);
  const typing = useRef(NOTHING);
  const { onTyped, drop } = useHold(bay, go);
  const type = useCallback((to: Typed) => {
    typing.current = to;
    setTyped(to);
  }, []);

  /** Old readings of a run whose zero moved are struck, and their bores read again. */
  const redo = useCallback(
    async (runId: string) => {
      const run = bay?.assessment.runs.find((one) => one.runId === runId);
      if (run === undefined) return;
      const rows = run.readings.map(({ row, place }) => strikeRow(row.id, place, 'zero-moved'));
      if (rows.length > 0 && !(await record(rows))) return;
      const [first] = run.bores;
      go({
        ...(first === undefined ? {} : { bore: first }),
        part: 'tappet-bore-diameter',
        cell: undefined,
        closed: undefined,
        run: undefined,
        zero: undefined,
      });
    },
    [bay, go, record],
  );

  const enter = async () => {
    const entered = typing.current;
    if (bay?.part === undefined || bay.step === undefined) return;
    const { part, position, cursor, step, gauge, scale, setUp, sheet, judged } = bay;
    const value = scale && typedNumber(entered, scale.decimals, bay.base);
    setProblem(undefined);
    if (step.kind === 'closed') {
      const failed = bay.assessment.runs.some((run) => run.runId === step.runId && !run.held);
      if (value !== undefined) setProblem('Read what came of the zero first, then Enter alone.');
      else if (failed) await redo(step.runId);
      else go({ closed: undefined });
      return;
    }
    if (value === undefined) {
      const to = onward(step, cursor.set);
      if (to !== undefined) go(to);
      return;
    }
    if (gauge === undefined || scale === undefined) {
      setProblem('Choose the gauge under “More” first.');
      return;
    }
    const cell = step.kind === 'cell' ? step.cell : undefined;
    if (cell === undefined && step.kind !== 'opening' && step.kind !== 'closing') {
      setProblem('This set is complete. Enter alone goes on; tap a cell to read it again.');
      return;
    }
    const comparative = isComparative(setUp, part.quantity);
    const question = questionOf(
      { value, unit: scale.unit, comparative, quantity: part.quantity },
      gauge,
    );
    if (question !== undefined && asked !== value) {
      setAsked(value);
      setProblem(question);
      return;
    }
    // Digits of the next number may come while this one is being kept.
    type(NOTHING);
    drop();
    setAsked(undefined);
    // Kept with where it leads: whatever ends the page in between, it opens again where the hand is.
    const kept = async (sent: readonly SentRow[], to: Partial<Cursor>) => {
      if (await record(sent, to)) go(to);
      else {
        type(entered);
        setProblem(
          'This device did not keep it: its storage is closed or full. Nothing typed is lost; try Enter again, or write it down.',
        );
      }
    };
    const base = { gauge, setUp, gauges: sheet.gauges, value: { text: value, unit: scale.unit } };
    if (step.kind === 'opening') {
      const run = { id: uuidV7(), scope: scopeOf(setUp, position, cursor.set) };
      await kept([openingRow({ ...base, runId: run.id })], { run, zero: undefined });
    } else if (step.kind === 'closing') {
      const runId = cursor.run?.id ?? '';
      const to = { run: undefined, zero: undefined, closed: runId };
      await kept([closingRow({ ...base, runId })], to);
    } else if (cell !== undefined) {
      const taken = takenAt(judged, part, position, cursor.set).get(cell);
      const row = readingRow({
        ...base,
        part,
        position,
        cell,
        repeat: (taken?.row.repeat ?? 0) + 1,
        set: cursor.set,
        runId: comparative ? cursor.run?.id : undefined,
      });
      // A single reading a place: its number is read back at the next one, without a key between.
      const single = bay.asked(part, position).length === 1 && taken === undefined;
      const after = single ? stepAfter(bay, row) : undefined;
      await kept([row], {
        cell: undefined,
        ...(after && after.kind !== 'part' ? onward(after, cursor.set) : {}),
        ...(after?.kind === 'closing' ? { zero: 'closing' } : {}),
      });
    }
  };

  const latestEnter = useRef(enter);
  latestEnter.current = enter;
  const take = useCallback(
    (key: PadKey | (() => void)) => {
      if (busy.current) {
        waiting.current.push(key);
        return;
      }
      // A tap that leads elsewhere comes after the keys before it: no reading lands where it was not read.
      if (typeof key === 'function') {
        busy.current = true;
        key();
        settle((turn) => turn + 1);
        return;
      }
      if (key !== 'enter') {
        const next = press(typing.current, key);
        onTyped(typing.current, next);
        type(next);
        return;
      }
      busy.current = true;
      void latestEnter.current().finally(() => settle((turn) => turn + 1));
    },
    [type, onTyped],
  );
  useEffect(() => {
    if (turn === 0) return;
    busy.current = false;
    while (waiting.current.length > 0 && !busy.current) {
      const [key] = waiting.current.splice(0, 1);
      if (key !== undefined) take(key);
    }
  }, [turn, take]);

  const clear = useCallback(() => {
    type(NOTHING);
    drop();
    setProblem(undefined);
  }, [type, drop]);
  return { typed, problem, take, clear, redo };
};
