import type { BudgetWords } from '@/domain/rulebook/clause-result';

interface WithBudget {
  readonly position: string;
  readonly budget?: readonly BudgetWords[] | undefined;
}

interface Same {
  readonly positions: string[];
  readonly budget: readonly BudgetWords[];
}

/** Positions whose budgets read the same stand together. */
const together = (results: readonly WithBudget[]): readonly Same[] => {
  const groups = new Map<string, Same>();
  for (const { position, budget = [] } of results) {
    if (budget.length === 0) continue;
    const key = JSON.stringify(budget);
    const known = groups.get(key) ?? { positions: [], budget };
    known.positions.push(position);
    groups.set(key, known);
  }
  return [...groups.values()];
};

/** What each U is made of, one tap away, the largest first; nothing where no budget is kept. */
export const Budgets = ({ results }: { readonly results: readonly WithBudget[] }) => {
  const groups = together(results);
  if (groups.length === 0) return null;
  return (
    <details>
      <summary>What the uncertainty is made of</summary>
      {groups.map(({ positions, budget }) => (
        <div key={positions.join()} className="mt-2">
          {results.length > 1 && <p className="font-semibold">{positions.join(', ')}</p>}
          <ul>
            {budget.map(({ words, share }) => (
              <li key={words}>
                {words} <span className="note">{share} %</span>
              </li>
            ))}
          </ul>
        </div>
      ))}
      <p className="note">Percent of the variance, the square of U.</p>
    </details>
  );
};
