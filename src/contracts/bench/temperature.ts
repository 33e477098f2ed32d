import * as z from 'zod/mini';
import { measuredText, unitName } from './text';

export const temperatureRequest = z.strictObject({
  unit: unitName,
  /** As read now. */
  length: measuredText,
  /** Of the part, with its unit: "60 °C", "140 °F". */
  temperature: measuredText,
  /** A name (iron, steel, aluminium, bronze …) or a coefficient in 1/K. */
  material: measuredText,
  /** Of the steel gauge that read it; taken as 20 °C when absent. */
  gaugeTemperature: z.optional(measuredText),
});

export const temperatureResponse = z.strictObject({
  unit: z.string(),
  lengthAt20C: z.string(),
  /** As read less at 20 °C. */
  change: z.string(),
  /** Of the correction alone, in `unit`. */
  standardUncertainty: z.number(),
  working: z.array(z.string()),
});

export type TemperatureRequest = z.infer<typeof temperatureRequest>;
export type TemperatureResponse = z.infer<typeof temperatureResponse>;
