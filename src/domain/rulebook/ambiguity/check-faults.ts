import type { Fault } from '../../failure';
import type {
  ChoiceRequirement,
  PhotographRequirement,
  PlugGaugeRequirement,
  Requirement,
  SealRequirement,
} from '../requirement';
import { isBlank, isNegative, isZero, read, when } from './check';
import { limitFaults, referenceFaults } from './number-faults';

const SUBJECT = /^[a-z][a-z0-9]*(-[a-z0-9]+)*$/;

const subjectFaults = (subject: string, pointer: string): readonly Fault[] =>
  when(
    !SUBJECT.test(subject),
    `${pointer}/subject`,
    'The subject is a short key of small letters, digits and hyphens, such as tappet-type.',
  );

const questionFaults = (question: string, pointer: string): readonly Fault[] =>
  when(isBlank(question), `${pointer}/question`, 'Write the question as it stands on the form.');

const choiceFaults = (choice: ChoiceRequirement, pointer: string): readonly Fault[] => {
  const values = choice.options.map((option) => option.value);
  const strangers = choice.allowed.filter((value) => !values.includes(value));
  return [
    ...when(values.length < 2, `${pointer}/options`, 'A choice needs two options or more.'),
    ...when(
      new Set(values).size < values.length,
      `${pointer}/options`,
      'Two options have the same key.',
    ),
    ...when(choice.allowed.length === 0, `${pointer}/allowed`, 'No option is allowed.'),
    ...when(
      strangers.length > 0,
      `${pointer}/allowed`,
      `Allowed, but not among the options: ${strangers.join(', ')}.`,
    ),
    ...when(
      values.length > 1 && values.every((value) => choice.allowed.includes(value)),
      `${pointer}/allowed`,
      'Every option is allowed: there is nothing to check.',
    ),
  ];
};

const plugFaults = (plug: PlugGaugeRequirement, pointer: string): readonly Fault[] => {
  const size = read(plug.size, 'length', `${pointer}/size`, 'The size of a plug gauge');
  return [
    ...size.faults,
    ...when(
      isNegative(size.value) || isZero(size.value),
      `${pointer}/size`,
      'A size is above zero.',
    ),
    ...when(isBlank(plug.where), `${pointer}/where`, 'Say where the gauge is offered.'),
  ];
};

const photographFaults = (photograph: PhotographRequirement, pointer: string): readonly Fault[] =>
  when(
    photograph.visible.length === 0 || photograph.visible.some(isBlank),
    `${pointer}/visible`,
    'Say what must be visible in the photograph.',
  );

const sealFaults = (seal: SealRequirement, pointer: string): readonly Fault[] => [
  ...when(isBlank(seal.place), `${pointer}/place`, 'Say where the seal sits.'),
  ...when(
    !Number.isInteger(seal.count) || seal.count < 1,
    `${pointer}/count`,
    'Count the seals: a whole number of one or more.',
  ),
];

/** The faults of one requirement taken by itself. */
export const requirementFaults = (requirement: Requirement, pointer: string): readonly Fault[] => {
  switch (requirement.kind) {
    case 'limit':
      return limitFaults(requirement, pointer);
    case 'reference-average':
      return referenceFaults(requirement, pointer);
    case 'choice':
      return [
        ...subjectFaults(requirement.subject, pointer),
        ...questionFaults(requirement.question, pointer),
        ...choiceFaults(requirement, pointer),
      ];
    case 'yes-no':
    case 'matches-paperwork':
      return [
        ...subjectFaults(requirement.subject, pointer),
        ...questionFaults(requirement.question, pointer),
      ];
    case 'plug-gauge':
      return [...subjectFaults(requirement.subject, pointer), ...plugFaults(requirement, pointer)];
    case 'photograph':
      return [
        ...subjectFaults(requirement.subject, pointer),
        ...photographFaults(requirement, pointer),
      ];
    case 'sheet':
      return [
        ...subjectFaults(requirement.subject, pointer),
        ...when(isBlank(requirement.title), `${pointer}/title`, 'Name the sheet.'),
      ];
    case 'seal':
      return [...subjectFaults(requirement.subject, pointer), ...sealFaults(requirement, pointer)];
  }
};
