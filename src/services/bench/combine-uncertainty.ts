import type { UncertaintyRequest, UncertaintyResponse } from '@/contracts/bench/uncertainty';
import { type Failure, invalid } from '@/domain/failure';
import { budgetLines } from '@/domain/measurement/budget';
import { combine, expand } from '@/domain/measurement/uncertainty';
import { fail, ok, type Result } from '@/domain/result';
import { Taker } from './take';

/** A budget added up as JCGM 100 does: in quadrature, with effective degrees of freedom and k. */
export function combineUncertainty(
  request: UncertaintyRequest,
): Result<UncertaintyResponse, Failure> {
  const take = new Taker();
  const components = request.components.map((component, i) => {
    const at = `/components/${i}`;
    const standardUncertainty = take.number(
      `${at}/standardUncertainty`,
      component.standardUncertainty,
    );
    if (standardUncertainty < 0)
      take.refuse(`${at}/standardUncertainty`, 'An uncertainty is zero or more.');
    return {
      name: component.name,
      words: component.name,
      standardUncertainty,
      sensitivity: take.number(`${at}/sensitivity`, component.sensitivity ?? 1),
      degreesOfFreedom: component.degreesOfFreedom ?? null,
    };
  });
  if (take.faults.length > 0) return fail(invalid(take.faults));
  const combined = combine(components);
  const { coverageFactor, expandedUncertainty, distribution } = expand(combined, request.level);
  return ok({
    unit: request.unit,
    combined: combined.standardUncertainty,
    effectiveDegreesOfFreedom: combined.degreesOfFreedom,
    coverageFactor,
    expanded: expandedUncertainty,
    distribution,
    shares: budgetLines(components).map(({ name, share, sentence }) => ({ name, share, sentence })),
  });
}
