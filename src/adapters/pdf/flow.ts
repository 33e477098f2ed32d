import { type Block, HEAD } from './blocks';
import { type Pen, SHEET } from './pen';

/** A labelled part of the sheet, ruled off from the one before. */
export interface Section {
  readonly label: readonly string[];
  readonly blocks: readonly Block[];
}

export interface Placement {
  readonly draw: (pen: Pen) => void;
}

const PAD = 11;
const BOTTOM = 962;

/** Sections cut into pages: `first` and `later` are the tops of their content. */
export const paginate = (
  sections: readonly Section[],
  { first, later }: { readonly first: number; readonly later: number },
): readonly (readonly Placement[])[] => {
  const pages: Placement[][] = [[]];
  let y = first;
  const put = (draw: (pen: Pen) => void) => void pages.at(-1)?.push({ draw });
  const turn = () => {
    pages.push([]);
    y = later;
  };
  const label = (words: readonly string[], top: number) =>
    put((pen) => {
      for (const [i, word] of words.entries())
        pen.text(SHEET.left, top + 14.5 + i * 20, word, HEAD);
    });

  for (const [place, { label: words, blocks }] of sections.entries()) {
    const opening = blocks.slice(0, 2).reduce((sum, block) => sum + block.height, 0);
    if (y + 2 * PAD + opening > BOTTOM) turn();
    else if (place > 0) {
      const at = y;
      put((pen) => pen.line(SHEET.left, at, SHEET.right, at, 1));
    }
    y += PAD;
    label(words, y);
    for (const block of blocks) {
      if (y + block.height > BOTTOM) {
        turn();
        y += PAD;
        label(words, y);
        const { head } = block;
        if (head !== undefined) {
          const at = y;
          put((pen) => head.draw(pen, at));
          y += head.height;
        }
      }
      const at = y;
      put((pen) => block.draw(pen, at));
      y += block.height;
    }
    y += PAD;
  }
  return pages;
};
