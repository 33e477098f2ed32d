/** A size as a person wrote it: the text with its trailing zeros, and a unit symbol. */
export interface Written {
  readonly text: string;
  readonly unit: string;
}
