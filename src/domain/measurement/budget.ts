import { contribution, type UncertaintyComponent } from './uncertainty';

export interface BudgetLine extends UncertaintyComponent {
  /** |c|·u, in the unit of the result. */
  readonly contribution: number;
  /** Part of the variance, 0 to 1; the lines add up to 1. */
  readonly share: number;
  /** "The dial's division is half of it." */
  readonly sentence: string;
}

const PARTS: readonly (readonly [number, string])[] = [
  [0.95, 'is nearly all of it'],
  [0.82, 'is most of it'],
  [0.71, 'is three quarters of it'],
  [0.58, 'is two thirds of it'],
  [0.42, 'is half of it'],
  [0.29, 'is a third of it'],
  [0.22, 'is a quarter of it'],
  [0.14, 'is a sixth of it'],
  [0.07, 'is a tenth of it'],
  [0.01, 'is little of it'],
  [0, 'is next to nothing'],
];

/** The budget line by line, the largest first; equal ones keep the order they came in. */
export const budgetLines = (components: readonly UncertaintyComponent[]): readonly BudgetLine[] => {
  const variance = components.reduce((sum, component) => sum + contribution(component) ** 2, 0);
  return components
    .map((component) => {
      const size = contribution(component);
      const share = variance === 0 ? 0 : size ** 2 / variance;
      return {
        name: component.name,
        standardUncertainty: component.standardUncertainty,
        sensitivity: component.sensitivity,
        degreesOfFreedom: component.degreesOfFreedom,
        words: component.words,
        contribution: size,
        share,
        sentence: sentence(component.words, share),
      };
    })
    .sort((a, b) => b.share - a.share);
};

const sentence = (words: string, share: number): string => {
  const [, part = 'is next to nothing'] = PARTS.find(([from]) => share >= from) ?? [];
  return `${words.charAt(0).toUpperCase()}${words.slice(1)} ${part}.`;
};
