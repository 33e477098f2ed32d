import type { SentRow } from '@/contracts/inspection/rows';
import type { BoreLayout } from '@/domain/tappet/layout/bore-layout';
import { Inspection } from '@/entities/event/inspection';
import { assignInspector } from '@/services/inspection/assign-inspector';
import { recordCaptures } from '@/services/inspection/capture/record-captures';
import { changeState } from '@/services/inspection/change-state';
import { signReport } from '@/services/inspection/report/sign-report';
import type { TrueBore } from '../make/engine';
import {
  checkRow,
  cylinderRows,
  type DemoGauges,
  lifterRows,
  runRows,
  witnessRow,
} from '../make/measure';
import { CHIEF, type DemoPerson } from '../people';
import { done, type Stage } from '../stage';

export interface DemoInspection {
  readonly inspectionId: string;
  readonly inspector: DemoPerson;
  readonly bay: string;
  readonly layout: BoreLayout;
  readonly engine: readonly TrueBore[];
  readonly gauges: DemoGauges;
  readonly casting: string;
  readonly size: { readonly bore: string; readonly stroke: string };
  readonly witness: string;
  /** `open`: half measured, the second bank hot and held. */
  readonly end: 'signed' | 'held-hot';
}

const ROWS_AT_ONCE = 150;

/** A hand on the pad that writes nobody's name. */
const SCRIBBLE = [
  '120,210 150,110 185,90 205,130 180,205 150,225 170,190 240,150 270,205 300,150 325,205 360,160',
  '400,200 430,150 460,205 490,150 520,205 560,160 640,190 720,170',
];

/** One teardown, as an inspector works through it. */
export const writeInspection = async (stage: Stage, demo: DemoInspection): Promise<void> => {
  const { inspectionId, inspector, layout, engine } = demo;
  const acting = () => stage.actor(inspector);
  const version = async () =>
    (await stage.ports().db.findOneOrFail(Inspection, { id: inspectionId })).version;
  const take = {
    uuid: () => stage.uuid(),
    next: () => stage.clock.pass(14).toISOString(),
    gauges: demo.gauges,
  };
  done(
    'name the inspector',
    await assignInspector(stage.ports(), stage.actor(CHIEF), {
      act: stage.uuid(),
      inspectionId,
      inspectorId: acting().personId,
      bay: demo.bay,
      version: await version(),
    }),
  );
  done(
    'open the inspection',
    await changeState(stage.ports(), acting(), {
      act: stage.uuid(),
      inspectionId,
      to: 'open',
      reason: '',
    }),
  );
  let head = '';
  const send = async (rows: readonly SentRow[]) => {
    for (let at = 0; at < rows.length; at += ROWS_AT_ONCE) {
      const answer = done(
        'record readings',
        await recordCaptures(stage.ports(), acting(), {
          act: stage.uuid(),
          inspectionId,
          clockOffsetMs: 0,
          rows: rows.slice(at, at + ROWS_AT_ONCE),
        }),
      );
      head = answer.head;
    }
  };
  const banks = layout.banks.map((bank) =>
    engine.filter(({ position }) => position.bank === bank.name),
  );
  const [first = [], second = []] = banks;
  await send([
    checkRow(take, 'tappet-type', 'flat'),
    checkRow(take, 'block-casting-number', demo.casting),
    ...engine.map(({ position }) => checkRow(take, 'bore-bushed', 'no', position)),
  ]);
  await send(lifterRows(engine, take));
  await send(runRows(first, take, { closing: true }));
  if (demo.end === 'held-hot') {
    await send(runRows(second.slice(0, 3), take, { closing: false, bore: '61' }));
    done(
      'hold the inspection',
      await changeState(stage.ports(), acting(), {
        act: stage.uuid(),
        inspectionId,
        to: 'hold',
        reason: 'Block at 61 °C, lifters at 24 °C: left to settle, measured again when cool.',
      }),
    );
    return;
  }
  if (second.length > 0) await send(runRows(second, take, { closing: true, drift: 0 }));
  const cylinders = layout.banks.flatMap((bank) =>
    bank.cylinders.map((cylinder) => ({ bank: bank.name, cylinder })),
  );
  await send([
    ...cylinderRows(cylinders, take, demo.size),
    witnessRow(take, demo.witness, 'signed'),
  ]);
  stage.clock.pass(120);
  done(
    'sign the report',
    await signReport(stage.ports(), acting(), {
      act: stage.uuid(),
      inspectionId,
      head,
      strokes: SCRIBBLE,
    }),
  );
};
