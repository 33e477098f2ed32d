import type { Question } from '@/domain/rulebook/form/form';

/** An answer in words: the option's label, the number with its unit. */
export const answerWords = (question: Question, typed: string, unit?: string): string => {
  if (question.kind === 'choice')
    return question.options.find((option) => option.value === typed)?.label ?? typed;
  if (question.kind !== 'number') return typed;
  const own = unit ?? question.unit;
  return own === '1' || /[^\d.,\s+−-]/.test(typed) ? typed : `${typed} ${own}`;
};
