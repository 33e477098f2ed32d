import * as z from 'zod/mini';
import { whole } from '../rulebook/text';

const name = z.string().check(z.minLength(1), z.maxLength(80));

const bank = z.strictObject({
  name,
  side: z.enum(['left', 'right', 'middle']),
  offset: z.enum(['ahead', 'level', 'behind']),
  cylinders: z.array(whole).check(z.minLength(1), z.maxLength(16)),
  bores: z
    .array(z.strictObject({ cylinder: whole, valve: z.enum(['intake', 'exhaust']) }))
    .check(z.minLength(1), z.maxLength(64)),
});

/** A position map; whether it can be measured by is the domain's to say (`layoutFaults`). */
export const boreLayout = z.strictObject({
  name,
  viewedFrom: z.enum(['front', 'rear']),
  banks: z.array(bank).check(z.minLength(1), z.maxLength(4)),
});
