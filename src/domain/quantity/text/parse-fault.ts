import { fail } from '../../result';
import { type Dimension, dimensionWords } from '../dimension';
import { unitSymbols } from '../find-unit';

export type ParseFaultName =
  | 'empty'
  | 'not-a-number'
  | 'ambiguous'
  | 'unit-missing'
  | 'unit-unknown'
  | 'wrong-dimension'
  | 'impossible';

/** What is wrong with a text and how to write it instead, in plain words. */
export interface ParseFault {
  readonly name: ParseFaultName;
  readonly detail: string;
}

export const unknownUnit = (name: string, dimension: Dimension): string =>
  `"${name}" is no unit of ${dimensionWords(dimension)} known here. Write one of ${unitSymbols(dimension).join(', ')}.`;

const NUMBER_WORDS = {
  ambiguous: (text: string) =>
    `${text} could be ${text.replace(',', '.')} or ${text.replace(',', '')}. Write it with a decimal point, or without the comma.`,
  'two-numbers': (text: string) => `"${text}" looks like two numbers. Write one value here.`,
  fraction: (text: string) => `"${text}" is a fraction. Write it as a decimal.`,
  'not-a-number': (text: string) => `"${text}" is not a number.`,
} as const;

export const refuseNumber = (fault: keyof typeof NUMBER_WORDS, text: string) =>
  refuse(fault === 'ambiguous' ? 'ambiguous' : 'not-a-number', NUMBER_WORDS[fault](text));

export const refuse = (name: ParseFaultName, detail: string): { ok: false; failure: ParseFault } =>
  fail({ name, detail });
