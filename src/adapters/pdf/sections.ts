import { dayAndClockWords, shortDay } from '@/domain/verdict/instant-words';
import { moneyWords } from '@/domain/verdict/money';
import type { NoticeDocument, NoticeGauge, NoticePerson } from '@/domain/verdict/notice/notice';
import {
  appealUntilWords,
  computedSentence,
  decisionWords,
  penaltySentence,
  provisionalWords,
  ROLE_WORDS,
  sourceWords,
} from '@/domain/verdict/notice/notice-words';
import { BOLD, gap, NUM, paragraph, type Span, TEXT } from './blocks';
import type { Section } from './flow';
import { SHEET } from './pen';
import { readingSection } from './reading-section';
import { type Cell, table } from './table';
import type { Style, Typesetter } from './typeface/typeface';

type Width = Typesetter['width'];
type Setting = Pick<Typesetter, 'width' | 'covers'>;

const LEAD: Style = { face: 'bold', size: 18 };
const CLAUSE: Style = { face: 'num-bold', size: 14.5 };
const plain = (text: string): Span => ({ text, style: TEXT });
const bold = (text: string): Span => ({ text, style: BOLD });

const decision = (notice: NoticeDocument, width: Width): Section => {
  const { penalty } = notice;
  const lead = [decisionWords(notice), penaltySentence(notice) ?? ''].join(' ').trim();
  const schedule =
    penalty === undefined ? '' : `Penalty schedule ${penalty.row}, step ${penalty.step}. `;
  return {
    label: ['Decision'],
    blocks: [
      ...paragraph([{ text: lead, style: LEAD }], width, { line: 23 }),
      gap(4),
      ...paragraph(
        [
          plain(`${schedule}${computedSentence(notice)} `),
          bold(`${provisionalWords(notice)},`),
          plain(' then final unless a protest or an appeal is lodged.'),
        ],
        width,
      ),
    ],
  };
};

const gaugeRow = (gauge: NoticeGauge): readonly Cell[] => {
  const { range, calibratedOn, dueOn } = gauge;
  const reach =
    range === undefined ? '' : `, ${range.from.text} to ${range.to.text} ${range.to.unit}`;
  const calibrated =
    calibratedOn === undefined ? 'no calibration on record' : shortDay(calibratedOn);
  const [zero] = gauge.zeros;
  return [
    { text: `${gauge.code} ${gauge.kind.replaceAll('-', ' ')}${reach}` },
    { text: gauge.certificate ?? '', style: NUM },
    { text: dueOn === undefined ? calibrated : `${calibrated} to ${shortDay(dueOn)}` },
    {
      text:
        zero === undefined ? '' : `${zero.before.text}, ${zero.after?.text ?? 'no closing zero'}`,
      style: NUM,
    },
  ];
};

const gauges = (rows: readonly NoticeGauge[]): Section => ({
  label: ['Gauges and', 'certificates'],
  blocks: table(
    [
      { head: 'Gauge', at: SHEET.content },
      { head: 'Certificate', at: 392 },
      { head: 'Calibrated', at: 470 },
      { head: 'Zero before, after', at: SHEET.right, align: 'right' },
    ],
    rows.map(gaugeRow),
  ),
});

const nameOf = ({ name, latinName }: NoticePerson, covers: Typesetter['covers']): string => {
  if (latinName === undefined || latinName === name) return name;
  return covers(name) ? `${name} (${latinName})` : latinName;
};

const people = ({ people: rows, event }: NoticeDocument, { width, covers }: Setting): Section => ({
  label: ['People'],
  blocks: [
    ...table(
      [
        { head: '', at: SHEET.content },
        { head: '', at: 383 },
        { head: '', at: SHEET.right, align: 'right' },
      ],
      rows.map((person) => [
        { text: ROLE_WORDS[person.role], style: BOLD },
        { text: `${nameOf(person, covers)}, ${person.standing}` },
        { text: dayAndClockWords(person.at, event.zone) },
      ]),
    )
      .slice(1)
      .map(({ head: _, ...block }) => block),
    ...paragraph([plain('The person who decided took no reading and signed no finding.')], width),
  ],
});

const appeal = (notice: NoticeDocument, width: Width): Section => {
  const { address, bond } = notice.appeal;
  const where = address === '' ? 'on paper at the race office' : `at ${address}`;
  return {
    label: ['To appeal'],
    blocks: paragraph(
      [
        plain('In writing to the appeals panel '),
        bold(`by ${appealUntilWords(notice)},`),
        plain(` ${where}, with the bond of ${moneyWords(bond)}.`),
      ],
      width,
    ),
  };
};

/** Every section of the sheet, in the order in which a reader asks. */
export const sectionsOf = (
  notice: NoticeDocument,
  { width, covers }: Setting,
): readonly Section[] => [
  decision(notice, width),
  { label: ['Reasons'], blocks: paragraph([plain(notice.reasons)], width) },
  ...notice.breached.flatMap((clause): readonly Section[] => [
    {
      label: ['Clause as in force'],
      blocks: paragraph(
        [
          { text: clause.number, style: CLAUSE },
          bold(` ${clause.heading}. Mandatory.`),
          plain(` “${clause.words}” ${sourceWords(clause)}.`),
        ],
        width,
      ),
    },
    readingSection(clause, width),
    ...(clause.decisionRule === undefined
      ? []
      : [{ label: ['Decision rule'], blocks: paragraph([plain(clause.decisionRule)], width) }]),
  ]),
  ...(notice.decision === 'breach'
    ? []
    : [
        {
          label: ['Clauses checked'],
          blocks: notice.checked.flatMap(({ number, heading }) =>
            paragraph([{ text: number, style: CLAUSE }, plain(` ${heading}`)], width),
          ),
        },
      ]),
  ...(notice.gauges.length === 0 ? [] : [gauges(notice.gauges)]),
  people(notice, { width, covers }),
  appeal(notice, width),
  {
    label: ['Please note'],
    blocks: paragraph(
      [
        plain(
          'This notice decides on the rules of a class. It is no certification that an engine is safe.',
        ),
      ],
      width,
    ),
  },
];
