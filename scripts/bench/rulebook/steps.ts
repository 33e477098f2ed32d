import { performance } from 'node:perf_hooks';
import { createElement } from 'react';
import { renderToString } from 'react-dom/server';
import { DraftEditor } from '@/components/rulebook/editor/DraftEditor';
import { findChoices } from '@/components/rulebook/editor/saving/join-drafts';
import { editionParts } from '@/components/rulebook/editor/saving/parts';
import { readRulebookContent } from '@/contracts/rulebook/read-rulebook';
import { sha256, utf8 } from '@/domain/ledger/bytes';
import { canonicalJson } from '@/domain/ledger/canonical';
import { findAmbiguities } from '@/domain/rulebook/ambiguity/find-ambiguities';
import type { Clause } from '@/domain/rulebook/clause';
import { differences } from '@/domain/rulebook/differences';
import { findRulesInForce, rulesDocument } from '@/domain/rulebook/rules-in-force';
import { clausesCsv, readClausesCsv } from '@/services/rulebook/file/clauses-csv';
import { CLAUSES, clauses, content, kib, say, spread } from './book';

const ROUNDS = 60;

const draft = { title: 'Bench', content };
const text = JSON.stringify(content);
const changed = clauses.map((clause, i) =>
  i % 10 === 0 ? { ...clause, words: `${clause.words} x` } : clause,
);
const edition = {
  id: 'bench',
  className: 'Bench',
  season: '2026',
  number: 1,
  ...content,
  inForceAt: '2026-01-01T00:00:00.000Z',
};
const bulletins = Array.from({ length: 20 }, (_, i) => ({
  id: `b${i}`,
  number: i + 1,
  season: '2026',
  edition: 1,
  title: 'Change',
  reason: 'Bench',
  changes: [{ kind: 'replace' as const, clause: changed[i * 10] as Clause }],
  effective: { kind: 'safety' as const },
  publishedAt: '2026-02-01T00:00:00.000Z',
}));
const question = {
  editions: [edition],
  bulletins,
  clarifications: [],
  waivers: [],
  eventStartsAt: [],
  at: '2026-03-01T00:00:00.000Z',
};
const csv = clausesCsv(clauses);

const measure = (name: string, step: () => unknown): void => {
  for (let i = 0; i < 5; i += 1) step();
  const times = Array.from({ length: ROUNDS }, () => {
    const from = performance.now();
    step();
    return performance.now() - from;
  });
  say(name, spread(times));
};

/** What an official's and a reader's requests are made of, step by step, without a browser. */
export const benchSteps = (): void => {
  console.info(`${CLAUSES} clauses, ${kib(text.length)} as JSON, ${ROUNDS} rounds each\n`);
  measure('find every ambiguity (after each change)', () =>
    findAmbiguities(clauses, content.penalties),
  );
  measure('read a draft by its contract (each autosave)', () =>
    readRulebookContent(JSON.parse(text)),
  );
  measure('rules in force with 20 bulletins', () => findRulesInForce(question));
  measure('rules in force, canonical and hashed', () => {
    const rules = findRulesInForce(question);
    return rules && sha256(utf8(canonicalJson(rulesDocument(rules))));
  });
  measure('differences, every tenth clause changed', () => differences(clauses, changed));
  measure('choices between two drafts', () => {
    const parts = editionParts(draft);
    const theirs = editionParts({ title: 'Bench', content: { ...content, clauses: changed } });
    return findChoices(parts, parts, theirs);
  });
  measure('clauses out as CSV', () => clausesCsv(clauses));
  measure('clauses in from CSV', () => readClausesCsv(csv));
  measure('the editor rendered to HTML', () =>
    renderToString(
      createElement(DraftEditor, {
        draft: { ...draft, id: 'bench', version: 1, updatedAt: '2026-03-01T00:00:00.000Z' },
        publishHref: '/',
      }),
    ),
  );
};
