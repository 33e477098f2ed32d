import { composeNotice, type NoticeParts } from '@/domain/verdict/notice/compose-notice';
import { readReport } from '@/domain/verdict/report-view';
import { BIG_FEET, BREACH, reportText, STREET_EIGHT } from '../../support/verdict-case';

export const reportOf = (text: string) => {
  const read = readReport(text);
  if (!read.ok) throw new Error(read.failure.detail);
  return read.value;
};

export const partsOf = (more: Partial<NoticeParts> = {}): NoticeParts => ({
  number: '2026-041',
  at: '2026-07-12T14:20:00.000Z',
  series: {
    id: '00000000-0000-7000-8000-000000000001',
    slug: 'corran-valley',
    name: 'Corran Valley Saturday Series',
    appealDays: 3,
    appealsAddress: 'Race office, Quarrel Fen Oval',
    bondMinor: '25000',
    currency: 'USD',
  },
  season: '2026',
  className: 'Street Eight',
  event: {
    number: '7',
    slug: 'round-7',
    name: 'Round 7',
    track: 'Quarrel Fen Oval',
    startsAt: '2026-07-11T22:00:00.000Z',
    zone: 'America/Chicago',
    protestMinutes: 120,
  },
  car: '12J',
  rules: STREET_EIGHT,
  rulesHash: '3e9a51c70b64d2f877a014ce9d35e60b3e9a51c70b64d2f877a014ce9d35e60b',
  report: reportOf(reportText(BIG_FEET)),
  reportRevision: 1,
  reportHash: 'ab'.repeat(32),
  draft: BREACH,
  decidedBy: { name: 'Ilse Törnkvist' },
  nameOf: (id) =>
    id === 'inspector'
      ? { name: 'Oona Brannick' }
      : id === 'second'
        ? { name: 'Dov Aranet' }
        : undefined,
  ...more,
});

export const noticeOf = (more: Partial<NoticeParts> = {}) => composeNotice(partsOf(more));
