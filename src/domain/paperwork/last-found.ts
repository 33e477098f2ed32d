import {
  type DeclaredAgainstFound,
  declaredAgainstFound,
} from '../inspection/declared-against-found';
import type { Written } from '../quantity/dimension';
import { toNumber } from '../quantity/rational';
import { fromStored } from '../quantity/stored';
import type { Clause } from '../rulebook/clause';
import type { Facts, NumberFact } from '../rulebook/evaluate/facts';
import type { Figure } from '../rulebook/limit';
import { getQuantityEntry, type QuantityName } from '../rulebook/quantity-catalogue';
import type { ReportFinding } from '../verdict/report-view';

/** One number that an inspection found on this engine. */
export interface FoundBefore {
  readonly quantity: QuantityName;
  readonly figure?: Figure | undefined;
  readonly position: string;
  readonly value: Written;
  /** Expanded uncertainty and its coverage factor; absent where none was stated. */
  readonly uncertainty?: Written | undefined;
  readonly coverageFactor?: string | undefined;
}

/** The last teardown of this engine whose verdict was published. */
export interface LastFound {
  /** Of the notice. */
  readonly number: string;
  readonly event: string;
  /** ISO 8601 instant in UTC. */
  readonly signedAt: string;
  readonly found: readonly FoundBefore[];
}

/** The numbers that a signed report states, by the limits that they were held against. */
export const foundBefore = (
  findings: readonly ReportFinding[],
  clauses: readonly Clause[],
): readonly FoundBefore[] => {
  const found = new Map<string, FoundBefore>();
  for (const { clause: number, perPosition } of findings) {
    const rule = clauses.find((clause) => clause.number === number)?.requirement;
    if (rule?.kind !== 'limit') continue;
    const { quantity, figure } = rule;
    for (const { position, value, uncertainty, coverageFactor } of perPosition) {
      if (value === undefined) continue;
      const one = { quantity, figure, position, value, uncertainty, coverageFactor };
      found.set([quantity, figure ?? '', position].join('|'), one);
    }
  }
  return [...found.values()];
};

const factOf = ({ quantity, figure, position, ...one }: FoundBefore): NumberFact => {
  const { dimension } = getQuantityEntry(quantity);
  const { uncertainty, coverageFactor = '2' } = one;
  return {
    quantity,
    figure,
    position,
    value: fromStored(one.value, dimension),
    standardUncertainty:
      uncertainty === undefined
        ? 0
        : toNumber(fromStored(uncertainty, dimension).value) / Number(coverageFactor),
  };
};

/**
 * What is declared now beside what was found last, where both are known. A difference is no fault:
 * engines are rebuilt; it is worth a second look before somebody else takes it.
 */
export const againstLastFound = (
  declared: Facts,
  { found }: Pick<LastFound, 'found'>,
): readonly DeclaredAgainstFound[] =>
  declaredAgainstFound({
    ...declared,
    origin: 'found',
    numbers: found.map(factOf),
    answers: [],
    evidence: [],
    declared,
  });
