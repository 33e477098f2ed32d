import QRCode from 'qrcode';
import { stampWords } from '@/domain/verdict/instant-words';
import { hashWords } from '@/domain/verdict/notice/notice-words';
import type { NoticeToPrint } from '@/services/ports';
import { BOLD, HEAD, NUM } from './blocks';
import { type Pen, SHEET } from './pen';

const NOTCH = 34;

const outline = (inset: number): string => {
  const near = 22 + inset;
  const right = SHEET.width - near;
  const bottom = SHEET.height - near;
  // The cut moves inward with the edges, so that the two rules stay parallel.
  const cut = near + NOTCH - inset * 0.586;
  return `M${cut} ${near}L${right} ${near} ${right} ${bottom} ${near} ${bottom} ${near} ${cut}z`;
};

/** The double rule and the cut corner of what is signed and closed. */
export const drawFrame = (pen: Pen): void => {
  pen.path(outline(0), 0, 0, { weight: 2 });
  pen.path(outline(5), 0, 0, { weight: 1 });
};

export const drawQr = (pen: Pen, url: string, left: number, top: number, size: number): void => {
  const { modules } = QRCode.create(url, { errorCorrectionLevel: 'M' });
  const edge = size / modules.size;
  for (let row = 0; row < modules.size; row += 1) {
    for (let from = 0; from < modules.size; from += 1) {
      let to = from;
      while (to < modules.size && modules.get(row, to)) to += 1;
      if (to > from) pen.box(left + from * edge, top + row * edge, (to - from) * edge, edge);
      from = to;
    }
  }
};

/** What stands at the foot of every page. */
export const drawFoot = (
  pen: Pen,
  { notice, ledger, url }: NoticeToPrint,
  page: { readonly number: number; readonly of: number },
): void => {
  pen.line(SHEET.left, 975, SHEET.right, 975, 2);
  const line = `${ledger.line}${ledger.checkpoint === undefined ? '' : `, under checkpoint ${ledger.checkpoint}`}`;
  const rows = [
    ['Rules in force', hashWords(notice.rules.hash, 32)],
    ['Ledger line', line],
    ['This notice', `signed and closed ${stampWords(notice.publishedAt, notice.event.zone)}`],
    ['Page', `${page.number} of ${page.of}`],
  ] as const;
  for (const [i, [label, words]] of rows.entries()) {
    pen.text(SHEET.left, 1001 + i * 24, label, HEAD);
    pen.text(SHEET.content, 1001 + i * 24, words, label === 'Page' ? BOLD : NUM);
  }
  drawQr(pen, url, 656, 988, 88);
};
