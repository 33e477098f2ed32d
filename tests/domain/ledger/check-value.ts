import { checkValue as found } from '../../support/check-value';

/** One published value, read as the shape the caller knows it to have. */
export const checkValue = <Inputs, Expected>(id: string) => {
  const { inputs, expected } = found(id);
  return { inputs: inputs as Inputs, expected: expected as Expected };
};

export const hex = (bytes: Uint8Array): string => Buffer.from(bytes).toString('hex');
export const unhex = (text: string): Uint8Array => Uint8Array.from(Buffer.from(text, 'hex'));
