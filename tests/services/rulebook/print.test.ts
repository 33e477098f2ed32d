import { expect, it } from 'vitest';
import { rulebookPrinter } from '@/adapters/pdf/rulebook-printer';
import { TAPPET_RULE_SET } from '@/domain/rulebook/rule-sets/tappet';
import { findRulesInForce } from '@/domain/rulebook/rules-in-force';
import { readPdf } from '../../support/pdf-text';

const at = '2026-07-11T20:00:00.000Z';
const rules = findRulesInForce({
  editions: [
    {
      id: 'e1',
      className: 'Street Eight',
      season: '2026',
      number: 1,
      clauses: TAPPET_RULE_SET.clauses,
      penalties: TAPPET_RULE_SET.penalties,
      inForceAt: at,
    },
  ],
  bulletins: [],
  clarifications: [
    {
      id: 'c1',
      number: 1,
      season: '2026',
      clause: '4.4',
      question: 'Is a sleeve a bush?',
      answer: 'Yes.',
      publishedAt: at,
    },
  ],
  waivers: [],
  eventStartsAt: [],
  at,
});

it('prints every clause with its limit, the hash and page of pages, the same bytes every time', async () => {
  if (rules === undefined) throw new Error('no rules');
  const input = {
    rules,
    hash: '0123456789abcdef'.repeat(4),
    series: 'Corran Valley Saturday Series',
    zone: 'America/Chicago',
    since: at,
    url: 'http://127.0.0.1:1/series/corran-valley/rulebooks/street-eight',
  };
  const bytes = await rulebookPrinter.print(input);
  const { text, pages } = readPdf(bytes);
  const words = text.replace(/\s+/g, ' ');
  for (const clause of rules.clauses) expect(words).toContain(clause.heading);
  for (const part of [
    'at most 0.4800 in',
    'Is a sleeve a bush? Yes.',
    input.hash.slice(0, 32),
    `1 of ${pages}`,
    `${pages} of ${pages}`,
    'In force since Saturday 11 July 2026, 15:00 local time (UTC−5)',
  ]) {
    expect(words).toContain(part);
  }
  expect(Buffer.from(await rulebookPrinter.print(input)).equals(Buffer.from(bytes))).toBe(true);
});
