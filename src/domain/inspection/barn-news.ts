import * as z from 'zod/mini';

const id = z.uuid();

const newsShape = z.discriminatedUnion('kind', [
  z.object({
    kind: z.literal('inspection'),
    series: id,
    inspection: id,
    state: z.string(),
    version: z.int(),
  }),
  z.object({
    kind: z.literal('readings'),
    series: id,
    inspection: id,
    batch: z.int(),
    /** Who took them. */
    by: id,
    /** Bores and cylinders as `5 intake`; the engine as a whole is an empty text. */
    places: z.array(z.string()),
  }),
  z.object({
    kind: z.literal('check'),
    series: id,
    event: id,
    entry: id,
    state: z.string(),
  }),
]);

/** What the barn's tablets hear of an act once it is committed: ids and where things stand. */
export type BarnNews = z.output<typeof newsShape>;

/** Reads what was told; nothing where it is not of this form. */
export const readBarnNews = (text: string): BarnNews | undefined => {
  try {
    const read = newsShape.safeParse(JSON.parse(text));
    return read.success ? read.data : undefined;
  } catch {
    return undefined;
  }
};
