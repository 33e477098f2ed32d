import { readFileSync } from 'node:fs';

interface CheckValue {
  readonly id: string;
  readonly inputs: Record<string, never>;
  readonly expected: Record<string, never>;
}

const all = JSON.parse(
  readFileSync(new URL('../../check-values.json', import.meta.url), 'utf8'),
) as readonly CheckValue[];

/** One published value with its source beside it in check-values.json. */
export const checkValue = <Inputs, Expected>(
  id: string,
): { inputs: Inputs; expected: Expected } => {
  const found = all.find((value) => value.id === id);
  if (found === undefined) throw new Error(`No check value ${id}`);
  return { inputs: found.inputs as Inputs, expected: found.expected as Expected };
};

export const hex = (bytes: Uint8Array): string => Buffer.from(bytes).toString('hex');
export const unhex = (text: string): Uint8Array => Uint8Array.from(Buffer.from(text, 'hex'));
