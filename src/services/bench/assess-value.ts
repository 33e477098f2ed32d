import type { AssessRequest, AssessResponse } from '@/contracts/bench/assess';
import { assess } from '@/domain/decision/assess';
import {
  DEFAULT_PROBABILITY,
  type DecisionRule,
  decisionRuleFault,
} from '@/domain/decision/decision-rule';
import type { Comparison, LimitRequirement, Limits } from '@/domain/decision/requirement';
import { type Failure, invalid } from '@/domain/failure';
import { widthIn } from '@/domain/quantity/convert';
import type { Dimension } from '@/domain/quantity/dimension';
import { dimensionsOf, unitSymbols } from '@/domain/quantity/find-unit';
import { compareQuantities } from '@/domain/quantity/quantity';
import { fail, ok, type Result } from '@/domain/result';
import { Taker } from './take';

/**
 * One measured value against one requirement, by its decision rule. Computed, never a verdict. A unit
 * that is not known here (V, HRC) is taken as it stands where value and limit both name it.
 */
export function assessValue(request: AssessRequest): Result<AssessResponse, Failure> {
  const { unit, requirement } = request;
  if (unit !== requirement.unit || dimensionsOf(unit).length > 0) return assessKnown(request);
  const plain = { ...request, unit: '1', requirement: { ...requirement, unit: '1' } };
  const result = assessKnown(plain);
  if (!result.ok) return result;
  const sentence = result.value.sentence.replaceAll(/(?<=\d) 1(?!\d)/g, ` ${unit}`);
  return ok({ ...result.value, sentence });
}

function assessKnown(request: AssessRequest): Result<AssessResponse, Failure> {
  const take = new Taker();
  const dimension = dimensionOf(request, take);
  const requirement = requirementOf(request, dimension, take);
  const unit = take.unit('/unit', request.unit, dimension);
  const value = take.quantity('/value', request.value, dimension, unit);
  const standardUncertainty =
    take.width('/standardUncertainty', request.standardUncertainty, dimension, unit) ?? 0;
  if (take.faults.length > 0) return fail(invalid(take.faults));
  const { expandedUncertainty, acceptance, ...assessment } = assess(requirement, {
    value,
    standardUncertainty,
    degreesOfFreedom: request.degreesOfFreedom,
    level: request.level,
  });
  return ok({
    ...assessment,
    expandedUncertainty: widthIn(dimension, expandedUncertainty, unit),
    acceptance: acceptance && {
      ...(acceptance.min && { min: acceptance.min.text }),
      ...(acceptance.max && { max: acceptance.max.text }),
    },
  });
}

/** What both units measure: "lb" alone could be a weight or a force. */
function dimensionOf({ requirement, unit }: AssessRequest, take: Taker): Dimension {
  const limits = dimensionsOf(requirement.unit);
  const [first] = limits;
  if (first === undefined) {
    take.refuse('/requirement/unit', `"${requirement.unit}" is no unit known here.`);
    return dimensionsOf(unit)[0] ?? 'length';
  }
  return limits.find((dimension) => dimensionsOf(unit).includes(dimension)) ?? first;
}

function requirementOf(
  { requirement }: AssessRequest,
  dimension: Dimension,
  take: Taker,
): LimitRequirement {
  const at = '/requirement';
  const unit = dimensionsOf(requirement.unit).includes(dimension)
    ? requirement.unit
    : (unitSymbols(dimension)[0] ?? '');
  const limit = (end: 'min' | 'max') => {
    const written = requirement[end];
    return written === undefined
      ? undefined
      : take.quantity(`${at}/${end}`, written, dimension, unit);
  };
  const limits: Limits = { min: limit('min'), max: limit('max') };
  if (limits.min === undefined && limits.max === undefined)
    take.refuse(at, 'Write a min, a max, or both.');
  if (limits.min && limits.max && compareQuantities(limits.min, limits.max) > 0)
    take.refuse(`${at}/max`, 'The max is smaller than the min.');
  const { maximumUncertainty, fitRatio } = requirement;
  if (fitRatio !== undefined && take.number(`${at}/fitRatio`, fitRatio) <= 0)
    take.refuse(`${at}/fitRatio`, 'The ratio is larger than zero.');
  return {
    limits,
    decisionRule: ruleOf(requirement.decisionRule, take),
    comparison: comparisonOf(requirement, take),
    fitRatio: fitRatio === undefined ? undefined : String(fitRatio),
    maximumUncertainty:
      maximumUncertainty === undefined
        ? undefined
        : take.size(`${at}/maximumUncertainty`, maximumUncertainty, dimension, unit),
  };
}

function comparisonOf(
  { comparison, decimals }: AssessRequest['requirement'],
  take: Taker,
): Comparison {
  if (comparison !== 'rounded') return { method: 'absolute' };
  if (decimals === undefined)
    take.refuse('/requirement/decimals', 'Say to how many decimals values are rounded.');
  return { method: 'rounded', decimals: decimals ?? 0 };
}

function ruleOf(
  { kind, guardFactor, probability }: AssessRequest['requirement']['decisionRule'],
  take: Taker,
): DecisionRule {
  const guard = {
    ...(guardFactor !== undefined && { guardFactor: String(guardFactor) }),
    ...(probability !== undefined && { probability }),
  };
  const rule: DecisionRule =
    kind === 'conformance-probability'
      ? { kind, probability: probability ?? DEFAULT_PROBABILITY }
      : { kind, ...guard };
  const fault = decisionRuleFault(rule);
  if (fault !== undefined) take.refuse('/requirement/decisionRule', fault);
  return rule;
}
