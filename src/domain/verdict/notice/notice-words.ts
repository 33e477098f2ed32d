import { formatDeadline, formatInZone } from '../../deadline/format-in-zone';
import { dayWords } from '../instant-words';
import { moneyWords } from '../money';
import type { NoticeClause, NoticeDocument, NoticeRole } from './notice';

/** `4.3`, `4.1 and 4.3`, `3.1, 4.1 and 4.3` */
export const listWords = (items: readonly string[]): string =>
  items.length < 2
    ? items.join('')
    : `${items.slice(0, -1).join(', ')} and ${items[items.length - 1]}`;

export const DECISION_WORDS = { breach: 'Breach', 'no-breach': 'No breach' } as const;

export const ROLE_WORDS: Readonly<Record<NoticeRole, string>> = {
  found: 'Found and signed',
  'second-reading': 'Independent second reading',
  witness: 'Witness',
  decided: 'Decided',
};

/** The decision in one sentence. */
export const decisionWords = (notice: NoticeDocument): string => {
  const { event } = notice;
  const where = `of class ${notice.className} at event ${event.number}, ${event.track}, ${dayWords(event.startsAt, event.zone)}`;
  if (notice.decision === 'no-breach') {
    return `No breach was found on car ${notice.car} ${where}. Its result stands.`;
  }
  const clauses = notice.breached.map(({ number }) => number);
  return `Car ${notice.car} breached ${clauses.length === 1 ? 'clause' : 'clauses'} ${listWords(clauses)} ${where}.`;
};

/** What follows from it; nothing where there is no penalty. */
export const penaltySentence = ({ penalty }: NoticeDocument): string | undefined =>
  penalty === undefined
    ? undefined
    : `Penalty: ${penalty.words}${penalty.money === undefined ? '' : `; fine of ${moneyWords(penalty.money)}`}.`;

export const computedSentence = (notice: NoticeDocument): string => {
  const { computed, againstComputedBecause: against } = notice;
  const statement =
    computed === 'none'
      ? 'The signed report makes no statement on a mandatory clause'
      : `The computed finding was ${computed}`;
  if (against !== undefined) return `${statement}; the decision departs from it: ${against}`;
  return computed === 'none' ? `${statement}.` : `${statement}; the decision agrees with it.`;
};

export const provisionalWords = (notice: NoticeDocument): string =>
  `Provisional until ${formatInZone(notice.provisionalUntil, notice.event.zone)}`;

/** The end of the appeal window, named by the day that ends. */
export const appealUntilWords = ({ appeal, publishedAt, event }: NoticeDocument): string =>
  formatDeadline({
    startsAt: publishedAt,
    endsAt: appeal.until,
    zone: event.zone,
    window: { kind: 'end-of-day', days: 0 },
  });

/** `Edition 4 as amended by bulletin 2` */
export const sourceWords = ({ edition, bulletin }: NoticeClause): string =>
  bulletin === undefined
    ? `Edition ${edition}`
    : `Edition ${edition} as amended by bulletin ${bulletin}`;

/** A hash in groups of four: the first sixteen digits unless more are asked for. */
export const hashWords = (hash: string, digits = 16): string =>
  hash.slice(0, digits).replaceAll(/(.{4})(?=.)/g, '$1 ');
