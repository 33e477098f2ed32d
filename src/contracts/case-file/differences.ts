import type { PlainDocument } from '@/domain/rulebook/document';

export interface Difference {
  /** JSON Pointer (RFC 6901). */
  readonly pointer: string;
  readonly signed: string;
  readonly anew: string;
}

const shown = (value: PlainDocument | undefined): string =>
  value === undefined ? 'nothing' : JSON.stringify(value);

const isObject = (value: PlainDocument | undefined): value is Record<string, PlainDocument> =>
  typeof value === 'object' && value !== null;

/** Every place at which two documents differ, at most `most` of them. */
export const differencesOf = (
  signed: PlainDocument | undefined,
  anew: PlainDocument | undefined,
  pointer = '',
  most = 20,
): readonly Difference[] => {
  if (!isObject(signed) || !isObject(anew) || Array.isArray(signed) !== Array.isArray(anew)) {
    return signed === anew ? [] : [{ pointer, signed: shown(signed), anew: shown(anew) }];
  }
  const found: Difference[] = [];
  for (const key of new Set([...Object.keys(signed), ...Object.keys(anew)])) {
    if (found.length >= most) break;
    const at = `${pointer}/${key.replaceAll('~', '~0').replaceAll('/', '~1')}`;
    found.push(...differencesOf(signed[key], anew[key], at, most - found.length));
  }
  return found;
};
