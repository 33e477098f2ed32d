import * as z from 'zod/mini';
import { captureRow } from './rows';

export const MOST_ROWS = 200;

/** What the tablet itself made of its rows, by clause; kept beside the rows and compared at signing. */
export const tabletAssessment = z.strictObject({
  domainVersion: z.string().check(z.maxLength(20)),
  /** State of each clause, `within`. */
  states: z.record(z.string().check(z.maxLength(40)), z.string().check(z.maxLength(40))),
});

/** One sending from a tablet: the act id is made on the device and stays with these rows for good. */
export const capturesRequest = z.strictObject({
  act: z.uuid('The act needs its identifier.'),
  /** Server's clock less the device's, in milliseconds, as the device measured it. */
  clockOffsetMs: z.int().check(z.gte(-86_400_000_000), z.lte(86_400_000_000)),
  rows: z
    .array(captureRow)
    .check(
      z.minLength(1, 'Nothing was sent.'),
      z.maxLength(MOST_ROWS, `Send at most ${MOST_ROWS} rows at once.`),
    ),
  tablet: z.optional(tabletAssessment),
});

export const capturesAnswer = z.strictObject({
  /** Number of this batch in the inspection's chain, and the chain's head after it (hexadecimal). */
  batch: z.int(),
  head: z.string(),
  receivedAt: z.string(),
  /** Rows that are kept and do not count, with the reason. */
  received: z.array(z.strictObject({ id: z.string(), reason: z.string() })),
  /** Rows that are kept and count, by a gauge that cannot support a breach. */
  marked: z.array(z.strictObject({ id: z.string(), reason: z.string() })),
});

export type CapturesRequest = z.output<typeof capturesRequest>;
export type CapturesAnswer = z.output<typeof capturesAnswer>;
export type TabletAssessment = z.output<typeof tabletAssessment>;
