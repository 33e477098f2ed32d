import { PDFDocument } from 'pdf-lib';
import { PART_KINDS } from '@/domain/inspection/custody/tag';
import { dayAndClockWords } from '@/domain/verdict/instant-words';
import type { TagPrinter, TagToPrint } from '@/services/ports';
import { type Span, wrap } from '../blocks';
import { drawQr } from '../frame';
import { type Pen, POINTS, penOn, SHEET } from '../pen';
import { openTypefaces, type Style } from '../typeface/typeface';

/** 100 × 62 mm in CSS pixels. */
const LABEL = { width: 378, height: 234 } as const;
const QR = 148;
const TEXT: Style = { face: 'text', size: 12 };
const BOLD: Style = { face: 'bold', size: 13 };
const HEAD: Style = { face: 'head', size: 12 };
const TAG: Style = { face: 'num-bold', size: 24 };
const CAR: Style = { face: 'num-bold', size: 20, white: true };
const SMALL: Style = { face: 'num', size: 7.5 };

const rowsOf = ({ part, zone }: TagToPrint): readonly (readonly [string, string])[] =>
  (
    [
      ['Where', part.placeOnEngine],
      ['Clause', part.clause],
      ['Bag', part.bag],
      ['Taken', dayAndClockWords(part.takenAt, zone)],
      ['By', part.takenBy],
      ['From', part.takenFrom],
      ['Event', part.event],
    ] as const
  ).filter(([, text]) => text !== '');

const drawLabel = (pen: Pen, input: TagToPrint, left: number, top: number): void => {
  const { part, series, code } = input;
  const { width, height } = LABEL;
  pen.path(`M0 0H${width - 8}V${height - 8}H0z`, left + 4, top + 4, { weight: 1.5 });
  const plate = Math.max(60, pen.width(part.carNumber, CAR) + 22);
  pen.box(left + 14, top + 14, plate, 34);
  pen.text(left + 14 + plate / 2, top + 38, part.carNumber, CAR, 'center');
  pen.text(left + plate + 24, top + 39, part.tag, TAG);
  pen.text(left + 14, top + 66, `${PART_KINDS[part.kind]}. ${series}`, HEAD);
  const room = width - QR - 40;
  const span = (text: string, style: Style): readonly Span[] => [{ text, style }];
  let y = top + 84;
  for (const line of wrap(span(part.words, BOLD), room, pen.width).slice(0, 2)) {
    pen.text(left + 14, y, line.map(({ text }) => text).join(''), BOLD);
    y += 16;
  }
  for (const [name, text] of rowsOf(input)) {
    const [line] = wrap(span(text, TEXT), room - 46, pen.width);
    if (y > top + height - 24) break;
    pen.text(left + 14, y, name, HEAD);
    pen.text(left + 60, y, (line ?? []).map(({ text: word }) => word).join(''), TEXT);
    y += 15;
  }
  drawQr(pen, code, left + width - QR - 14, top + 56, QR);
  pen.text(left + 14, top + height - 14, `SHA-256 ${part.hash}`, SMALL);
};

/** Prints a part's tag, black only: its text, and a code that says the same and opens its page. */
export const tagPrinter: TagPrinter = {
  print: async (input) => {
    const { part, series, paper } = input;
    const at = new Date(part.takenAt);
    const document = await PDFDocument.create({ updateMetadata: false });
    document.setTitle(`Tag ${part.tag}, car ${part.carNumber}`, { showInWindowTitleBar: true });
    document.setAuthor(series);
    document.setProducer('Tagwire');
    document.setCreator('Tagwire');
    document.setLanguage('en');
    document.setCreationDate(at);
    document.setModificationDate(at);
    const type = await openTypefaces(document, JSON.stringify(input));
    const { width, height } = paper === 'label' ? LABEL : SHEET;
    const pen = penOn(document.addPage([width * POINTS, height * POINTS]), type);
    if (paper === 'label') drawLabel(pen, input, 0, 0);
    else {
      const cut: Style = { face: 'text', size: 14.5 };
      pen.text(SHEET.left, 70, 'Cut out: one for the part, one for its bag.', cut);
      drawLabel(pen, input, SHEET.left, 90);
      drawLabel(pen, input, SHEET.left, 90 + LABEL.height + 24);
    }
    return document.save({ useObjectStreams: false });
  },
};
