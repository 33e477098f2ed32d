import type { Role } from '../access/permission';

/** Messages that a person may do without, as they are chosen from. */
export interface MailTopic {
  readonly id: string;
  readonly title: string;
  readonly explanation: string;
  readonly kinds: readonly string[];
  /** Whom such messages go to. */
  readonly to: readonly Role[];
}

export const MAIL_TOPICS: readonly MailTopic[] = [
  {
    id: 'paperwork-to-check',
    title: 'Paperwork to check',
    explanation: 'Somebody handed paperwork in. The list in the race office shows it as well.',
    kinds: ['paperwork-to-check'],
    to: ['official'],
  },
  {
    id: 'rules-questions',
    title: 'Rules questions',
    explanation: 'Somebody asked about a clause. The list in the race office shows it as well.',
    kinds: ['rules-question'],
    to: ['official'],
  },
  {
    id: 'due-soon',
    title: 'Due soon',
    explanation: 'Something of yours is due within a day, or was. The paddock shows it as well.',
    kinds: ['due-soon', 'overdue'],
    to: ['competitor'],
  },
];

/** Nothing for a message that everybody gets whom it concerns. */
export const topicOf = (kind: string): MailTopic | undefined =>
  MAIL_TOPICS.find(({ kinds }) => kinds.includes(kind));

/** Messages with which somebody is told what binds them or starts a clock. */
const LEGAL = /^(verdict|bulletin|protest|appeal|hearing|bond|penalty|event|paperwork)-/;

/** Whether it must reach the person: where a message does not, another way is found and recorded. */
export const isLegalNotice = (kind: string): boolean =>
  topicOf(kind) === undefined && LEGAL.test(kind);

const KIND_WORDS: Readonly<Record<string, string>> = {
  'paperwork-to-check': 'Paperwork to check',
  'paperwork-receipt': 'Receipt of paperwork',
  'paperwork-accepted': 'Paperwork accepted',
  'paperwork-returned': 'Paperwork returned',
  'paperwork-withdrawn': 'Paperwork withdrawn',
  'rules-question': 'Rules question',
  'rules-answer': 'Answer to a rules question',
  'bulletin-published': 'Bulletin',
  'bulletin-affects-engine': 'Bulletin that affects an engine',
  'verdict-published': 'Notice of a verdict',
  'builder-invitation': 'Invitation of a builder',
  'guardian-request': 'Request to a guardian',
  'engine-offer': 'Offer of an engine',
  'engine-accepted': 'Engine taken over',
  'engine-swapped': 'Engine swapped',
  'gauge-found-bad': 'Gauge found bad',
  'due-soon': 'Due soon',
  overdue: 'Overdue',
  invitation: 'Invitation',
};

/** A kind that has no words of its own is shown by its name. */
export const mailKindWords = (kind: string): string =>
  KIND_WORDS[kind] ?? kind.replaceAll('-', ' ').replace(/^./, (first) => first.toUpperCase());
