import type { Failure } from '@/domain/failure';
import { readNumber } from '@/domain/quantity/number-text';
import { type Field, type FieldGroup, fieldsOf, type Typed } from './fields';

/** Only what the calculator knows, trimmed, and nothing that was left empty. */
export function typedFrom(query: URLSearchParams, groups: readonly FieldGroup[]): Typed {
  const typed: Record<string, string> = {};
  for (const { name } of fieldsOf(groups)) {
    const text = query.get(name)?.trim();
    if (text !== undefined && text !== '') typed[name] = text.slice(0, 4000);
  }
  return typed;
}

/** The text of a field, or what it starts with. */
export const textOf = (field: Field, typed: Typed): string =>
  typed[field.name] ?? field.initial ?? '';

/** The value of a choice, or what it starts with. */
export function chosen(groups: readonly FieldGroup[], typed: Typed, name: string): string {
  const field = fieldsOf(groups).find((candidate) => candidate.name === name);
  return field === undefined ? '' : textOf(field, typed);
}

/** A JSON number where the text is one, else the text, which is then refused at its field. */
export function numberOr(text: string | undefined): unknown {
  const { plain } = readNumber(text ?? '');
  return plain === undefined ? text : Number(plain);
}

/** The faults of a failure at the fields that caused them; what belongs to no field stands under ''. */
export function faultsByField(
  groups: readonly FieldGroup[],
  failure: Failure | undefined,
): Readonly<Record<string, readonly string[]>> {
  const found: Record<string, string[]> = {};
  if (failure !== undefined && failure.faults === undefined) found[''] = [failure.detail];
  for (const { pointer, detail } of failure?.faults ?? []) {
    const field = fieldAt(fieldsOf(groups), pointer);
    const place = field === undefined ? '' : placeIn(pointer.slice(field.pointer.length));
    const list = found[field?.name ?? ''] ?? [];
    found[field?.name ?? ''] = [...list, place + detail];
  }
  return found;
}

/** The field that fills this place or one above it; the nearest wins. */
function fieldAt(fields: readonly Field[], pointer: string): Field | undefined {
  return fields
    .filter((field) => pointer === field.pointer || pointer.startsWith(`${field.pointer}/`))
    .reduce<Field | undefined>(
      (best, field) =>
        best === undefined || field.pointer.length > best.pointer.length ? field : best,
      undefined,
    );
}

/** `/1/0` within a table of lines is line 2, place 1. */
function placeIn(rest: string): string {
  const [line, place] = rest.split('/').slice(1).map(Number);
  if (line === undefined || Number.isNaN(line)) return '';
  return place === undefined || Number.isNaN(place)
    ? `Line ${line + 1}: `
    : `Line ${line + 1}, place ${place + 1}: `;
}
