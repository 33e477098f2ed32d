import type { NoticeClause, NoticePosition } from '@/domain/verdict/notice/notice';
import { type Block, BOLD, gap, NUM, paragraph, TEXT } from './blocks';
import type { Section } from './flow';
import { drawMark } from './masthead';
import { SHEET } from './pen';
import { drawLargeStrip, drawSmallStrip, LARGE_STRIP_HEIGHT, stripOf } from './strip';
import { type Cell, type Column, table } from './table';
import type { Style } from './typeface/typeface';

type Width = (text: string, style: Style) => number;

const minus = (text: string): string => text.replace('-', '−');

/** How far past its limit a value lies, for choosing the one that is shown large. */
const beyond = ({ limits }: NoticeClause, { value }: NoticePosition): number => {
  const reading = Number(value?.text ?? Number.NaN);
  const over = limits?.max === undefined ? -Infinity : reading - Number(limits.max.text);
  const under = limits?.min === undefined ? -Infinity : Number(limits.min.text) - reading;
  return Math.max(over, under);
};

const LARGE: Style = { face: 'num-bold', size: 29 };
/** Smaller where the figure would not leave room for what it is of. */
const SIZES = [29, 27, 25, 23];
const FACTOR: Style = { face: 'num', size: 16 };

const large = (clause: NoticeClause, position: NoticePosition, width: Width): readonly Block[] => {
  const { value, uncertainty, k } = position;
  if (value === undefined) return [];
  const unit = value.unit === '1' ? '' : ` ${value.unit}`;
  const main = `${minus(value.text)}${unit}${uncertainty === undefined ? '' : ` ± ${uncertainty.text}${unit}`}`;
  const factor = uncertainty === undefined || k === undefined ? '' : `(k = ${k})`;
  const what = `${(clause.measured ?? '').toLowerCase().replaceAll(' diameter', '')}, ${position.position}`;
  const room = SHEET.right - SHEET.content - width(factor, FACTOR) - width(what, BOLD) - 20;
  const fitting = SIZES.find((size) => width(main, { ...LARGE, size }) <= room);
  const style = { ...LARGE, size: fitting ?? LARGE.size };
  const left = SHEET.content + width(main, style) + 10;
  const beside = fitting !== undefined;
  const bound = (limit: 'min' | 'max') => {
    const written = clause.limits?.[limit];
    return written === undefined
      ? {}
      : { [limit]: `${limit} ${minus(written.text)} ${written.unit}` };
  };
  return [
    {
      height: 40,
      draw: (pen, top) => {
        pen.text(SHEET.content, top + 24, main, style);
        pen.text(left, top + 24, factor, FACTOR);
        if (beside) pen.text(SHEET.right, top + 24, what, BOLD, 'right');
      },
    },
    ...(beside ? [] : paragraph([{ text: what, style: BOLD }], width)),
    ...(clause.limits === undefined
      ? []
      : [
          {
            height: LARGE_STRIP_HEIGHT,
            draw: (pen, top) =>
              drawLargeStrip(
                pen,
                stripOf(clause, position),
                {
                  ...bound('min'),
                  ...bound('max'),
                  reading: `${minus(value.text)}${unit}`,
                  outside: 'outside: past what the clause allows',
                },
                { x: SHEET.content, y: top + 12, width: SHEET.right - SHEET.content },
              ),
          } satisfies Block,
          gap(12),
        ]),
  ];
};

// A foot is held against its body at the largest of each: those two figures stand in the table.
const PARTS = [
  { label: 'Lifter foot diameter', head: 'Foot', at: 312 },
  { label: 'Lifter body diameter', head: 'Body', at: 372 },
] as const;

const largest = ({ readings }: NoticePosition, label: string): string => {
  const texts = readings
    .filter((reading) => reading.label === label)
    .map(({ value }) => value.text);
  return texts.sort((a, b) => Number(b) - Number(a))[0] ?? '';
};

const numbers = (clause: NoticeClause): readonly Block[] => {
  const [first] = clause.positions;
  const unit = first?.value?.unit === '1' ? '' : `, ${first?.value?.unit ?? ''}`;
  const parts = PARTS.filter(({ label }) =>
    clause.positions.every((position) => largest(position, label) !== ''),
  );
  const both = parts.length === PARTS.length;
  const k = first?.k === undefined ? '' : ` (k = ${first.k})`;
  const columns: Column[] = [
    { head: 'Position', at: SHEET.content },
    ...(both ? parts : []).map(
      ({ head, at }): Column => ({
        head: `${head}${unit}`,
        at,
        align: 'right',
      }),
    ),
    { head: both ? `Difference${unit}` : `Measured${unit}`, at: 456, align: 'right' },
    { head: `± U${unit}${k}`, at: 562, align: 'right' },
    { head: 'Against limit', at: 574 },
    { head: 'Finding', at: SHEET.right, align: 'right' },
  ];
  const rows = clause.positions.map((position): readonly Cell[] => [
    { text: position.position },
    ...(both ? parts : []).map(({ label }) => ({ text: largest(position, label), style: NUM })),
    { text: minus(position.value?.text ?? ''), style: NUM },
    { text: position.uncertainty?.text ?? '', style: NUM },
    { draw: (pen, x, top) => drawSmallStrip(pen, stripOf(clause, position), x, top, 100) },
    {
      draw: (pen, x, top) => {
        pen.text(x, top + 16.5, position.pass === false ? 'fail' : 'none', TEXT, 'right');
        if (position.pass === false) drawMark(pen, true, x - 46, top + 3, 16);
      },
    },
  ]);
  return table(columns, rows);
};

const answers = (clause: NoticeClause, width: Width): readonly Block[] =>
  clause.positions.flatMap(({ sentence }) => paragraph([{ text: sentence, style: TEXT }], width));

/** What was found against one clause: the farthest value large, every failing position in the table. */
export const readingSection = (clause: NoticeClause, width: Width): Section => {
  const measured = clause.positions.filter(({ value }) => value !== undefined);
  const [worst] = [...measured].sort((a, b) => beyond(clause, b) - beyond(clause, a));
  return {
    label: [worst === undefined ? 'Finding' : 'Reading'],
    blocks:
      worst === undefined
        ? answers(clause, width)
        : [...large(clause, worst, width), ...numbers({ ...clause, positions: measured })],
  };
};
