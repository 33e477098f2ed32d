import type { CheckRequest } from '@/contracts/event/check';
import { type Failure, invalid } from '@/domain/failure';
import { lineChecksOf } from '@/domain/inspection/line-check/line-checks';
import type { Written } from '@/domain/quantity/dimension';
import { parseWritten } from '@/domain/quantity/parse';
import { toStored } from '@/domain/quantity/stored';
import { fail, ok, type Result } from '@/domain/result';
import { getQuantityEntry } from '@/domain/rulebook/quantity-catalogue';
import type { RulesInForce } from '@/domain/rulebook/rules-in-force';

const refuse = (pointer: string, detail: string) => fail(invalid([{ pointer, detail }]));

interface Read {
  readonly answer: string;
  readonly value: (Written & { readonly exact: bigint }) | undefined;
}

/** The answer or the value, as the clause asks for it. */
export const readAnswer = (
  rules: RulesInForce,
  input: Pick<CheckRequest, 'clause' | 'answer' | 'value' | 'gaugeId'>,
): Result<Read, Failure> => {
  const check = lineChecksOf(rules).find(({ clause }) => clause === input.clause);
  if (check === undefined)
    return refuse('/clause', `Clause ${input.clause} cannot be checked without teardown.`);
  if (check.ask.kind === 'answer') {
    const known = check.ask.answers.some(({ value }) => value === input.answer);
    return known
      ? ok({ answer: input.answer ?? '', value: undefined })
      : refuse('/answer', 'Tap one of the answers.');
  }
  const rule = rules.clauses.find(({ number }) => number === input.clause)?.requirement;
  if (rule?.kind !== 'limit' || input.value === undefined)
    return refuse('/value', 'Enter what the gauge shows.');
  const parsed = parseWritten(input.value, getQuantityEntry(rule.quantity).dimension);
  if (!parsed.ok) return refuse('/value', parsed.failure.detail);
  return ok({ answer: '', value: toStored(parsed.value) });
};
