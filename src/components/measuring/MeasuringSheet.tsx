import { useCallback, useDeferredValue, useEffect, useMemo, useRef, useState } from 'react';
import { SavedLine } from '@/components/look/SavedLine';
import { Keypad } from '@/components/tappet/Keypad';
import type { PadKey } from '@/components/tappet/keys';
import { MeasuringLayout, TurningBoreMap } from '@/components/tappet/MeasuringLayout';
import { Tally } from '@/components/tappet/Tally';
import type { SentRow } from '@/contracts/inspection/rows';
import { assessInspection, type InspectionAssessment } from '@/domain/inspection/assess-inspection';
import { boreName, positionsOf } from '@/domain/tappet/layout/bore-layout';
import { type PadPanel, PanelBeside } from './panels/PanelBeside';
import { RunPanel } from './panels/RunPanel';
import { WorkPanel } from './panels/WorkPanel';
import { uuidV7 } from './queue/uuid-v7';
import { assessSheet } from './sheet/assess-sheet';
import { boreStates } from './sheet/bore-states';
import { partsOf } from './sheet/parts';
import { questionOf } from './sheet/question';
import { closingRow, openingRow, readingRow } from './sheet/rows';
import { gaugeFor, isComparative, scaleFor } from './sheet/set-up';
import type { Sheet } from './sheet/sheet';
import { boresIn, nextStep, scopeOf } from './sheet/steps';
import { takenAt } from './sheet/taken';
import { NOTHING, press, type Typed, typedNumber } from './sheet/typing';
import { useCapture } from './use-capture';
import { usePlace } from './use-place';

/** The measuring screen: every key goes here, every act to the device first. */
export const MeasuringSheet = ({ sheet }: { readonly sheet: Sheet }) => {
  const { cursor, setUp, isRead, go, setUpAs } = usePlace(sheet, 'lifter-body-diameter');
  const latest = useRef<InspectionAssessment>(undefined);
  const capture = useCapture(sheet, () => assessSheet.told(latest.current));
  const [typed, setTyped] = useState<Typed>(NOTHING);
  const [asked, setAsked] = useState<string>();
  const [panel, setPanel] = useState<PadPanel>();
  const [problem, setProblem] = useState<string>();
  const [turn, settle] = useState(0);
  const busy = useRef(false);
  const waiting = useRef<PadKey[]>([]);
  const typing = useRef(NOTHING);
  const type = useCallback((to: Typed) => {
    typing.current = to;
    setTyped(to);
  }, []);

  const positions = useMemo(() => positionsOf(sheet.layout), [sheet.layout]);
  const parts = useMemo(() => partsOf(sheet.rules, setUp.form), [sheet.rules, setUp.form]);
  const position = positions.find((one) => boreName(one) === cursor.bore) ?? positions[0];
  const part = parts.find((one) => one.quantity === cursor.part);
  const rows = useDeferredValue(capture.rows);
  const assessment = useMemo(
    () => assessInspection(assessSheet.record(sheet, rows)),
    [sheet, rows],
  );
  latest.current = assessment;
  const { judged } = useMemo(() => assessSheet.judge(capture.rows), [capture.rows]);
  const outOfReach = useMemo(() => assessSheet.outOfReach(capture.rows), [capture.rows]);

  const standing =
    part === undefined || position === undefined
      ? undefined
      : { part, cursor, setUp, positions, position, judged, zeros: capture.rows.zeros, outOfReach };
  const step = standing === undefined ? undefined : nextStep(standing);
  const gauge = part && gaugeFor(setUp, part.quantity, sheet.gauges);
  const scale = part && scaleFor(setUp, part.quantity, gauge);
  const value = scale && typedNumber(typed, scale.decimals);

  const record = useCallback(
    async (sent: readonly SentRow[]) => {
      try {
        await capture.record(sent);
        setProblem(undefined);
        return true;
      } catch {
        setProblem(
          'This device did not keep it: its storage is closed or full. Nothing typed is lost; try Enter again, or write it down.',
        );
        return false;
      }
    },
    [capture.record],
  );

  const enter = async () => {
    const entered = typing.current;
    const value = scale && typedNumber(entered, scale.decimals);
    if (standing === undefined || step === undefined || position === undefined || !part) return;
    if (value === undefined) {
      if (step.kind === 'bore') go({ bore: boreName(step.to), cell: undefined, set: 1 });
      return;
    }
    if (gauge === undefined || scale === undefined) {
      setProblem('Choose the gauge under “Set up” first.');
      return;
    }
    if (step.kind === 'bore' || step.kind === 'done') {
      setProblem('This set is complete. Enter alone goes on; tap a cell to read it again.');
      return;
    }
    const comparative = isComparative(setUp, part.quantity);
    const question = questionOf({ value, unit: scale.unit, comparative, quantity: part.quantity });
    if (question !== undefined && asked !== value) {
      setAsked(value);
      setProblem(question);
      return;
    }
    // Digits of the next number may come while this one is being kept.
    type(NOTHING);
    setAsked(undefined);
    const kept = async (sent: readonly SentRow[]) => {
      const done = await record(sent);
      if (!done) type(entered);
      return done;
    };
    const base = { gauge, setUp, gauges: sheet.gauges, value: { text: value, unit: scale.unit } };
    if (step.kind === 'opening') {
      const run = { id: uuidV7(), scope: scopeOf(setUp, position) };
      if (await kept([openingRow({ ...base, runId: run.id })])) go({ run, zero: undefined });
    } else if (step.kind === 'closing') {
      const runId = cursor.run?.id ?? '';
      if (await kept([closingRow({ ...base, runId })])) go({ run: undefined, zero: undefined });
    } else if (step.kind === 'cell') {
      const taken = takenAt(judged, part, position, cursor.set).get(step.cell);
      const row = readingRow({
        ...base,
        part,
        position,
        cell: step.cell,
        repeat: (taken?.row.repeat ?? 0) + 1,
        set: cursor.set,
        runId: comparative ? cursor.run?.id : undefined,
      });
      if (!(await kept([row]))) return;
      const single = part.depths.length * part.axes.length === 1;
      const after =
        single && taken === undefined
          ? nextStep({
              ...standing,
              cursor: { ...cursor, cell: undefined },
              judged: [...judged, assessSheet.counting(row)],
            })
          : undefined;
      go({
        cell: undefined,
        ...(after?.kind === 'bore' ? { bore: boreName(after.to), set: 1 } : {}),
        ...(after?.kind === 'closing' ? { zero: 'closing' } : {}),
      });
    }
  };

  const latestEnter = useRef(enter);
  latestEnter.current = enter;
  // Keys that come while a reading is being kept wait until the screen has moved on to the next cell:
  // no number is entered twice, and none runs into the next.
  const take = useCallback(
    (key: PadKey) => {
      if (busy.current) {
        waiting.current.push(key);
        return;
      }
      if (key !== 'enter') {
        type(press(typing.current, key));
        return;
      }
      busy.current = true;
      void latestEnter.current().finally(() => settle((turn) => turn + 1));
    },
    [type],
  );
  useEffect(() => {
    if (turn === 0) return;
    busy.current = false;
    while (waiting.current.length > 0 && !busy.current) {
      const [key] = waiting.current.splice(0, 1);
      if (key !== undefined) take(key);
    }
  }, [turn, take]);

  if (position === undefined) return <p>This engine’s position map has no bores.</p>;
  const select = (bore: string) => {
    go({ bore, cell: undefined, set: 1, zero: undefined });
    type(NOTHING);
    setProblem(undefined);
  };
  // Without a run that is open, the one by which this bore was read.
  const seenRun =
    part && [...takenAt(judged, part, position, cursor.set).values()].at(-1)?.row.zeroRunId;
  const states = boreStates({
    positions,
    parts,
    part,
    assessment,
    judged,
    rules: sheet.rules,
    outOfReach,
  });
  const stops =
    cursor.run === undefined
      ? boresIn(scopeOf(setUp, position), positions)
      : boresIn(cursor.run.scope, positions);
  const hint =
    step?.kind === 'bore'
      ? `on to ${boreName(step.to)}`
      : step?.kind === 'opening'
        ? 'opening zero'
        : step?.kind === 'closing'
          ? 'closing zero'
          : undefined;
  const unsent =
    capture.waiting > 0
      ? `${capture.waiting} ${capture.waiting === 1 ? 'entry' : 'entries'} not sent yet`
      : undefined;
  return (
    <MeasuringLayout
      carNumber={sheet.carNumber}
      hand={setUp.hand}
      facts={[
        { name: 'Engine', value: sheet.engine },
        { name: 'Bay', value: sheet.bay || '–' },
        { name: 'Inspector', value: sheet.inspector, minor: true },
        ...(gauge === undefined
          ? []
          : [
              {
                name: `${gauge.name} ${gauge.code}`,
                value:
                  gauge.dueOn === undefined ? 'No calibration' : `Calibrated to ${gauge.dueOn}`,
              },
            ]),
      ]}
      saved={
        <SavedLine
          state={capture.saved.state}
          at={capture.saved.at}
          {...(unsent === undefined ? {} : { unsent })}
        />
      }
      map={
        <TurningBoreMap
          layout={sheet.layout}
          bores={states.bores}
          {...(states.unit === '' ? {} : { unit: states.unit })}
          unitAloud={states.unit === '0.001 in' ? 'thousandths' : states.unit}
          current={cursor.bore}
          onSelect={select}
        />
      }
      tally={<Tally statuses={Object.values(states.bores).map((one) => one.status)} />}
      run={
        <RunPanel
          setUp={setUp}
          gauges={sheet.gauges}
          comparative={part !== undefined && isComparative(setUp, part.quantity)}
          stops={stops}
          current={cursor.bore}
          zeros={capture.rows.zeros}
          runId={cursor.run?.id ?? seenRun}
          open={cursor.run !== undefined}
          scale={scale}
          onClosing={() => go({ zero: 'closing' })}
        />
      }
      work={
        <WorkPanel
          sheet={sheet}
          parts={parts}
          part={part}
          position={position}
          cursor={cursor}
          step={step}
          scale={scale}
          value={value}
          typing={typed.digits !== ''}
          judged={judged}
          remarks={capture.rows.remarks}
          assessment={assessment}
          problem={problem}
          capture={capture}
          go={go}
          record={record}
        />
      }
      pad={
        panel === undefined && part !== undefined ? (
          <Keypad
            onKey={take}
            unit={scale?.shown ?? ''}
            unitNote={`${scale?.decimals ?? 0} ${scale?.decimals === 1 ? 'decimal' : 'decimals'} implied`}
            {...(hint === undefined ? {} : { enterHint: hint })}
            listens={capture.ready && isRead}
            acts={
              <>
                <button className="btn btn-danger" type="button" onClick={() => setPanel('strike')}>
                  Strike last reading
                </button>
                <button className="btn" type="button" onClick={() => setPanel('more')}>
                  Photograph, set up, more
                </button>
              </>
            }
          />
        ) : (
          <PanelBeside
            panel={panel ?? 'more'}
            sheet={sheet}
            setUp={setUp}
            setUpAs={setUpAs}
            part={part}
            position={position}
            positions={positions}
            cursor={cursor}
            judged={judged}
            assessment={assessment}
            record={record}
            go={go}
            open={setPanel}
            closable={part !== undefined}
          />
        )
      }
    />
  );
};
