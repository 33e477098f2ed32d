import * as z from 'zod/mini';
import { extensionShape, lineProofShape } from '@/domain/ledger/verify/line-proof';

/** Lines as they stand, with what everybody may see of what they commit to. */
export const linesAnswer = z.strictObject({
  lines: z.array(
    z.strictObject({
      line: z.string(),
      open: z.array(
        z.strictObject({ role: z.string(), salt: z.string(), content: z.nullable(z.string()) }),
      ),
    }),
  ),
});

export type LinesAnswer = z.infer<typeof linesAnswer>;

export const inclusionAnswer = lineProofShape;
export const consistencyAnswer = extensionShape;

/** Every key of the series in order; each hand-over stands under a head that the key before signed. */
export const keysAnswer = z.strictObject({
  current: z.string(),
  published: z.array(
    z.strictObject({ document: z.string(), salt: z.string(), proof: lineProofShape }),
  ),
});

export type KeysAnswer = z.infer<typeof keysAnswer>;
