import { RunLine } from '@/components/tappet/RunLine';
import type { ZeroRow } from '@/domain/inspection/capture/rows';
import { convert } from '@/domain/quantity/convert';
import { fromStored } from '@/domain/quantity/stored';
import { type BorePosition, boreName } from '@/domain/tappet/layout/bore-layout';
import type { Scale, SetUp } from '../sheet/set-up';
import type { SheetGauge } from '../sheet/sheet';

interface RunPanelProps {
  readonly setUp: SetUp;
  readonly gauges: readonly SheetGauge[];
  /** Whether what is read now is read from a zero. */
  readonly comparative: boolean;
  readonly stops: readonly BorePosition[];
  readonly current: string;
  readonly zeros: readonly ZeroRow[];
  readonly runId: string | undefined;
  /** Whether that run still waits for its closing zero on this device. */
  readonly open: boolean;
  readonly scale: Scale | undefined;
  readonly onClosing: () => void;
}

const asRead = (zero: ZeroRow | undefined, unit: string): string | undefined =>
  zero &&
  (zero.reading.unit === unit
    ? zero.reading.text
    : convert(fromStored(zero.reading, 'length'), unit).text);

/** The zero run that is open, or a sentence where no zero is used. */
export const RunPanel = (props: RunPanelProps) => {
  const { setUp, gauges, comparative, stops, current, zeros, runId, scale, onClosing } = props;
  if (!comparative || scale === undefined)
    return (
      <div className="run">
        <p className="note col-span-full">
          Read as it stands on the gauge; no zero run. Check the gauge’s own zero before the first
          part.
        </p>
      </div>
    );
  const ring = gauges.find((gauge) => gauge.id === setUp.ringId);
  const [first] = stops;
  const onRing = setUp.zeroedOn === 'ring' && ring?.size !== undefined;
  const find = (kind: ZeroRow['kind']) =>
    runId === undefined
      ? undefined
      : zeros.find((zero) => zero.runId === runId && zero.kind === kind);
  return (
    <div className="run">
      <div className="run-name">
        <p>{onRing ? `Zero for bank ${first?.bank ?? ''}` : `Zero for ${current}`}</p>
        <p className="note">
          {onRing
            ? `Ring ${ring.code}, ${ring.size?.text} ${ring.size?.unit}`
            : 'On its own lifter'}
        </p>
      </div>
      <RunLine
        opening={asRead(find('opening'), scale.unit)}
        closing={asRead(find('closing'), scale.unit)}
        current={current}
        stops={stops.map((position) => ({
          key: boreName(position),
          cylinder: String(position.cylinder),
          valve: position.valve,
        }))}
      />
      <button className="btn" type="button" disabled={!props.open} onClick={onClosing}>
        Take the closing zero
      </button>
    </div>
  );
};
