/** What a visitor typed, by the name of the field; what is absent was left empty. */
export type Typed = Readonly<Record<string, string>>;

export interface Option {
  readonly value: string;
  readonly label: string;
}

/** One field of a calculator; its name is also its name in the link. */
export interface Field {
  readonly name: string;
  readonly label: string;
  readonly hint?: string;
  /** number: digits with or without a unit; lines: a table, a row a line; choice: one of the options. */
  readonly kind: 'number' | 'text' | 'lines' | 'choice';
  readonly options?: readonly Option[];
  /** Taken when the link does not say. */
  readonly initial?: string;
  readonly optional?: boolean;
  /** JSON Pointer of the place in the request that the field fills. */
  readonly pointer: string;
  readonly rows?: number;
}

export interface FieldGroup {
  readonly legend: string;
  readonly hint?: string;
  readonly fields: readonly Field[];
}

export const fieldsOf = (groups: readonly FieldGroup[]): readonly Field[] =>
  groups.flatMap((group) => group.fields);

const options = (...values: readonly string[]): readonly Option[] =>
  values.map((value) => ({ value, label: value }));

export const lengthUnit = (name: string, pointer: string, label = 'Unit of length'): Field => ({
  name,
  label,
  kind: 'choice',
  options: options('in', 'mm'),
  initial: 'in',
  pointer,
});

export const volumeUnit = (name: string, pointer: string): Field => ({
  name,
  label: 'Unit of volume',
  kind: 'choice',
  options: options('cc', 'in³'),
  initial: 'cc',
  pointer,
});

export const MATERIAL_HINT =
  'iron, ductile, steel, aluminium or bronze; or a coefficient per kelvin such as 11.4e-6';
