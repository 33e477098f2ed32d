import * as z from 'zod/mini';
import { figure, unitName } from './text';

const count = z.int().check(z.gte(1), z.lte(64));

/** Standard uncertainty of each named input, in that input's unit. */
const uncertainties = <Name extends string>(...names: readonly Name[]) =>
  z.optional(
    z.strictObject(
      Object.fromEntries(names.map((name) => [name, z.optional(figure)])) as {
        [N in Name]: z.ZodMiniOptional<typeof figure>;
      },
    ),
  );

const displacement = z.strictObject({
  bore: figure,
  stroke: figure,
  cylinders: count,
  unit: unitName,
  /** Up to the next whole unit of volume, as a rule says of its limit or of the measured value. */
  roundUp: z.optional(z.union([z.boolean(), z.enum(['limit', 'measured'])])),
  uncertainties: uncertainties('bore', 'stroke'),
});

const compressionRatio = z.strictObject({
  bore: figure,
  stroke: figure,
  chamber: figure,
  /** Dish plus, dome minus. */
  piston: figure,
  deck: figure,
  gasketBore: figure,
  gasketThickness: figure,
  lengthUnit: unitName,
  volumeUnit: unitName,
  uncertainties: uncertainties(
    'bore',
    'stroke',
    'chamber',
    'piston',
    'deck',
    'gasketBore',
    'gasketThickness',
  ),
});

const duration = z.strictObject({
  checkingLift: figure,
  /** Crankshaft degree and lift, degrees rising. */
  table: z.array(z.tuple([figure, figure])).check(z.minLength(3), z.maxLength(1_500)),
  /** Of the lifts; in unless stated. */
  unit: z.optional(unitName),
  uncertainties: uncertainties('degree', 'lift'),
});

const valveEvents = z.strictObject({
  intakeOpens: figure,
  intakeCloses: figure,
  exhaustOpens: figure,
  exhaustCloses: figure,
  uncertainties: uncertainties('event'),
});

const lift = z.strictObject({
  lobeLift: figure,
  rockerRatio: figure,
  lash: z.optional(figure),
  unit: unitName,
  uncertainties: uncertainties('lobeLift', 'rockerRatio', 'lash'),
});

const springRate = z.strictObject({
  points: z
    .array(z.strictObject({ height: figure, load: figure }))
    .check(z.minLength(2), z.maxLength(50)),
  lengthUnit: unitName,
  forceUnit: unitName,
  uncertainties: uncertainties('height', 'load'),
});

const area = z.strictObject({
  diameter: figure,
  unit: unitName,
  uncertainties: uncertainties('diameter'),
});

const weights = z.strictObject({
  leftFront: figure,
  rightFront: figure,
  leftRear: figure,
  rightRear: figure,
  unit: unitName,
  uncertainties: uncertainties('corner'),
});

export const engineRequest = z.discriminatedUnion('quantity', [
  z.strictObject({ quantity: z.literal('displacement'), inputs: displacement }),
  z.strictObject({ quantity: z.literal('compression-ratio'), inputs: compressionRatio }),
  z.strictObject({ quantity: z.literal('duration'), inputs: duration }),
  z.strictObject({ quantity: z.literal('valve-events'), inputs: valveEvents }),
  z.strictObject({ quantity: z.literal('lift'), inputs: lift }),
  z.strictObject({ quantity: z.literal('spring-rate'), inputs: springRate }),
  z.strictObject({ quantity: z.literal('area'), inputs: area }),
  z.strictObject({ quantity: z.literal('weights'), inputs: weights }),
]);

const shared = {
  unit: z.string(),
  working: z.array(z.string()),
  datum: z.string(),
};

const several = {
  ...shared,
  /** U of each figure at two-sided 95 %, where an uncertainty was stated. */
  expandedUncertainties: z.optional(z.record(z.string(), z.number())),
};

const single = z.strictObject({
  ...shared,
  value: z.string(),
  /** In `unit`, two-sided 95 %; absent when no input states an uncertainty. */
  expandedUncertainty: z.optional(z.number()),
  coverageFactor: z.optional(z.number()),
});

export const engineResponse = z.union([
  single,
  z.strictObject({ ...single.shape, gross: z.string(), net: z.optional(z.string()) }),
  z.strictObject({
    ...single.shape,
    opens: z.string(),
    closes: z.string(),
    centreline: z.string(),
    warnings: z.array(z.string()),
  }),
  z.strictObject({
    ...several,
    intakeDuration: z.string(),
    exhaustDuration: z.string(),
    intakeCentreline: z.string(),
    exhaustCentreline: z.string(),
    overlap: z.string(),
    lobeSeparation: z.string(),
  }),
  /** Shares in per cent of the total. */
  z.strictObject({
    ...several,
    total: z.string(),
    left: z.string(),
    rear: z.string(),
    cross: z.string(),
  }),
]);

export type EngineRequest = z.infer<typeof engineRequest>;
export type EngineResponse = z.infer<typeof engineResponse>;
export type EngineInputs<Q extends EngineRequest['quantity']> = Extract<
  EngineRequest,
  { quantity: Q }
>['inputs'];
