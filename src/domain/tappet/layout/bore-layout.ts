export type Valve = 'intake' | 'exhaust';

/** One lifter bore. `index` counts bores of the same valve of one cylinder along the bank, where it has several. */
export interface BorePosition {
  readonly bank: string;
  readonly cylinder: number;
  readonly valve: Valve;
  readonly index?: number | undefined;
}

/** A bore along its bank, in the order one meets them. */
export interface BoreInBank {
  readonly cylinder: number;
  readonly valve: Valve;
}

export interface Bank {
  readonly name: string;
  /** Where the bank stands for someone looking from the layout's viewing direction. */
  readonly side: 'left' | 'right' | 'middle';
  /** Which way the bank is shifted along the crank against the other: nearer to the viewer is `ahead`. */
  readonly offset: 'ahead' | 'level' | 'behind';
  /** The cylinders' numbers along the bank, from the viewer away. */
  readonly cylinders: readonly number[];
  /** The lifter bores along the bank, from the viewer away. */
  readonly bores: readonly BoreInBank[];
}

/** The position map of an engine family: where each bore is, as data. */
export interface BoreLayout {
  readonly name: string;
  readonly viewedFrom: 'front' | 'rear';
  readonly banks: readonly Bank[];
}

/** Every bore in the order of banks and along each bank: the order of the sheet. */
export const positionsOf = (layout: BoreLayout): readonly BorePosition[] =>
  layout.banks.flatMap((bank) =>
    bank.bores.map(({ cylinder, valve }, place) => {
      const alike = (bore: BoreInBank) => bore.cylinder === cylinder && bore.valve === valve;
      const position = { bank: bank.name, cylinder, valve };
      return bank.bores.filter(alike).length === 1
        ? position
        : { ...position, index: bank.bores.slice(0, place + 1).filter(alike).length };
    }),
  );

/** "3 exhaust", or "3 exhaust 2" where a cylinder has several; cylinder numbers are unique in an engine. */
export const boreName = ({ cylinder, valve, index }: BorePosition): string =>
  index === undefined ? `${cylinder} ${valve}` : `${cylinder} ${valve} ${index}`;

export const samePosition = (a: BorePosition, b: BorePosition): boolean =>
  a.bank === b.bank && boreName(a) === boreName(b);
