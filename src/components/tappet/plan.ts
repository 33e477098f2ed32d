/** A bore as the map draws it; `key` is the bore's key from the engine's position map. */
export interface PlanBore {
  readonly key: string;
  readonly valve: 'intake' | 'exhaust';
}

export interface PlanCylinder {
  readonly number: string;
  /** From the front backwards. */
  readonly bores: readonly PlanBore[];
}

export interface PlanBank {
  readonly name: string;
  /** Seen from above with the front up. */
  readonly side: 'left' | 'right';
  /** How far this bank sits behind the other, in cylinder pitches. */
  readonly offset: number;
  /** From the front backwards. */
  readonly cylinders: readonly PlanCylinder[];
}

/** An engine's tappet bores in plan view, one or two banks beside the cam line. */
export interface BorePlan {
  readonly banks: readonly PlanBank[];
}

/** Place in px: `u` along the cam from the front, `v` across it, the left bank negative. */
export interface PlacedBore extends PlanBore {
  readonly cylinder: string;
  readonly u: number;
  readonly v: -1 | 1;
  /** Clear length along the cam that belongs to this bore. */
  readonly pitch: number;
}

export interface PlacedCylinder {
  readonly number: string;
  readonly u: number;
  readonly v: -1 | 1;
}

export interface PlacedPlan {
  readonly bores: readonly PlacedBore[];
  readonly cylinders: readonly PlacedCylinder[];
  /** Per side, the stretch of its row. */
  readonly rows: readonly { readonly v: -1 | 1; readonly from: number; readonly to: number }[];
}

const sign = (side: PlanBank['side']): -1 | 1 => (side === 'left' ? -1 : 1);

/** Share of a cylinder's pitch that is gap, not bore: cylinders read as groups. */
const GAP = 0.045;

/** Spreads the bores evenly over `length` px along the cam. */
export const placeBores = (plan: BorePlan, length: number): PlacedPlan => {
  const extent = (bank: PlanBank) => bank.offset + bank.cylinders.length;
  const total = Math.max(1, ...plan.banks.map(extent));
  const unit = length / total;
  const bores = plan.banks.flatMap((bank) =>
    bank.cylinders.flatMap((cylinder, index) => {
      const pitch = (unit * (1 - GAP)) / Math.max(1, cylinder.bores.length);
      const start = (bank.offset + index + GAP / 2) * unit;
      return cylinder.bores.map((bore, order) => ({
        ...bore,
        cylinder: cylinder.number,
        u: start + (order + 0.5) * pitch,
        v: sign(bank.side),
        pitch,
      }));
    }),
  );
  const cylinders = plan.banks.flatMap((bank) =>
    bank.cylinders.map((cylinder, index) => ({
      number: cylinder.number,
      u: (bank.offset + index + 0.5) * unit,
      v: sign(bank.side),
    })),
  );
  const rows = plan.banks.map((bank) => ({
    v: sign(bank.side),
    from: bank.offset * unit,
    to: extent(bank) * unit,
  }));
  return { bores, cylinders, rows };
};

export type Step = 'forward' | 'back' | 'left' | 'right';

/** The next bore in a direction of the engine; at an edge, none. */
export const neighbour = (
  bores: readonly PlacedBore[],
  key: string,
  step: Step,
): PlacedBore | undefined => {
  const here = bores.find((bore) => bore.key === key);
  if (here === undefined) return undefined;
  const nearest = (among: readonly PlacedBore[]) =>
    among.reduce<PlacedBore | undefined>(
      (best, bore) =>
        best === undefined || Math.abs(bore.u - here.u) < Math.abs(best.u - here.u) ? bore : best,
      undefined,
    );
  if (step === 'forward') return nearest(bores.filter((b) => b.v === here.v && b.u < here.u));
  if (step === 'back') return nearest(bores.filter((b) => b.v === here.v && b.u > here.u));
  const side = step === 'left' ? -1 : 1;
  return here.v === side ? undefined : nearest(bores.filter((b) => b.v === side));
};
