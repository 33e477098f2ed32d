import type { PaperworkDraft } from '../paperwork/draft';

/** What is known of an engine beside its name and position map. */
export interface EngineFacts {
  readonly blockCasting: string;
  readonly headCastings: string;
  readonly serial: string;
}

/** Which of them a rulebook means by the subject of a question. */
const NAMED: readonly (readonly [RegExp, keyof EngineFacts])[] = [
  [/block.*casting/, 'blockCasting'],
  [/head.*casting/, 'headCastings'],
  [/serial/, 'serial'],
];

export const factNamed = (subject: string): keyof EngineFacts | undefined =>
  NAMED.find(([pattern]) => pattern.test(subject))?.[1];

export const sameFacts = (a: EngineFacts, b: EngineFacts): boolean =>
  NAMED.every(([, fact]) => a[fact] === b[fact]);

/** The draft with corrected facts where it says what stood there before; itself where nothing does. */
export const withCorrectedFacts = (
  draft: PaperworkDraft,
  before: EngineFacts,
  now: EngineFacts,
): PaperworkDraft => {
  const answers = draft.answers.map((answer) => {
    const fact = factNamed(answer.subject);
    return fact === undefined || before[fact] === now[fact] || answer.typed !== before[fact]
      ? answer
      : { ...answer, typed: now[fact] };
  });
  return answers.every((answer, at) => answer === draft.answers[at])
    ? draft
    : { ...draft, answers };
};
