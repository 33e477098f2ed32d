import { sha256, toHex, utf8 } from '@/domain/ledger/bytes';
import type { Ports, RulebookToPrint } from '../../ports';
import { Kept } from '../kept';

const MOST_BYTES = 64_000_000;

const prints = new Kept<Promise<Uint8Array>>(100, MOST_BYTES);

export interface PrintedRulebook {
  /** Of what was printed: the same rules of the same series give the same tag. */
  readonly tag: string;
  readonly bytes: () => Promise<Uint8Array>;
}

/**
 * The rules on paper, drawn once and then served as they are for as long as the rules stand. Asked
 * several times at once, they are drawn once.
 */
export const printRulebook = (
  { rulebooks }: Pick<Ports, 'rulebooks'>,
  input: RulebookToPrint,
): PrintedRulebook => {
  const tag = toHex(sha256(utf8(JSON.stringify(input)))).slice(0, 32);
  const draw = async (): Promise<Uint8Array> => {
    const before = prints.find(tag);
    if (before !== undefined) return before;
    const drawing = rulebooks.print(input);
    prints.keep(tag, drawing);
    try {
      const bytes = await drawing;
      prints.keep(tag, drawing, bytes.length);
      return bytes;
    } catch (error) {
      prints.drop(tag);
      throw error;
    }
  };
  return { tag, bytes: draw };
};
