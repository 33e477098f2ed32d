import { clockWords, dayWords } from '@/domain/verdict/instant-words';
import type { NoticeDocument } from '@/domain/verdict/notice/notice';
import { DECISION_WORDS } from '@/domain/verdict/notice/notice-words';
import { TEXT } from './blocks';
import { type Pen, SHEET } from './pen';
import type { Style } from './typeface/typeface';

const TITLE: Style = { face: 'bold', size: 29 };
const WORD: Style = { face: 'bold', size: 22 };

const plate = (pen: Pen, car: string, size: number, height: number): number => {
  const style: Style = { face: 'num-bold', size, white: true };
  const width = Math.max(98, pen.width(car, style) + 28);
  pen.box(SHEET.left, 55, width, height);
  pen.text(SHEET.left + width / 2, 55 + height / 2 + size * 0.36, car, style, 'center');
  return SHEET.left + width;
};

// Four cubic curves: the writer's arcs do not close.
const RING =
  'M14 2.5C20.35 2.5 25.5 7.65 25.5 14S20.35 25.5 14 25.5 2.5 20.35 2.5 14 7.65 2.5 14 2.5z';

/** The mark of the decision in a box of `size`: a solid square with a cross, a ring with a tick. */
export const drawMark = (pen: Pen, breach: boolean, x: number, y: number, size: number): void => {
  const scale = size / 28;
  if (breach) {
    pen.path('M2 2h24v24H2z', x, y, { scale });
    pen.path('M8 8l12 12M20 8L8 20', x, y, { scale, weight: 3.4, white: true });
    return;
  }
  pen.path(RING, x, y, { scale, weight: 3 });
  pen.path('M8.2 14.4l4.2 4.2 7.6-8.6', x, y, { scale, weight: 3 });
};

/** The first page's head: car, title, series, number, and the decision in its box. */
export const drawMasthead = (pen: Pen, notice: NoticeDocument): number => {
  const { series, season, number, publishedAt, event } = notice;
  const x = plate(pen, notice.car, 30, 58) + 18;
  pen.text(x, 74, 'Notice of a verdict', TITLE);
  pen.text(x, 97, `${series.name}, season ${season}`, TEXT);
  const when = `${dayWords(publishedAt, event.zone)}, ${clockWords(publishedAt, event.zone)}`;
  pen.text(x, 117, `Notice ${number}, published ${when} local time`, TEXT);
  const words = DECISION_WORDS[notice.decision];
  const left = SHEET.right - pen.width(words, WORD) - 70;
  const box = `M0 0H${SHEET.right - left}V48H0z`;
  pen.path(box, left, 60, { weight: 1.5 });
  drawMark(pen, notice.decision === 'breach', left + 15, 72, 26);
  pen.text(left + 52, 92, words, WORD);
  pen.line(SHEET.left, 137, SHEET.right, 137, 2);
  return 138;
};

/** The head of every later page. */
export const drawRunningHead = (pen: Pen, notice: NoticeDocument): number => {
  const x = plate(pen, notice.car, 20, 36) + 18;
  pen.text(x, 78, `Notice ${notice.number} of a verdict, ${notice.series.name}, continued`, TEXT);
  pen.line(SHEET.left, 103, SHEET.right, 103, 2);
  return 104;
};
