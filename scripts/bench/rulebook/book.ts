import type { Clause } from '@/domain/rulebook/clause';
import { TAPPET_RULE_SET } from '@/domain/rulebook/rule-sets/tappet';

export const CLAUSES = 300;

/** Twenty chapters of fifteen clauses; the tappet set's clauses in turn, each under its own number. */
export const clauses: readonly Clause[] = Array.from({ length: CLAUSES }, (_, i) => {
  const source = TAPPET_RULE_SET.clauses[i % TAPPET_RULE_SET.clauses.length] as Clause;
  const chapter = Math.floor(i / 15) + 1;
  const number = i % 15 === 0 ? String(chapter) : `${chapter}.${i % 15}`;
  return { ...source, number, refs: undefined };
});

export const content = { clauses, penalties: TAPPET_RULE_SET.penalties };

export const kib = (bytes: number): string => `${(bytes / 1024).toFixed(0)} KiB`;

/** Median, ninety-fifth percentile and largest, in milliseconds. */
export const spread = (times: readonly number[]): string => {
  const sorted = [...times].sort((a, b) => a - b);
  const at = (share: number) => (sorted[Math.floor(share * (sorted.length - 1))] ?? 0).toFixed(1);
  return `median ${at(0.5).padStart(7)} ms   p95 ${at(0.95).padStart(7)} ms   max ${at(1).padStart(7)} ms`;
};

export const say = (name: string, figures: string): void =>
  console.info(`${name.padEnd(52)} ${figures}`);
