import { type BoreLayout, boreName, positionsOf } from '../../tappet/layout/bore-layout';

/** An independent set that is being taken: its number, and the bores it is wanted at, in this order. */
export interface SecondAsked {
  readonly bores: readonly string[];
  /** 2 and on. */
  readonly set: number;
}

const MOST_SETS = 9;

/** Reads what an address asks for; nothing where it names no bore of this engine. */
export const secondFrom = (
  layout: BoreLayout,
  asked: { readonly bores: readonly string[]; readonly set: string | null },
): SecondAsked | undefined => {
  const known = positionsOf(layout).map(boreName);
  const bores = [...new Set(asked.bores)].filter((bore) => known.includes(bore));
  const number = /^[2-9]$/.test(asked.set ?? '') ? Number(asked.set) : 2;
  return bores.length === 0 ? undefined : { bores, set: Math.min(number, MOST_SETS) };
};

/** The same as a query: `second=3%20exhaust&second=7%20intake`. */
export const secondQuery = ({ bores, set }: SecondAsked): string =>
  [
    ...bores.map((bore) => `second=${encodeURIComponent(bore)}`),
    ...(set === 2 ? [] : [`set=${set}`]),
  ].join('&');
