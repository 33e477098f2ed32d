import {
  type BoreLayout,
  boreName,
  positionsOf,
  type Valve,
} from '@/domain/tappet/layout/bore-layout';

export type Side = 'left' | 'right';

/** A bank as the map draws it: seen from above, front up, bores from the front backwards. */
export interface PlanBank {
  readonly name: string;
  readonly side: Side;
  /** How far this bank sits behind the other, in cylinder pitches. */
  readonly behind: number;
  readonly cylinders: number;
  readonly bores: readonly PlanBore[];
}

export interface PlanBore {
  /** The bore's name in the domain: "5 exhaust". */
  readonly key: string;
  readonly cylinder: string;
  readonly valve: Valve;
}

/** Place in px: `u` along the cam from the front; `v` across it, −1 on the left. */
export interface PlacedBore extends PlanBore {
  readonly u: number;
  readonly v: -1 | 1;
  /** Length along the cam that belongs to this bore. */
  readonly pitch: number;
}

export interface PlacedPlan {
  readonly bores: readonly PlacedBore[];
  readonly cylinders: readonly {
    readonly number: string;
    readonly u: number;
    readonly v: -1 | 1;
  }[];
  /** Per side, the stretch of its row. */
  readonly rows: readonly { readonly v: -1 | 1; readonly from: number; readonly to: number }[];
}

/** How far a shifted bank is drawn behind: enough to see which one leads. */
const STAGGER = 0.21;
/** Share of a bank's length kept as gaps, so that each cylinder's bores read as a group. */
const GAP = 0.045;

const shift = { ahead: 0, level: STAGGER / 2, behind: STAGGER } as const;

/**
 * The layout turned to its plan. Whoever stands before the front and looks back has the page's right
 * on the left hand; from the rear the hands agree with the page, but the order runs the other way.
 */
export const planOf = (layout: BoreLayout): readonly PlanBank[] => {
  const fromFront = layout.viewedFrom === 'front';
  const positions = positionsOf(layout);
  const banks = layout.banks.map((bank) => {
    const bores = positions
      .filter((position) => position.bank === bank.name)
      .map((position) => ({
        key: boreName(position),
        cylinder: String(position.cylinder),
        valve: position.valve,
      }));
    const isPageLeft = bank.side === 'middle' || (bank.side === 'left') !== fromFront;
    return {
      name: bank.name.length < 3 ? `Bank ${bank.name}` : `Bank ${bank.name.toLowerCase()}`,
      side: isPageLeft ? ('left' as const) : ('right' as const),
      behind: fromFront ? shift[bank.offset] : STAGGER - shift[bank.offset],
      cylinders: bank.cylinders.length,
      bores: fromFront ? bores : bores.toReversed(),
    };
  });
  const lead = Math.min(...banks.map((bank) => bank.behind));
  return banks.map((bank) => ({ ...bank, behind: bank.behind - lead }));
};

/** Spreads the bores over `length` px along the cam. */
export const placeBores = (plan: readonly PlanBank[], length: number): PlacedPlan => {
  const unit = length / Math.max(1, ...plan.map((bank) => bank.behind + bank.cylinders));
  const placed = plan.map((bank) => {
    const v: -1 | 1 = bank.side === 'left' ? -1 : 1;
    const from = bank.behind * unit;
    const to = from + bank.cylinders * unit;
    const startsGroup = (at: number) => bank.bores[at]?.cylinder !== bank.bores[at - 1]?.cylinder;
    const groups = bank.bores.filter((_, at) => startsGroup(at)).length;
    const gap = ((to - from) * GAP) / Math.max(1, groups);
    const pitch = ((to - from) * (1 - GAP)) / Math.max(1, bank.bores.length);
    const bores = bank.bores.map((bore, at) => {
      const gapsBefore = bank.bores.slice(0, at + 1).filter((_, i) => startsGroup(i)).length;
      return { ...bore, v, pitch, u: from + (at + 0.5) * pitch + (gapsBefore - 0.5) * gap };
    });
    return { bores, v, from, to };
  });
  const bores = placed.flatMap((bank) => bank.bores);
  const numbers = [...new Set(bores.map((bore) => bore.cylinder))];
  const cylinders = numbers.map((number) => {
    const own = bores.filter((bore) => bore.cylinder === number);
    const u = own.reduce((sum, bore) => sum + bore.u, 0) / own.length;
    return { number, u, v: own[0]?.v ?? (1 as const) };
  });
  return { bores, cylinders, rows: placed.map(({ v, from, to }) => ({ v, from, to })) };
};

export type Step = 'forward' | 'back' | Side;

/** The next bore in a direction of the engine; at an edge, none. */
export const neighbour = (
  bores: readonly PlacedBore[],
  key: string,
  step: Step,
): PlacedBore | undefined => {
  const here = bores.find((bore) => bore.key === key);
  if (here === undefined) return undefined;
  const nearest = (among: readonly PlacedBore[]) =>
    among.toSorted((a, b) => Math.abs(a.u - here.u) - Math.abs(b.u - here.u))[0];
  if (step === 'forward') return nearest(bores.filter((b) => b.v === here.v && b.u < here.u));
  if (step === 'back') return nearest(bores.filter((b) => b.v === here.v && b.u > here.u));
  const side = step === 'left' ? -1 : 1;
  return here.v === side ? undefined : nearest(bores.filter((b) => b.v === side));
};
