import { PDFDocument, type PDFEmbeddedPage, type PDFPage } from 'pdf-lib';
import { formatInZone } from '@/domain/deadline/format-in-zone';
import type { Clause } from '@/domain/rulebook/clause';
import { requirementWords } from '@/domain/rulebook/describe';
import type { RulebookPrinter, RulebookToPrint } from '@/services/ports';
import { type Block, BOLD, gap, HEAD, NUM, paragraph, type Span, TEXT } from './blocks';
import { paginate, type Section } from './flow';
import { drawQr } from './frame';
import { type Pen, POINTS, penOn, SHEET } from './pen';
import { openTypefaces, type Style, type Typesetter } from './typeface/typeface';

const TITLE: Style = { face: 'bold', size: 29 };
type Width = (text: string, style: Style) => number;

/** Words in lines as they were written; an empty line stays empty. */
const lines = (text: string, style: Style, width: Width): readonly Block[] =>
  text.split(/\r?\n/).flatMap((line) => paragraph([{ text: line, style }], width));

const marked = (label: string, text: string, width: Width): readonly Block[] => {
  const spans: readonly Span[] = [
    { text: `${label}: `, style: HEAD },
    { text, style: TEXT },
  ];
  return paragraph(spans, width);
};

const clauseSection = (clause: Clause, input: RulebookToPrint, width: Width): Section => {
  const { rules, zone } = input;
  const { number } = clause;
  const bulletin = rules.sources.find((source) => source.clause === number)?.bulletin;
  const clarified = rules.clarifications.filter((one) => one.clause === number);
  const waived = rules.waivers.filter((one) => one.clause === number);
  const also = [
    clause.force === 'advisory' ? 'Advisory: it warns and disqualifies nobody.' : '',
    clause.force === 'judged' ? 'Judged by the officials.' : '',
    clause.penaltyRow === undefined ? '' : `Penalty row ${clause.penaltyRow}.`,
    bulletin === undefined ? '' : `As amended by bulletin ${bulletin}.`,
    clause.refs === undefined ? '' : `Leans on ${clause.refs.join(', ')}.`,
  ].filter((words) => words !== '');
  return {
    label: [number],
    blocks: [
      ...paragraph([{ text: clause.heading, style: BOLD }], width),
      ...(clause.words === '' ? [] : lines(clause.words, TEXT, width)),
      ...(clause.definitions ?? []).flatMap((one) => marked(one.term, one.meaning, width)),
      ...(clause.requirement === undefined
        ? []
        : marked('Checked', requirementWords(clause.requirement), width)),
      ...(also.length === 0 ? [] : paragraph([{ text: also.join(' '), style: HEAD }], width)),
      ...clarified.flatMap((one) => [
        gap(6),
        ...marked(`Clarification ${one.number}`, `${one.question} ${one.answer}`, width),
      ]),
      ...waived.flatMap((one) => {
        const holder =
          one.for.kind === 'car' ? `car ${one.for.carNumber}` : `engine ${one.for.engineName}`;
        const until = `until ${formatInZone(one.untilAt, zone)}`;
        return [gap(6), ...marked(`Waiver ${one.number}, ${holder}, ${until}`, one.words, width)];
      }),
    ],
  };
};

const penaltySections = ({ rules }: RulebookToPrint, width: Width): readonly Section[] =>
  rules.penalties.map((row) => ({
    label: ['Penalty', `row ${row.row}`],
    blocks: [
      ...paragraph([{ text: row.breach, style: BOLD }], width),
      ...row.penalties.flatMap((penalty, i) => marked(`Breach ${i + 1}`, penalty, width)),
      ...(row.carriesOver
        ? paragraph([{ text: 'Counts on into the next season.', style: HEAD }], width)
        : []),
    ],
  }));

const editionWords = ({ rules }: RulebookToPrint): string =>
  `Edition ${rules.edition}${rules.bulletins.length === 0 ? '' : `, with bulletins ${rules.bulletins.join(', ')}`}`;

const drawHead = (pen: Pen, input: RulebookToPrint, first: boolean): void => {
  const { rules, series, since, zone } = input;
  if (first) {
    pen.text(SHEET.left, 64, `${rules.className} rulebook`, TITLE);
    pen.text(SHEET.left, 90, `${series}, season ${rules.season}. ${editionWords(input)}`, TEXT);
    pen.text(SHEET.left, 110, `In force since ${formatInZone(since, zone)}`, TEXT);
  } else {
    const words = `${rules.className} rulebook, season ${rules.season}, continued`;
    pen.text(SHEET.left, 78, words, TEXT);
  }
  pen.line(SHEET.left, first ? 127 : 103, SHEET.right, first ? 127 : 103, 2);
};

const CODE = { left: 656, top: 988, size: 88 };

/** The code is drawn once and shown on every page: its hundreds of squares would be most of the file. */
const embedCode = async (
  document: PDFDocument,
  type: Typesetter,
  url: string,
): Promise<PDFEmbeddedPage> => {
  const sheet = await PDFDocument.create({ updateMetadata: false });
  const page = sheet.addPage([CODE.size * POINTS, CODE.size * POINTS]);
  drawQr(penOn(page, type), url, 0, 0, CODE.size);
  return document.embedPage(page);
};

const showCode = (page: PDFPage, code: PDFEmbeddedPage): void =>
  page.drawPage(code, {
    x: CODE.left * POINTS,
    y: page.getHeight() - (CODE.top + CODE.size) * POINTS,
  });

const drawFoot = (pen: Pen, { hash }: RulebookToPrint, number: number, of: number): void => {
  pen.line(SHEET.left, 975, SHEET.right, 975, 2);
  pen.text(SHEET.left, 1001, 'Rules in force', HEAD);
  pen.text(SHEET.content, 1001, hash.slice(0, 32), NUM);
  pen.text(SHEET.content, 1023, hash.slice(32), NUM);
  pen.text(SHEET.left, 1049, 'Page', HEAD);
  pen.text(SHEET.content, 1049, `${number} of ${of}`, BOLD);
};

/** Prints the rules in force on A4, black only; the same rules give the same bytes. */
export const rulebookPrinter: RulebookPrinter = {
  print: async (input) => {
    const at = new Date(input.since);
    const document = await PDFDocument.create({ updateMetadata: false });
    document.setTitle(`${input.rules.className} rulebook, season ${input.rules.season}`, {
      showInWindowTitleBar: true,
    });
    document.setAuthor(input.series);
    document.setProducer('Tagwire');
    document.setCreator('Tagwire');
    document.setLanguage('en');
    document.setCreationDate(at);
    document.setModificationDate(at);
    const type = await openTypefaces(document, JSON.stringify(input));
    const sections = [
      ...input.rules.clauses.map((clause) => clauseSection(clause, input, type.width)),
      ...penaltySections(input, type.width),
    ];
    const code = await embedCode(document, type, input.url);
    const pages = paginate(sections, { first: 128, later: 104 });
    for (const [place, placements] of pages.entries()) {
      const page = document.addPage([SHEET.width * POINTS, SHEET.height * POINTS]);
      const pen = penOn(page, type);
      drawHead(pen, input, place === 0);
      for (const placement of placements) placement.draw(pen);
      drawFoot(pen, input, place + 1, pages.length);
      showCode(page, code);
    }
    return document.save({ useObjectStreams: false });
  },
};
