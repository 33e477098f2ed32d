export const DIMENSIONS = [
  'length',
  'area',
  'volume',
  'mass',
  'force',
  'angle',
  'pressure',
  'temperature',
  'temperature-difference',
  'stiffness',
  'ratio',
  'count',
] as const;

export type Dimension = (typeof DIMENSIONS)[number];

/**
 * A value as the person wrote it: the digits as typed (trailing zeros carry the gauge's
 * resolution) and the symbol of its unit. This is also the form on the wire.
 */
export interface Written {
  readonly text: string;
  readonly unit: string;
}

const WORDS: Readonly<Record<Dimension, string>> = {
  length: 'a length',
  area: 'an area',
  volume: 'a volume',
  mass: 'a weight',
  force: 'a force',
  angle: 'an angle',
  pressure: 'a pressure',
  temperature: 'a temperature',
  'temperature-difference': 'a difference of temperatures',
  stiffness: 'a spring rate',
  ratio: 'a ratio',
  count: 'a count',
};

/** The dimension in plain words with its article: "a length". */
export const dimensionWords = (dimension: Dimension): string => WORDS[dimension];
