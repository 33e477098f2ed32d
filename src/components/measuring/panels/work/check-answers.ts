import type { CheckAsk } from '@/domain/inspection/plan/check-asks';
import type { Clause } from '@/domain/rulebook/clause';
import type { Bay } from '../../bay';

type Check = NonNullable<Clause['requirement']>;
interface Answer {
  readonly value: string;
  readonly label: string;
}

export const answersOf = (check: Check, declared: string | undefined): readonly Answer[] => {
  switch (check.kind) {
    case 'choice':
      return check.options;
    case 'yes-no':
      return [
        { value: 'yes', label: 'Yes' },
        { value: 'no', label: 'No' },
      ];
    case 'plug-gauge':
      return [
        { value: 'goes', label: 'Goes' },
        { value: 'does-not-go', label: 'Does not go' },
      ];
    default:
      return declared === undefined ? [] : [{ value: declared, label: `As declared: ${declared}` }];
  }
};

export const questionOf = (check: Check): string => {
  if (check.kind === 'plug-gauge')
    return `${check.gauge === 'go' ? 'Go' : 'No-go'} gauge ${check.size.text} ${check.size.unit}, ${check.where}. Offer it by hand, never force it.`;
  return 'question' in check ? check.question : '';
};

export const checkKey = ({ clause, position }: CheckAsk): string => `${clause.number} ${position}`;

/** The check that comes first here: of this bore, then of the engine, then of the next bore. */
export const nextCheck = (
  { checks, position }: Bay,
  bore: string,
  given: ReadonlySet<string>,
): CheckAsk | undefined => {
  const open = checks.filter((one) => one.answer === undefined && !given.has(checkKey(one)));
  return (
    open.find((one) => one.position === bore) ??
    open.find((one) => one.position === 'engine' || one.position === 'car') ??
    open.find((one) => one.position === String(position.cylinder)) ??
    open[0]
  );
};

export const whereWords = ({ position }: CheckAsk): string => {
  if (position === 'engine' || position === 'car') return 'whole engine';
  return /^\d+$/.test(position) ? `cylinder ${position}` : position;
};
