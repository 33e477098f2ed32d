import type { SentRow } from '@/contracts/inspection/rows';
import type { BorePosition } from '@/domain/tappet/layout/bore-layout';
import { dial, micrometer, SPOTS, type TrueBore } from './engine';

export interface DemoGauges {
  readonly micrometer: string;
  readonly boreGauge: string;
  readonly ring: string;
  readonly insideMicrometer: string;
}

const RING = 8440;
const HERE = { bank: '', cylinder: '', valve: '' } as const;

const placeOf = ({ bank, cylinder, valve, index }: BorePosition) => ({
  bank,
  cylinder: String(cylinder),
  valve,
  ...(index === undefined ? {} : { index }),
});

interface Taking {
  uuid(): string;
  /** The instant of the next reading. */
  next(): string;
  readonly gauges: DemoGauges;
}

/** Lifter bodies at two heights and feet, each along and across, off a micrometer. */
export const lifterRows = (bores: readonly TrueBore[], take: Taking): readonly SentRow[] =>
  bores.flatMap(({ position, body, foot }): SentRow[] => {
    const reading = (quantity: string, depth: string, axis: string, tenths: number): SentRow => ({
      kind: 'reading',
      id: take.uuid(),
      occurredAt: take.next(),
      quantity,
      place: placeOf(position),
      depth,
      axis,
      repeat: 1,
      set: 1,
      method: 'absolute',
      gaugeId: take.gauges.micrometer,
      value: { text: micrometer(tenths), unit: 'in' },
    });
    return [
      reading('lifter-body-diameter', 'upper', 'along', body),
      reading('lifter-body-diameter', 'upper', 'across', body),
      reading('lifter-body-diameter', 'lower', 'along', body),
      reading('lifter-body-diameter', 'lower', 'across', body),
      reading('foot-diameter', 'foot', 'along', foot),
      reading('foot-diameter', 'foot', 'across', foot),
    ];
  });

/** One run of bores on a setting ring: opening zero, the readings in taking order, closing zero. */
export const runRows = (
  bores: readonly TrueBore[],
  take: Taking,
  options: { readonly closing: boolean; readonly drift?: number; readonly bore?: string } = {
    closing: true,
  },
): readonly SentRow[] => {
  const runId = take.uuid();
  const zero = (end: 'opening' | 'closing', tenths: number): SentRow => ({
    kind: 'zero',
    id: take.uuid(),
    occurredAt: take.next(),
    runId,
    end,
    gaugeId: take.gauges.boreGauge,
    zeroedOn: 'ring',
    ringId: take.gauges.ring,
    size: { text: micrometer(RING), unit: 'in' },
    reading: { text: dial(tenths), unit: 'thou' },
  });
  const temperatures =
    options.bore === undefined
      ? undefined
      : {
          bore: { text: options.bore, unit: '°C' },
          lifter: { text: '24', unit: '°C' },
          gauge: { text: '22', unit: '°C' },
        };
  // Iron: 11.4e-6 a kelvin.
  const grown =
    options.bore === undefined ? 0 : Math.round(RING * 11.4e-6 * (Number(options.bore) - 20));
  const readings = bores.flatMap(({ position, bore }) =>
    SPOTS.map((spot): SentRow => {
      const [depth = '', axis = ''] = spot.split(' ');
      return {
        kind: 'reading',
        id: take.uuid(),
        occurredAt: take.next(),
        quantity: 'tappet-bore-diameter',
        place: placeOf(position),
        depth,
        axis,
        repeat: 1,
        set: 1,
        method: 'comparative',
        gaugeId: take.gauges.boreGauge,
        zeroRunId: runId,
        value: { text: dial(bore[spot] + grown - RING), unit: 'thou' },
        ...(temperatures === undefined ? {} : { temperatures }),
      };
    }),
  );
  return [
    zero('opening', 0),
    ...readings,
    ...(options.closing ? [zero('closing', options.drift ?? 0)] : []),
  ];
};

export const checkRow = (
  take: Taking,
  subject: string,
  value: string,
  position?: BorePosition,
): SentRow => ({
  kind: 'remark',
  id: take.uuid(),
  occurredAt: take.next(),
  remark: 'check',
  place: position === undefined ? HERE : placeOf(position),
  subject,
  value,
  reason: '',
});

export const witnessRow = (take: Taking, name: string, value: 'signed' | 'refused'): SentRow => ({
  kind: 'remark',
  id: take.uuid(),
  occurredAt: take.next(),
  remark: 'witness',
  place: HERE,
  subject: name,
  value,
  reason: value === 'refused' ? 'Would not say why' : '',
});

/** Bore and stroke of each cylinder, in inches, off an inside micrometer and a depth gauge. */
export const cylinderRows = (
  cylinders: readonly { readonly bank: string; readonly cylinder: number }[],
  take: Taking,
  size: { readonly bore: string; readonly stroke: string },
): readonly SentRow[] =>
  cylinders.flatMap(({ bank, cylinder }) =>
    (['cylinder-bore', 'stroke'] as const).map(
      (quantity): SentRow => ({
        kind: 'reading',
        id: take.uuid(),
        occurredAt: take.next(),
        quantity,
        place: { bank, cylinder: String(cylinder), valve: '' },
        depth: quantity === 'stroke' ? '' : 'top',
        axis: quantity === 'stroke' ? '' : 'along',
        repeat: 1,
        set: 1,
        method: 'absolute',
        gaugeId: take.gauges.insideMicrometer,
        value: { text: quantity === 'stroke' ? size.stroke : size.bore, unit: 'in' },
      }),
    ),
  );
