import { PDFDocument } from 'pdf-lib';
import { formatInZone } from '@/domain/deadline/format-in-zone';
import { clockWords, dayAndClockWords, shortDay } from '@/domain/verdict/instant-words';
import type { ClauseAtFault, NonCompliance } from '@/domain/verdict/non-compliance';
import { hashWords, ROLE_WORDS, sourceWords } from '@/domain/verdict/notice/notice-words';
import type { NonCompliancePrinter, NonComplianceToPrint } from '@/services/ports';
import { type Block, BOLD, gap, HEAD, NUM, paragraph, type Span, TEXT } from '../blocks';
import { paginate, type Section } from '../flow';
import { drawFrame, drawQr } from '../frame';
import { type Pen, POINTS, penOn, SHEET } from '../pen';
import { readingSection } from '../reading-section';
import { table } from '../table';
import { openTypefaces, type Style } from '../typeface/typeface';

type Width = (text: string, style: Style) => number;
const TITLE: Style = { face: 'bold', size: 29 };
const CAR: Style = { face: 'num-bold', size: 30, white: true };
const plain = (text: string): Span => ({ text, style: TEXT });
const bold = (text: string): Span => ({ text, style: BOLD });

const readings = ({ readings: rows }: ClauseAtFault, zone: string): readonly Block[] =>
  table(
    [
      { head: 'Position', at: SHEET.content },
      { head: 'Read', at: 270 },
      { head: 'Where', at: 430 },
      { head: 'Reading', at: 610, align: 'right' },
      { head: 'Gauge', at: 622 },
      { head: 'Taken', at: SHEET.right, align: 'right' },
    ],
    rows.map((row) => [
      { text: row.position },
      { text: row.label.replace(' diameter', '') },
      { text: row.where },
      { text: `${row.value.text.replace('-', '−')} ${row.value.unit}`, style: NUM },
      { text: row.gauge },
      { text: clockWords(row.takenAt, zone), style: NUM },
    ]),
  );

const clauseSections = (
  at: ClauseAtFault,
  sheet: NonCompliance,
  width: Width,
): readonly Section[] => {
  const { clause, measurand, checked } = at;
  return [
    {
      label: ['Clause as in force'],
      blocks: paragraph(
        [
          { text: clause.number, style: { face: 'num-bold', size: 14.5 } },
          bold(` ${clause.heading}. Mandatory.`),
          plain(` “${clause.words}” ${sourceWords(clause)}.`),
        ],
        width,
      ),
    },
    ...(measurand === ''
      ? []
      : [{ label: ['Quantity, datum'], blocks: paragraph([plain(`${measurand}.`)], width) }]),
    readingSection(clause, width),
    ...(at.readings.length === 0
      ? []
      : [{ label: ['Readings', 'as taken'], blocks: readings(at, sheet.zone) }]),
    ...(checked.length === 0
      ? []
      : [
          {
            label: ['Checked'],
            blocks: checked.flatMap((words) => paragraph([plain(`${words}.`)], width)),
          },
        ]),
    ...(clause.decisionRule === undefined
      ? []
      : [{ label: ['Decision rule'], blocks: paragraph([plain(clause.decisionRule)], width) }]),
  ];
};

const sectionsOf = (sheet: NonCompliance, width: Width): readonly Section[] => [
  {
    label: ['Not complied with'],
    blocks: paragraph(
      [
        bold(sheet.clauses.map(({ clause }) => `${clause.number} ${clause.heading}`).join('; ')),
        plain('. The inspector’s finding; an official decides.'),
      ],
      width,
    ),
  },
  ...sheet.clauses.flatMap((at) => clauseSections(at, sheet, width)),
  {
    label: ['Gauges'],
    blocks: sheet.gauges.flatMap(({ code, kind, certificate, calibratedOn, dueOn }) =>
      paragraph(
        [
          bold(code),
          plain(
            ` ${kind.replaceAll('-', ' ')}. Certificate ${certificate ?? 'none on record'}${calibratedOn === undefined ? '' : `, calibrated ${shortDay(calibratedOn)}`}${dueOn === undefined ? '' : `, due ${shortDay(dueOn)}`}.`,
          ),
        ],
        width,
      ),
    ),
  },
  {
    label: ['People'],
    blocks: sheet.people.flatMap((person) =>
      paragraph(
        [
          bold(`${ROLE_WORDS[person.role]}: `),
          plain(`${person.name}, ${person.standing}, ${dayAndClockWords(person.at, sheet.zone)}`),
        ],
        width,
      ),
    ),
  },
  {
    label: ['Please note'],
    blocks: [
      ...paragraph(
        [
          plain(
            'Findings support a decision by the series’ officials; they are no certification that an engine is safe.',
          ),
        ],
        width,
      ),
      gap(4),
      ...(sheet.reason === '' ? [] : paragraph([plain(`Corrected: ${sheet.reason}`)], width)),
    ],
  },
];

const drawHead = (pen: Pen, sheet: NonCompliance, first: boolean): void => {
  const plate = Math.max(98, pen.width(sheet.car, CAR) + 28);
  pen.box(SHEET.left, 55, plate, first ? 58 : 36);
  const size = first ? 30 : 20;
  pen.text(SHEET.left + plate / 2, first ? 95 : 80, sheet.car, { ...CAR, size }, 'center');
  const x = SHEET.left + plate + 18;
  if (first) {
    pen.text(x, 74, 'Report of non-compliance', TITLE);
    pen.text(x, 97, `${sheet.series}, ${sheet.className}, ${sheet.event}`, TEXT);
    pen.text(x, 117, `Competitor ${sheet.competitor}. Report revision ${sheet.revision}`, TEXT);
  } else pen.text(x, 78, `Report of non-compliance, revision ${sheet.revision}, continued`, TEXT);
  pen.line(SHEET.left, first ? 137 : 103, SHEET.right, first ? 137 : 103, 2);
};

const drawFoot = (pen: Pen, { sheet, url }: NonComplianceToPrint, page: number, of: number) => {
  pen.line(SHEET.left, 975, SHEET.right, 975, 2);
  const rows = [
    ['Rules in force', hashWords(sheet.rulesHash, 32), NUM],
    ['Signed report', hashWords(sheet.reportHash, 32), NUM],
    ['Signed', formatInZone(sheet.signedAt, sheet.zone), TEXT],
    ['Page', `${page} of ${of}`, BOLD],
  ] as const;
  for (const [i, [label, words, style]] of rows.entries()) {
    pen.text(SHEET.left, 1001 + i * 24, label, HEAD);
    pen.text(SHEET.content, 1001 + i * 24, words, style);
  }
  drawQr(pen, url, 656, 988, 88);
};

/** Prints what a signed report finds not complied with, on A4, black only. */
export const nonCompliancePrinter: NonCompliancePrinter = {
  print: async (input) => {
    const { sheet } = input;
    const at = new Date(sheet.signedAt);
    const document = await PDFDocument.create({ updateMetadata: false });
    document.setTitle(`Report of non-compliance, car ${sheet.car}`, { showInWindowTitleBar: true });
    document.setAuthor(sheet.series);
    document.setProducer('Tagwire');
    document.setCreator('Tagwire');
    document.setLanguage('en');
    document.setCreationDate(at);
    document.setModificationDate(at);
    const type = await openTypefaces(document, JSON.stringify(input));
    const pages = paginate(sectionsOf(sheet, type.width), { first: 138, later: 104 });
    for (const [place, placements] of pages.entries()) {
      const pen = penOn(document.addPage([SHEET.width * POINTS, SHEET.height * POINTS]), type);
      drawFrame(pen);
      drawHead(pen, sheet, place === 0);
      for (const placement of placements) placement.draw(pen);
      drawFoot(pen, input, place + 1, pages.length);
    }
    return document.save({ useObjectStreams: false });
  },
};
