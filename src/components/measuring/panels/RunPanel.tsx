import { RunLine } from '@/components/tappet/RunLine';
import type { ZeroRow } from '@/domain/inspection/capture/rows';
import { convert } from '@/domain/quantity/convert';
import { fromStored } from '@/domain/quantity/stored';
import { boreName } from '@/domain/tappet/layout/bore-layout';
import type { Bay } from '../bay';
import { boresIn, scopeOf } from '../sheet/flow/steps';
import { takenAt } from '../sheet/flow/taken';
import { isComparative } from '../sheet/set-up';

const asRead = (zero: ZeroRow | undefined, unit: string): string | undefined =>
  zero &&
  (zero.reading.unit === unit
    ? zero.reading.text
    : convert(fromStored(zero.reading, 'length'), unit).text);

/** The zero run that is open, or a sentence where no zero is used. */
export const RunPanel = ({
  bay,
  onClosing,
}: {
  readonly bay: Bay;
  readonly onClosing: () => void;
}) => {
  const { sheet, setUp, cursor, position, positions, part, scale, rows, judged } = bay;
  if (part === undefined || scale === undefined || !isComparative(setUp, part.quantity))
    return (
      <div className="run">
        <p className="note col-span-full">
          {part === undefined
            ? 'Checks and the rack need no zero.'
            : 'Read as it stands on the gauge; no zero run. Check the gauge’s own zero before the first part.'}
        </p>
      </div>
    );
  const ring = sheet.gauges.find((gauge) => gauge.id === setUp.ringId);
  const onRing = setUp.zeroedOn === 'ring' && ring?.size !== undefined;
  const scope = cursor.run?.scope ?? scopeOf(setUp, position, cursor.set);
  const stops = boresIn(scope, positions);
  // Without a run that is open, the one that was closed just now, or by which this bore was read.
  const seen = [...takenAt(judged, part, position, cursor.set).values()].at(-1)?.row.zeroRunId;
  const runId = cursor.run?.id ?? cursor.closed ?? seen;
  const find = (kind: ZeroRow['kind']) =>
    runId === undefined
      ? undefined
      : rows.zeros.findLast((zero) => zero.runId === runId && zero.kind === kind);
  return (
    <div className="run">
      <div className="run-name">
        <p>{scope.startsWith('bank') ? `Zero for ${scope}` : `Zero for ${boreName(position)}`}</p>
        <p className="note">
          {onRing
            ? `Ring ${ring.code}, ${ring.size?.text} ${ring.size?.unit}`
            : 'On its own lifter'}
        </p>
      </div>
      <RunLine
        opening={asRead(find('opening'), scale.unit)}
        closing={asRead(find('closing'), scale.unit)}
        current={cursor.bore}
        stops={stops.map((one) => ({
          key: boreName(one),
          cylinder: String(one.cylinder),
          valve: one.valve,
        }))}
      />
      <button className="btn" type="button" disabled={cursor.run === undefined} onClick={onClosing}>
        Take the closing zero
      </button>
    </div>
  );
};
