import { Budgets } from '@/components/finding/Budgets';
import { HoldAdvice } from '@/components/finding/HoldAdvice';
import { Caution } from '@/components/look/Caution';
import { displayNumber } from '@/components/look/ReadingValue';
import { wordOfState } from '@/components/look/status';
import { BoreHeader, LiveReading, ResultStrip } from '@/components/tappet/BorePanels';
import { CellsTable } from '@/components/tappet/CellsTable';
import type { SentRow } from '@/contracts/inspection/rows';
import type { InspectionAssessment } from '@/domain/inspection/assess-inspection';
import type { JudgedReading } from '@/domain/inspection/capture/readings-that-count';
import type { RemarkRow } from '@/domain/inspection/capture/rows';
import { secondSetsWanted } from '@/domain/inspection/second-set/wanted';
import type { Clause } from '@/domain/rulebook/clause';
import { limitWords } from '@/domain/rulebook/describe';
import { type BorePosition, boreName } from '@/domain/tappet/layout/bore-layout';
import { cellKey, cellsOf, cellWords, type Part } from '../sheet/parts';
import type { Scale } from '../sheet/set-up';
import type { Cursor, Sheet } from '../sheet/sheet';
import { nearWords, resultAt, shownResult } from '../sheet/shown';
import type { Step } from '../sheet/steps';
import { isComplete, takenAt } from '../sheet/taken';
import { aloud } from '../sheet/typing';
import type { Capture } from '../use-capture';
import { ChecksPanel } from './ChecksPanel';
import { PartSwitch } from './PartSwitch';
import { Troubles } from './Troubles';

export interface WorkPanelProps {
  readonly sheet: Sheet;
  readonly parts: readonly Part[];
  /** Absent: the checks without numbers. */
  readonly part: Part | undefined;
  readonly position: BorePosition;
  readonly cursor: Cursor;
  readonly step: Step | undefined;
  readonly scale: Scale | undefined;
  readonly value: string | undefined;
  readonly typing: boolean;
  readonly judged: readonly JudgedReading[];
  readonly remarks: readonly RemarkRow[];
  readonly assessment: InspectionAssessment;
  readonly problem: string | undefined;
  readonly capture: Capture;
  readonly go: (to: Partial<Cursor>) => void;
  readonly record: (rows: readonly SentRow[]) => Promise<boolean>;
}

const limits = ({ requirement }: Clause): string =>
  requirement?.kind === 'limit'
    ? limitWords(requirement)
        .replace('at least ', 'min ')
        .replace(' and at most ', ', max ')
        .replace('at most ', 'max ')
    : '';

const tone = {
  outside: 'outside',
  'does-not-comply': 'outside',
  within: 'within',
  complies: 'within',
  'too-close': 'too-close',
} as const;

/** Where the part's result stands: its own bore, its cylinder, or the engine. */
const positionOf = (part: Part, position: BorePosition): string =>
  part.per === 'bore'
    ? boreName(position)
    : part.per === 'cylinder'
      ? String(position.cylinder)
      : part.per;

const Result = ({
  part,
  position,
  assessment,
}: Pick<WorkPanelProps, 'position' | 'assessment'> & { readonly part: Part }) => {
  const { clause } = part;
  const result = resultAt(assessment.findings, clause?.number, positionOf(part, position));
  if (clause === undefined || result === undefined) return null;
  const shown = shownResult(clause, result);
  const status = result.state in tone ? tone[result.state as keyof typeof tone] : 'set-aside';
  const word = wordOfState(result.state);
  const wanted = secondSetsWanted(assessment).includes(boreName(position));
  return (
    <>
      {shown !== undefined && (
        <ResultStrip
          name={clause.heading}
          value={shown.value}
          uncertaintyText={shown.uncertainty}
          k={shown.k}
          {...shown.strip}
        />
      )}
      <Budgets results={[result]} />
      {part.quantity === 'tappet-bore-diameter' && (
        <HoldAdvice bores={assessment.bores.filter(({ key }) => key === boreName(position))} />
      )}
      <Caution status={status} title={word.charAt(0).toUpperCase() + word.slice(1)}>
        <p>
          {result.state === 'no-statement' || shown === undefined
            ? result.sentence
            : nearWords(shown)}
          {wanted && ' An independent second set follows the closing zero, this set hidden.'}
        </p>
      </Caution>
    </>
  );
};

/** This bore: what is read now, what has been read, and, once the set is complete, what it comes to. */
export const WorkPanel = (props: WorkPanelProps) => {
  const { sheet, parts, part, position, cursor, step, scale, value, typing, judged, go } = props;
  const switcher = (
    <PartSwitch
      parts={parts}
      current={part?.quantity}
      onGo={(quantity) => go({ part: quantity, cell: undefined, zero: undefined, set: 1 })}
    />
  );
  if (part === undefined || scale === undefined)
    return (
      <div className="work gap-2 justify-start">
        {switcher}
        <ChecksPanel {...props} />
        <Troubles {...props} />
      </div>
    );
  const taken = takenAt(judged, part, position, cursor.set);
  const complete = isComplete(judged, part, position, cursor.set);
  const comparative = scale.unit === 'thou' || scale.unit === 'µm';
  const zero = step?.kind === 'opening' || step?.kind === 'closing' ? step.kind : undefined;
  const cell = step?.kind === 'cell' ? step.cell : cursor.cell;
  const last = [...taken.values()].at(-1);
  const place = cellsOf(part).find((one) => cellKey(one) === cell);
  const showLast = !typing && zero === undefined && last !== undefined;
  const shownValue = showLast ? last.row.value.text : (value ?? '');
  const words =
    zero !== undefined
      ? `${zero === 'opening' ? 'Opening' : 'Closing'} zero`
      : showLast
        ? cellWords(part, last.row)
        : place === undefined
          ? part.label
          : cellWords(part, place);
  const lifter = [
    ...takenAt(
      judged,
      { ...part, quantity: 'lifter-body-diameter', per: 'bore' },
      position,
      1,
    ).values(),
  ].at(-1);
  const { clause } = part;
  const against =
    zero !== undefined
      ? 'as the dial stands'
      : showLast
        ? 'last value'
        : comparative && lifter
          ? `lifter ${lifter.row.value.text} ${lifter.row.value.unit}`
          : undefined;
  const cells = part.depths.map(({ key: depth, label }) => ({
    depth: label,
    cells: part.axes.map(({ key: axis }) => {
      const key = cellKey({ depth, axis });
      const text = taken.get(key)?.row.value.text;
      return text === undefined ? { key } : { key, value: text };
    }),
  }));
  return (
    <div className="work gap-2 justify-start">
      {switcher}
      {clause !== undefined && (
        <BoreHeader
          cylinder={String(position.cylinder)}
          valve={position.valve}
          clause={clause.number}
          heading={clause.heading}
          limits={limits(clause)}
          advisory={clause.force === 'advisory'}
        />
      )}
      <LiveReading
        place={words}
        {...(against === undefined ? {} : { against })}
        value={displayNumber(shownValue, comparative)}
        unit={scale.shown}
        {...(shownValue === '' || !comparative ? {} : { aloud: aloud(shownValue, true) })}
      />
      <CellsTable
        progress={`${cellsOf(part).filter((one) => taken.has(cellKey(one))).length} of ${cellsOf(part).length} taken${cursor.set > 1 ? ', second set, first hidden' : ''}`}
        axes={part.axes.map((axis) => axis.label)}
        rows={cells}
        current={cell ?? (last === undefined ? undefined : cellKey(last.row))}
        onSelect={(key) => go({ cell: key })}
        signed={comparative}
      />
      <Troubles {...props} />
      {complete && <Result part={part} position={position} assessment={props.assessment} />}
      {!complete && sheet.state !== 'open' && sheet.state !== 'closed' && (
        <Caution title="This inspection is not open">
          <p>What is entered now is kept and does not count.</p>
        </Caution>
      )}
    </div>
  );
};
