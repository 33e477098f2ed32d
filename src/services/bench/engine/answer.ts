import type { Derived } from '@/domain/engine/derived';
import { expand } from '@/domain/measurement/uncertainty';
import { widthIn } from '@/domain/quantity/convert';

/** A derived quantity as the bench answers it, U at two-sided 95 % where an uncertainty is known. */
export function answerOf({ value, standardUncertainty, working, datum }: Derived) {
  const answer = { value: value.text, unit: value.unit, working: [...working], datum };
  if (standardUncertainty === undefined) return answer;
  const expanded = expand({ standardUncertainty, degreesOfFreedom: null });
  return {
    ...answer,
    expandedUncertainty: widthIn(value.dimension, expanded.expandedUncertainty, value.unit),
    coverageFactor: expanded.coverageFactor,
  };
}
