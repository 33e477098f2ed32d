import { useState } from 'react';
import type { SentRow } from '@/contracts/inspection/rows';
import type { JudgedReading } from '@/domain/inspection/capture/readings-that-count';
import { isStrikeReason, STRIKE_REASONS } from '@/domain/inspection/capture/strike-reasons';
import { boreName } from '@/domain/tappet/layout/bore-layout';
import type { Bay } from '../../bay';
import { takenAt } from '../../sheet/flow/taken';
import { cellWords } from '../../sheet/parts';
import { moveRow, notReachedRow, strikeRow } from '../../sheet/rows';
import { type Cursor, placeOf } from '../../sheet/sheet';
import { MorePanel } from './MorePanel';
import type { PadPanel, PanelBesideProps } from './panel-beside-props';
import { SetUpPanel } from './SetUpPanel';

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
};

/** The readings of the part here, the latest last. */
const readHere = ({ part, judged, position, cursor }: Bay): readonly JudgedReading[] => {
  if (part === undefined) return [];
  const here = new Set(takenAt(judged, part, position, cursor.set).values());
  return judged.filter((reading) => here.has(reading));
};

const stillCounts = ({ judged }: Bay, { row }: JudgedReading): boolean =>
  judged.some((one) => one.row.id === row.id && one.state === 'counts');

/** What stands in the keypad's place while something else than a number is being said. */
export const PanelBeside = (props: PanelBesideProps) => {
  const { panel, bay, hands, open } = props;
  const { part, position, positions, cursor, judged } = bay;
  // As it was when the panel was opened: another tablet's reading does not slip under the finger.
  const [seen] = useState(() => readHere(bay));
  const here = seen.filter((reading) => stillCounts(bay, reading));
  const last = here.findLast(({ row }) => bay.whose(row) === undefined) ?? here.at(-1);
  const by = last && bay.whose(last.row);
  const done = async (rows: readonly SentRow[], to: Partial<Cursor> = {}) => {
    if (await hands.record(rows)) {
      hands.go({ cell: undefined, ...to });
      open(undefined);
    }
  };
  const button = (label: string, onClick: () => void, className = 'btn') => (
    <button key={label} type="button" className={className} onClick={onClick}>
      {label}
    </button>
  );
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
              {by === undefined ? '' : `, read by ${by}`}. It stays on record, with the reason.
            </p>
            {Object.entries(STRIKE_REASONS)
              .filter(([reason]) => reason !== 'zero-moved')
              .map(([reason, words]) =>
                button(words, () => {
                  if (isStrikeReason(reason))
                    void done([strikeRow(last.row.id, last.place, reason)]);
                }),
              )}
          </>
        ))}
      {panel === 'not-reached' &&
        NOT_REACHED.map((reason) =>
          button(reason, () => void done([notReachedRow(placeOf(position, 'bore'), reason)])),
        )}
      {panel === 'move' && part !== undefined && (
        <>
          <p>
            {here.length} {here.length === 1 ? 'reading' : 'readings'} of {boreName(position)}{' '}
            belong to:
          </p>
          <div className="grid grid-cols-2 gap-2">
            {positions
              .filter((one) => boreName(one) !== boreName(position))
              .map((to) => {
                const there = takenAt(judged, part, to, cursor.set).size;
                return (
                  <button
                    key={boreName(to)}
                    type="button"
                    className="btn px-1"
                    onClick={() =>
                      void done(
                        here.map(({ row }) => moveRow(row.id, placeOf(to, part.per))),
                        { bore: boreName(to) },
                      )
                    }
                  >
                    {boreName(to)}
                    {there > 0 && <small>has {there} of its own</small>}
                  </button>
                );
              })}
          </div>
        </>
      )}
      {panel === 'set-up' && (
        <SetUpPanel sheet={bay.sheet} setUp={bay.setUp} setUpAs={hands.setUpAs} part={part} />
      )}
      {panel === 'more' && <MorePanel {...props} here={here} done={done} />}
      {(props.closable || panel !== 'more') &&
        button(
          'Back',
          () => open(panel === 'more' || panel === 'strike' ? undefined : 'more'),
          'btn mt-2',
        )}
    </section>
  );
};
