import { Caution } from '@/components/look/Caution';
import { BoreHeader } from '@/components/tappet/BorePanels';
import { CellsTable } from '@/components/tappet/CellsTable';
import type { Ask } from '@/domain/inspection/plan/plan';
import type { Clause } from '@/domain/rulebook/clause';
import { limitWords } from '@/domain/rulebook/describe';
import { boreName } from '@/domain/tappet/layout/bore-layout';
import type { Bay, Hands } from '../../bay';
import { askAt } from '../../sheet/flow/asked';
import { begunSet } from '../../sheet/flow/set-to-take';
import { takenAt } from '../../sheet/flow/taken';
import type { Typed } from '../../sheet/keys/typing';
import { stateNoteOf } from '../../sheet/on-screen';
import { cellKey } from '../../sheet/parts';
import { isComparative } from '../../sheet/set-up';
import { isSetComplete } from '../../use-bay';
import type { Capture } from '../../use-capture';
import { ChecksPanel } from './ChecksPanel';
import { Live } from './Live';
import { PartSwitch } from './PartSwitch';
import { RackWork } from './RackWork';
import { Result } from './Result';
import { RunClosed } from './RunClosed';
import { SecondSet } from './SecondSet';
import { Troubles } from './Troubles';

export interface WorkPanelProps {
  readonly bay: Bay;
  readonly hands: Hands;
  readonly typed: Typed;
  readonly problem: string | undefined;
  readonly capture: Capture;
  readonly listens: boolean;
  readonly onRedo: (runId: string) => void;
  readonly onBoth: () => void;
}

const limits = ({ requirement }: Clause): string => {
  if (requirement?.kind === 'reference-average')
    return `+${requirement.plus.text} −${requirement.minus.text} ${requirement.plus.unit} of the mean of ${requirement.n} or more reference parts`;
  return requirement?.kind === 'limit'
    ? limitWords(requirement)
        .replace('at least ', 'min ')
        .replace(' and at most ', ', max ')
        .replace('at most ', 'max ')
    : '';
};

/** Why this is read here, in a few words. */
const whyWords = (ask: Ask | undefined): string | undefined => {
  switch (ask?.why) {
    case 'screening':
      return 'screened by one reading';
    case 'near-limit':
      return 'near a limit: the full sheet is asked';
    case 'clause-asks-all':
      return `clause ${ask.clause} asks the full sheet`;
    default:
      return undefined;
  }
};

/** This bore: what is read now, what has been read, and, once the set is complete, what it comes to. */
export const WorkPanel = (props: WorkPanelProps) => {
  const { bay, hands, typed, problem, capture, listens } = props;
  const { sheet, parts, part, position, cursor, step, scale, judged, setUp, assessment } = bay;
  const switcher = (
    <PartSwitch
      parts={parts}
      current={cursor.part}
      onGo={(key) => hands.go({ part: key, cell: undefined, zero: undefined, closed: undefined })}
    />
  );
  const troubles = <Troubles problem={problem} capture={capture} />;
  if (part === undefined || scale === undefined)
    return (
      <div className="work gap-2 justify-start">
        {switcher}
        {cursor.part === 'rack' ? (
          <RackWork bay={bay} hands={hands} />
        ) : (
          <ChecksPanel bay={bay} hands={hands} listens={listens} />
        )}
        {troubles}
      </div>
    );
  const taken = takenAt(judged, part, position, cursor.set);
  const asked = bay.asked(part, position);
  const comparative = isComparative(setUp, part.quantity);
  const shownKeys = new Set([...asked.map(cellKey), ...taken.keys()]);
  const axes = part.axes.filter(({ key }) =>
    part.depths.some(({ key: depth }) => shownKeys.has(cellKey({ depth, axis: key }))),
  );
  const rows = part.depths
    .filter(({ key: depth }) =>
      axes.some(({ key }) => shownKeys.has(cellKey({ depth, axis: key }))),
    )
    .map(({ key: depth, label }) => ({
      depth: label,
      cells: axes.map(({ key: axis }) => {
        const key = cellKey({ depth, axis });
        const text = taken.get(key)?.row.value.text;
        return text === undefined ? { key } : { key, value: text };
      }),
    }));
  const { clause } = part;
  const why = whyWords(askAt(bay.plan, part, position));
  const cell = step?.kind === 'cell' ? step.cell : cursor.cell;
  const complete = isSetComplete(bay);
  const result = assessment.bores.find(({ key }) => key === boreName(position));
  const stateNote = stateNoteOf(sheet);
  const begun = cursor.set === 1 ? begunSet({ ...bay, part }) : undefined;
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
          {...(why === undefined ? {} : { why })}
        />
      )}
      <Live bay={bay} part={part} typed={typed} />
      <CellsTable
        progress={`${taken.size} of ${shownKeys.size} taken${bay.blind ? ', second set, first hidden' : ''}`}
        axes={axes.map((axis) => axis.label)}
        rows={rows}
        current={cell}
        onSelect={(key) => hands.go({ cell: key, closed: undefined })}
        signed={comparative}
      />
      {troubles}
      {step?.kind === 'closed' && (
        <RunClosed
          run={assessment.runs.find(({ runId }) => runId === step.runId)}
          unit={scale.shown}
          onRedo={() => props.onRedo(step.runId)}
          onLater={() => hands.go({ closed: undefined })}
        />
      )}
      {step?.kind === 'both' && (
        <Caution status="set-aside" title="The second set is complete">
          <button type="button" className="btn btn-primary btn-compact" onClick={props.onBoth}>
            See both sets
          </button>
        </Caution>
      )}
      {!bay.blind && step?.kind !== 'closed' && complete && <Result bay={bay} part={part} />}
      {!bay.blind && begun !== undefined && (
        <Caution status="set-aside" title={`Set ${begun.set} is being taken`}>
          <p>
            {begun.taken} of {begun.of} read
            {begun.by === undefined ? '' : ` by ${begun.by}`}. Both are shown once it is complete.
          </p>
        </Caution>
      )}
      {!bay.blind &&
        begun === undefined &&
        result !== undefined &&
        result.secondSets.length > 0 && (
          <SecondSet key={boreName(position)} bay={bay} hands={hands} result={result} />
        )}
      {stateNote !== undefined && !(complete && stateNote.counts) && (
        <Caution title={stateNote.title}>
          <p>{stateNote.words}</p>
        </Caution>
      )}
    </div>
  );
};
