import { DEFAULT_RULE } from '@/domain/decision/decision-rule';
import { getQuantityEntry, type QuantityName } from '@/domain/rulebook/quantity-catalogue';
import type { Requirement, RequirementKind } from '@/domain/rulebook/requirement';

export const KIND_WORDS: Readonly<Record<RequirementKind, string>> = {
  limit: 'A limit on a measured or derived quantity',
  choice: 'A listed choice',
  'yes-no': 'Yes or no',
  'matches-paperwork': 'Must match the paperwork',
  'plug-gauge': 'Go or no-go gauge',
  'reference-average': 'Compared with the average of reference parts',
  photograph: 'A required photograph',
  sheet: 'A required sheet',
  seal: 'Seals',
};

export const isKind = (text: string): text is RequirementKind => Object.hasOwn(KIND_WORDS, text);

const FIRST: QuantityName = 'lifter-body-diameter';

const measurandOf = (quantity: QuantityName) => {
  const { unit, per } = getQuantityEntry(quantity);
  return { quantity, unit, per };
};

const held = { decisionRule: DEFAULT_RULE, comparison: { method: 'absolute' } } as const;

/** A requirement of a kind with nothing decided yet. */
export const newRequirement = (kind: RequirementKind): Requirement => {
  switch (kind) {
    case 'limit':
      return { kind, ...measurandOf(FIRST), ...held, sample: { kind: 'all' } };
    case 'reference-average': {
      const measurand = measurandOf(FIRST);
      const none = { text: '', unit: measurand.unit };
      return { kind, ...measurand, ...held, n: 3, plus: none, minus: none };
    }
    case 'choice':
      return { kind, subject: '', question: '', options: [], allowed: [], per: 'engine' };
    case 'yes-no':
      return { kind, subject: '', question: '', required: 'yes', per: 'engine' };
    case 'matches-paperwork':
      return { kind, subject: '', question: '', per: 'engine' };
    case 'plug-gauge':
      return {
        kind,
        subject: '',
        size: { text: '', unit: 'in' },
        gauge: 'no-go',
        where: '',
        per: 'engine',
      };
    case 'photograph':
      return { kind, subject: '', visible: [] };
    case 'sheet':
      return { kind, subject: '', sheet: 'lifters', title: '' };
    case 'seal':
      return { kind, subject: '', place: '', count: 1 };
  }
};
