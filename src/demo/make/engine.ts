import { type BorePosition, boreName } from '@/domain/tappet/layout/bore-layout';
import type { Chance } from './chance';

/** What one lifter and its bore truly are, in ten-thousandths of an inch. */
export interface TrueBore {
  readonly position: BorePosition;
  readonly body: number;
  readonly foot: number;
  /** Bore diameter above and below the gallery, along and across the cam. */
  readonly bore: { readonly [place in Spot]: number };
}

export const SPOTS = ['above along', 'above across', 'below along', 'below across'] as const;
export type Spot = (typeof SPOTS)[number];

export interface Oddities {
  /** Bore name → foot diameter, or body diameter, in ten-thousandths. */
  readonly foot?: Readonly<Record<string, number>>;
  readonly body?: Readonly<Record<string, number>>;
  /** Bore name → mean clearance in ten-thousandths. */
  readonly clearance?: Readonly<Record<string, number>>;
}

/**
 * An engine such as one meets: bodies 0.8422 to 0.8424 in, clearances around 0.0016 in, bores a
 * tenth or two out of round and wider towards the bottom, and whatever is odd about this one.
 */
export const trueEngine = (
  positions: readonly BorePosition[],
  chance: Chance,
  odd: Oddities = {},
): readonly TrueBore[] =>
  positions.map((position) => {
    const name = boreName(position);
    const body = odd.body?.[name] ?? 8423 + chance.whole(-1, 1);
    const clearance = odd.clearance?.[name] ?? 16 + chance.whole(-1, 1);
    const taper = chance.whole(0, 1);
    const oval = chance.whole(0, 1);
    const mid = body + clearance;
    return {
      position,
      body,
      foot: odd.foot?.[name] ?? body + chance.whole(-4, 4),
      bore: {
        'above along': mid,
        'above across': mid + oval - taper,
        'below along': mid + taper - oval,
        'below across': mid + oval,
      },
    };
  });

/** Ten-thousandths of an inch as a micrometer is read: `0.8423`. */
export const micrometer = (tenths: number): string => (tenths / 10_000).toFixed(4);

/** Ten-thousandths as a dial of thousandths is read from its zero: `-0.1`, `0.0`, `1.6`. */
export const dial = (tenths: number): string => (tenths / 10).toFixed(1);
