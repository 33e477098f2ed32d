import * as z from 'zod/mini';
import { measuredText, unitName } from './text';

const LARGEST_SHEET = 48;

const cell = z.string().check(z.maxLength(60));

/** One place: its reading, its true repeats, or null (or nothing written) where none was taken. */
const place = z.nullable(
  z.union([cell, z.array(cell).check(z.minLength(1), z.maxLength(LARGEST_SHEET))]),
);

export const clearanceRequest = z.strictObject({
  /** Of every length, in and out, that names no other. */
  unit: unitName,
  method: z.enum(['comparative', 'absolute']),
  lifter: z.optional(z.array(measuredText).check(z.maxLength(LARGEST_SHEET))),
  /** Size of the setting ring; without it a comparative zero is this lifter at its widest. */
  zeroSize: z.optional(measuredText),
  /** Depth × axis (× repeat), from the top; diameters, or dial readings when comparative. */
  bore: z
    .array(z.array(place).check(z.minLength(1), z.maxLength(12)))
    .check(z.minLength(1), z.maxLength(24)),
  largerReads: z.optional(z.enum(['plus', 'minus'])),
  division: z.optional(measuredText),
  openingZero: z.optional(measuredText),
  closingZero: z.optional(measuredText),
  /** Place of each reading in the taking order, from 1, in the order of `bore` read through. */
  order: z.optional(z.array(z.int().check(z.gte(1), z.lte(10_000))).check(z.maxLength(2_000))),
  temperatures: z.optional(
    z.strictObject({
      bore: measuredText,
      lifter: measuredText,
      setting: z.optional(measuredText),
      gauge: z.optional(measuredText),
    }),
  ),
  /** A name (iron, steel, aluminium, bronze …) or a coefficient in 1/K. */
  materials: z.optional(z.strictObject({ bore: measuredText, lifter: measuredText })),
});

const threeFigures = z.strictObject({ mean: z.string(), min: z.string(), max: z.string() });

export const clearanceResponse = z.strictObject({
  unit: z.string(),
  /** null when readings it needs are missing. */
  clearance: z.nullable(threeFigures),
  clearanceAt20C: z.optional(threeFigures),
  /** null where no depth has two axes. */
  outOfRound: z.nullable(z.string()),
  /** null with fewer than two depths. */
  taper: z.nullable(
    z.strictObject({
      depthMeans: z.string(),
      worstAxis: z.string(),
      signed: z.string(),
      shape: z.enum(['straight', 'tapered', 'bell-mouthed', 'waisted', 'barrelled']),
    }),
  ),
  drift: z.optional(z.string()),
  /** The closing zero lost too much: this bore is to be measured again. Nothing is erased. */
  redo: z.boolean(),
  /** Of a clearance at a place, in `unit`. */
  standardUncertainty: z.number(),
  degreesOfFreedom: z.nullable(z.number()),
  /** Part of the variance, 0 to 1, the largest first. */
  shares: z.array(z.strictObject({ name: z.string(), share: z.number(), sentence: z.string() })),
  missing: z.array(z.string()),
  warnings: z.array(z.string()),
});

export type ClearanceRequest = z.infer<typeof clearanceRequest>;
export type ClearanceResponse = z.infer<typeof clearanceResponse>;
