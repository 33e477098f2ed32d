import type { Json } from '../ledger/canonical';

/** JSON without numbers: they stand as strings, since `0.8440` would come back as `0.844`. */
export type PlainDocument = Json;

/**
 * Plain data as a document to be canonicalised: numbers become strings, absent members are left
 * out, members stand in the order of their names. Throws on what JSON cannot hold (a defect of the caller).
 */
export const toDocument = (value: unknown): PlainDocument => {
  if (value === null || typeof value === 'string' || typeof value === 'boolean') return value;
  if (typeof value === 'number' && Number.isFinite(value)) return String(value);
  if (Array.isArray(value)) return value.map(toDocument);
  if (typeof value === 'object') {
    return Object.fromEntries(
      Object.entries(value)
        .filter(([, member]) => member !== undefined)
        .sort(([a], [b]) => (a < b ? -1 : 1))
        .map(([key, member]) => [key, toDocument(member)]),
    );
  }
  throw new TypeError(`a ${typeof value} cannot stand in a document`);
};
