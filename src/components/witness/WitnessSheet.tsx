import { useMemo, useRef } from 'react';
import { assessInspection, type InspectionAssessment } from '@/domain/inspection/assess-inspection';
import { inTakingOrder } from '@/domain/inspection/capture/rows';
import { mandatoryReadings } from '@/domain/inspection/witness/mandatory-readings';
import {
  type CodeHead,
  readingsLines,
  splitIntoCodes,
} from '@/domain/inspection/witness/readings-codes';
import { witnessFrom } from '@/domain/inspection/witness/witness-from';
import {
  getQuantityEntry,
  isQuantityName,
  type QuantityName,
  readingsFor,
} from '@/domain/rulebook/quantity-catalogue';
import { positionsOf } from '@/domain/tappet/layout/bore-layout';
import { CarPlate } from '../look/CarPlate';
import { SavedLine } from '../look/SavedLine';
import { assessSheet } from '../measuring/sheet/assess-sheet';
import type { Sheet } from '../measuring/sheet/sheet';
import { useCapture } from '../measuring/use-capture';
import { OwnReading } from './OwnReading';
import { ReadingCodes } from './ReadingCodes';
import { SeenFindings } from './SeenFindings';
import { WitnessWord } from './WitnessWord';

interface WitnessSheetProps {
  readonly sheet: Sheet;
  readonly head: CodeHead;
  /** Rows are taken: the inspection is open, and the person who holds the tablet works on it. */
  readonly open: boolean;
  readonly checks: readonly {
    readonly code: string;
    readonly href: string;
    readonly said: string;
  }[];
}

/** Nothing is read anew here: the sheet stands as it was when it was turned round. */
const keptIsKept = () => undefined;

/** What the tablet shows when it is turned to the competitor's side; all of it works without signal. */
export const WitnessSheet = ({ sheet, head, open, checks }: WitnessSheetProps) => {
  const latest = useRef<InspectionAssessment>(undefined);
  const capture = useCapture(sheet, {
    known: sheet.rows,
    tablet: () => assessSheet.told(latest.current),
    onKept: keptIsKept,
  });
  const { rows } = capture;
  const assessment = useMemo(
    () => assessInspection(assessSheet.record(sheet, rows)),
    [sheet, rows],
  );
  latest.current = assessment;
  const taken = useMemo(
    () => mandatoryReadings(assessment, { ...rows, gauges: sheet.gauges }),
    [assessment, rows, sheet.gauges],
  );
  const codes = useMemo(() => splitIntoCodes(readingsLines(head, taken), head), [head, taken]);
  const quantities = useMemo(() => {
    const asked = sheet.rules.clauses.flatMap(({ force, requirement }) =>
      force === 'mandatory' && requirement !== undefined && 'quantity' in requirement
        ? [...readingsFor(requirement.quantity)]
        : [],
    );
    // What is read at a bore comes first: it is what a competitor's own gauge is mostly put on.
    const atBore = (name: QuantityName) =>
      getQuantityEntry(name).source === 'lifter-sheet' ? 0 : 1;
    return [...new Set(asked.filter(isQuantityName))].sort((a, b) => atBore(a) - atBore(b));
  }, [sheet.rules]);
  const own = inTakingOrder(rows.remarks).filter(({ kind }) => kind === 'own-reading');
  const witness = witnessFrom(rows.remarks);
  return (
    <div className="witness">
      <header className="witness-head">
        <CarPlate number={sheet.carNumber} size="sheet" />
        <div className="grow">
          <h2>What was found on car {sheet.carNumber}</h2>
          <p>
            {head.className}, {head.event}. {taken.readings} readings stand behind it. The program
            assesses; an official decides.
          </p>
        </div>
        {open && <SavedLine state={capture.saved.state} at={capture.saved.at} />}
      </header>
      <section>
        <SeenFindings rules={sheet.rules} assessment={assessment} gauges={sheet.gauges} />
      </section>
      <section>
        <h2>The gauge</h2>
        <p>You may have it checked on the series’ ring, here and now, before both sides.</p>
        <ul className="list-rows">
          {checks.map(({ code, href, said }) => (
            <li key={code}>
              <span className="grow">
                <strong>{code}</strong> <span className="note">{said}</span>
              </span>
              {open && (
                <a className="btn" href={href}>
                  Check {code} on the ring
                </a>
              )}
            </li>
          ))}
        </ul>
      </section>
      <section>
        <h2>Your own reading</h2>
        {own.length === 0 && !open && <p>None was written down.</p>}
        <OwnReading
          quantities={quantities}
          positions={positionsOf(sheet.layout)}
          name={sheet.competitor}
          kept={own}
          open={open && capture.ready}
          record={(row) => capture.record([row])}
        />
      </section>
      <section>
        <h2>Take the readings with you</h2>
        <ReadingCodes codes={codes} />
        <p className="mt-3">
          <a className="btn" href={`/barn/inspections/${sheet.inspectionId}/readings`}>
            On paper
          </a>
        </p>
      </section>
      <section>
        <h2>Your word</h2>
        <WitnessWord
          witness={witness}
          name={sheet.competitor}
          open={open && capture.ready}
          record={(row) => capture.record([row])}
        />
      </section>
      <p className="mt-10">
        <a href={`/barn/inspections/${sheet.inspectionId}`}>Back to the inspector’s page</a>
      </p>
    </div>
  );
};
