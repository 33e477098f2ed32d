import type { SentRow } from '@/contracts/inspection/rows';
import type { JudgedReading } from '@/domain/inspection/capture/readings-that-count';
import { positionKey } from '@/domain/inspection/capture/rows';
import { secondSetsWanted, withOthers } from '@/domain/inspection/second-set/wanted';
import { boreName } from '@/domain/tappet/layout/bore-layout';
import { keyOf } from '../../sheet/flow/asked';
import { setToTake } from '../../sheet/flow/set-to-take';
import { strikeRow } from '../../sheet/rows';
import type { Cursor } from '../../sheet/sheet';
import { Pictures } from './Pictures';
import type { PanelBesideProps } from './panel-beside-props';

interface MorePanelProps extends PanelBesideProps {
  /** The readings of the part here. */
  readonly here: readonly JudgedReading[];
  readonly done: (rows: readonly SentRow[], to?: Partial<Cursor>) => Promise<void>;
}

const ORDINALS: Readonly<Record<number, string>> = { 2: 'second', 3: 'third' };

/** Everything about this bore that is wanted once in a while. */
export const MorePanel = ({ bay, hands, open, onSecond, onRedo, here, done }: MorePanelProps) => {
  const { sheet, part, position, cursor, setUp, assessment, judged, rows } = bay;
  const bore = boreName(position);
  const all = secondSetsWanted(assessment);
  const wanted = all.find((one) => one.bore === bore);
  const set = part === undefined ? 2 : setToTake({ ...bay, part });
  const full = part && `${part.key} ${keyOf(part, position)}`;
  const failed = assessment.runs.filter((run) => !run.held && run.bores.length > 0);
  const hot = new Set(
    assessment.bores
      .filter(({ sets }) => {
        const advice = sets.at(-1)?.measurement.temperatureAdvice;
        return advice === 'hold' || advice === 'refuse';
      })
      .map(({ key }) => key),
  );
  const warm = judged.filter(
    ({ row, state, place }) =>
      state === 'counts' &&
      row.quantity === 'tappet-bore-diameter' &&
      hot.has(positionKey(place, 'bore')),
  );
  const button = (label: string, onClick: () => void, className = 'btn') => (
    <button key={label} type="button" className={className} onClick={onClick}>
      {label}
    </button>
  );
  return (
    <>
      {failed.map((run) =>
        button(
          `The zero moved: read ${run.bores.length} again`,
          () => {
            onRedo(run.runId);
            open(undefined);
          },
          'btn btn-primary',
        ),
      )}
      {warm.length > 0 &&
        button(`Settled: read ${hot.size} hot ${hot.size === 1 ? 'bore' : 'bores'} again`, () => {
          const [first] = hot;
          void done(
            warm.map(({ row, place }) => strikeRow(row.id, place, 'part-not-settled')),
            { ...(first === undefined ? {} : { bore: first }), part: 'tappet-bore-diameter' },
          );
        })}
      {part !== undefined &&
        here.length > 0 &&
        cursor.set === 1 &&
        button(
          `Independent ${ORDINALS[set] ?? `${set}th`} set${wanted === undefined ? '' : ' (wanted here)'}`,
          () => onSecond(withOthers(all, { bore, set })),
          wanted === undefined ? 'btn' : 'btn btn-primary',
        )}
      {full !== undefined &&
        (setUp.form === 'plan' || setUp.form === 'screening') &&
        !setUp.fullAt.includes(full) &&
        button('Read this one in full', () => {
          hands.setUpAs({ fullAt: [...setUp.fullAt, full] });
          open(undefined);
        })}
      {here.length > 0 && button('Move this set to another bore', () => open('move'))}
      {button('Could not be reached', () => open('not-reached'))}
      {button('Set up: gauges, method, temperatures', () => open('set-up'))}
      <a className="btn" href={`/barn/inspections/${sheet.inspectionId}`}>
        Findings, witness, sign
      </a>
      <Pictures rows={rows} bore={bore} />
    </>
  );
};
