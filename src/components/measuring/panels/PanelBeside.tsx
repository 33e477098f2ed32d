import type { SentRow } from '@/contracts/inspection/rows';
import type { InspectionAssessment } from '@/domain/inspection/assess-inspection';
import type { JudgedReading } from '@/domain/inspection/capture/readings-that-count';
import { isStrikeReason, STRIKE_REASONS } from '@/domain/inspection/capture/strike-reasons';
import { secondSetsWanted } from '@/domain/inspection/second-set/wanted';
import { type BorePosition, boreName } from '@/domain/tappet/layout/bore-layout';
import type { Part } from '../sheet/parts';
import { cellWords } from '../sheet/parts';
import { moveRow, notReachedRow, strikeRow } from '../sheet/rows';
import type { SetUp } from '../sheet/set-up';
import { type Cursor, placeOf, type Sheet } from '../sheet/sheet';
import { takenAt } from '../sheet/taken';
import { PhotographPanel } from './PhotographPanel';
import { SetUpPanel } from './SetUpPanel';

export type PadPanel = 'strike' | 'more' | 'set-up' | 'not-reached' | 'move' | 'photograph';

interface PanelBesideProps {
  readonly panel: PadPanel;
  readonly sheet: Sheet;
  readonly setUp: SetUp;
  readonly setUpAs: (to: Partial<SetUp>) => void;
  readonly part: Part | undefined;
  readonly position: BorePosition;
  readonly positions: readonly BorePosition[];
  readonly cursor: Cursor;
  readonly judged: readonly JudgedReading[];
  readonly assessment: InspectionAssessment;
  readonly record: (rows: readonly SentRow[]) => Promise<boolean>;
  readonly go: (to: Partial<Cursor>) => void;
  readonly open: (panel: PadPanel | undefined) => void;
  /** Whether there is a keypad to go back to. */
  readonly closable: boolean;
}

const NOT_REACHED = [
  'Not taken apart that far',
  'Gauge does not reach',
  'Part missing or broken',
  'Held for later',
] as const;

const TITLES: Readonly<Record<PadPanel, string>> = {
  strike: 'Strike the last reading',
  more: 'This bore',
  'set-up': 'Set up',
  'not-reached': 'Could not be reached',
  move: 'Entered at the wrong bore',
  photograph: 'Photograph',
};

/** What stands in the keypad's place while something else than a number is being said. */
export const PanelBeside = (props: PanelBesideProps) => {
  const { panel, sheet, part, position, positions, cursor, judged, record, go, open } = props;
  const here = part === undefined ? [] : [...takenAt(judged, part, position, cursor.set).values()];
  const last = here.reduce<JudgedReading | undefined>(
    (latest, one) =>
      latest === undefined || one.row.occurredAt >= latest.row.occurredAt ? one : latest,
    undefined,
  );
  const done = async (rows: readonly SentRow[], to: Partial<Cursor> = {}) => {
    if (await record(rows)) {
      go({ cell: undefined, ...to });
      open(undefined);
    }
  };
  const button = (label: string, onClick: () => void, className = 'btn') => (
    <button key={label} type="button" className={className} onClick={onClick}>
      {label}
    </button>
  );
  const wanted = secondSetsWanted(props.assessment).includes(boreName(position));
  return (
    <section className="flex flex-col gap-3" aria-label={TITLES[panel]}>
      <h2>{TITLES[panel]}</h2>
      {panel === 'strike' &&
        (last === undefined || part === undefined ? (
          <p>Nothing has been read here that could be struck.</p>
        ) : (
          <>
            <p>
              {cellWords(part, last.row)}:{' '}
              <b className="num">
                {last.row.value.text} {last.row.value.unit}
              </b>
              . It stays on record, with the reason.
            </p>
            {Object.entries(STRIKE_REASONS).map(([reason, words]) =>
              button(words, () => {
                if (isStrikeReason(reason)) void done([strikeRow(last.row.id, last.place, reason)]);
              }),
            )}
          </>
        ))}
      {panel === 'not-reached' &&
        NOT_REACHED.map((reason) =>
          button(reason, () => void done([notReachedRow(placeOf(position, 'bore'), reason)])),
        )}
      {panel === 'move' && (
        <>
          <p>
            {here.length} {here.length === 1 ? 'reading' : 'readings'} of {boreName(position)}{' '}
            belong to:
          </p>
          <div className="grid grid-cols-2 gap-2">
            {positions
              .filter((one) => boreName(one) !== boreName(position))
              .map((to) =>
                button(boreName(to), () => {
                  if (part === undefined || here.length === 0) return;
                  const place = placeOf(to, part.per);
                  void done(
                    here.map(({ row }) => moveRow(row.id, place)),
                    { bore: boreName(to) },
                  );
                }),
              )}
          </div>
        </>
      )}
      {panel === 'set-up' && <SetUpPanel {...props} />}
      {panel === 'photograph' && <PhotographPanel {...props} onDone={() => open(undefined)} />}
      {panel === 'more' && (
        <>
          {button('Photograph this bore', () => open('photograph'))}
          {button('Could not be reached', () => open('not-reached'))}
          {here.length > 0 && button('Move this set to another bore', () => open('move'))}
          {part !== undefined &&
            here.length > 0 &&
            cursor.set === 1 &&
            button(
              wanted ? 'Independent second set (wanted here)' : 'Independent second set',
              () => {
                go({ set: 2, cell: undefined, run: undefined, zero: undefined });
                open(undefined);
              },
              wanted ? 'btn btn-primary' : 'btn',
            )}
          {button('Set up: gauges, method, temperatures', () => open('set-up'))}
          <a className="btn" href={`/barn/inspections/${sheet.inspectionId}`}>
            Findings, witness, sign
          </a>
        </>
      )}
      {(props.closable || panel !== 'more') &&
        button(
          'Back',
          () => open(panel === 'more' || panel === 'strike' ? undefined : 'more'),
          'btn mt-2',
        )}
    </section>
  );
};
