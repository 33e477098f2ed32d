import type { Derived } from '@/domain/engine/derived';
import { expand } from '@/domain/measurement/uncertainty';
import { widthIn } from '@/domain/quantity/convert';

interface Answer {
  readonly value: string;
  readonly unit: string;
  readonly working: string[];
  readonly datum: string;
  readonly expandedUncertainty?: number;
  readonly coverageFactor?: number;
}

/** A derived quantity as the bench answers it, U at two-sided 95 % where an uncertainty is known. */
export function answerOf({ value, standardUncertainty, working, datum }: Derived): Answer {
  const answer = { value: value.text, unit: value.unit, working: [...working], datum };
  if (standardUncertainty === undefined) return answer;
  const expanded = expand({ standardUncertainty, degreesOfFreedom: null });
  return {
    ...answer,
    expandedUncertainty: widthIn(value.dimension, expanded.expandedUncertainty, value.unit),
    coverageFactor: expanded.coverageFactor,
  };
}

/** Several figures at once: their texts, their U where an uncertainty is known, and all the working. */
export function answersOf<Name extends string>(figures: { readonly [N in Name]: Derived }) {
  const entries = Object.entries<Derived>(figures);
  const answers = entries.map(([name, derived]) => [name, answerOf(derived)] as const);
  const expanded = answers.flatMap(([name, { expandedUncertainty: u }]) =>
    u === undefined ? [] : [[name, u] as const],
  );
  return {
    ...(Object.fromEntries(answers.map(([name, { value }]) => [name, value])) as {
      readonly [N in Name]: string;
    }),
    ...(expanded.length > 0 && { expandedUncertainties: Object.fromEntries(expanded) }),
    working: answers.flatMap(([, { working }]) => working),
  };
}
