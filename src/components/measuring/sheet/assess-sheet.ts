import type { CapturesRequest } from '@/contracts/inspection/captures';
import type { SentReading } from '@/contracts/inspection/rows';
import type { InspectionAssessment, InspectionRecord } from '@/domain/inspection/assess-inspection';
import { type JudgedReading, judgeReadings } from '@/domain/inspection/capture/readings-that-count';
import { positionKey } from '@/domain/inspection/capture/rows';
import { declaredFacts } from '@/domain/paperwork/declared-facts';
import type { QuantityName } from '@/domain/rulebook/quantity-catalogue';
import type { SheetRows } from './recorded';
import type { Sheet } from './sheet';

/** What the domain assesses: the same on this device as on the server. */
const record = (sheet: Sheet, rows: SheetRows): InspectionRecord => ({
  rules: sheet.rules,
  bearer: {
    carNumber: sheet.carNumber,
    ...(sheet.engineId === null ? {} : { engineId: sheet.engineId }),
  },
  layout: sheet.layout,
  zone: sheet.zone,
  readings: rows.readings,
  zeros: rows.zeros,
  remarks: rows.remarks,
  gauges: sheet.gauges,
  paperwork: sheet.paperwork === null ? undefined : declaredFacts(sheet.paperwork),
});

/** What goes with a sending, so that the server can say where it differs. */
const told = (assessment: InspectionAssessment | undefined): CapturesRequest['tablet'] =>
  assessment && {
    domainVersion: assessment.domainVersion,
    states: Object.fromEntries(assessment.findings.map(({ clause, state }) => [clause, state])),
  };

/** A reading just entered, before it has gone round. */
const counting = (row: SentReading): JudgedReading => ({
  row: {
    ...row,
    quantity: row.quantity as QuantityName,
    takenBy: '',
    standing: 'accepted',
  },
  place: row.place,
  state: 'counts',
});

/** The rows with one reading more, before it has gone round. */
const withReading = (rows: SheetRows, row: SentReading): SheetRows => ({
  ...rows,
  readings: [...rows.readings, counting(row).row],
});

const judge = (rows: SheetRows) => ({ judged: judgeReadings(rows.readings, rows.remarks) });

const outOfReach = (rows: SheetRows): ReadonlySet<string> =>
  new Set(
    rows.remarks
      .filter((row) => row.kind === 'not-reached' && row.standing === 'accepted')
      .map((row) => positionKey(row.place, 'bore')),
  );

export const assessSheet = { record, told, judge, counting, withReading, outOfReach } as const;
