import { findUnit } from '../../../quantity/find-unit';
import type { SheetForm } from '../../../rulebook/form/form';
import { getQuantityEntry, type QuantityName } from '../../../rulebook/quantity-catalogue';
import { findValve } from '../positions';
import type { ColumnMeaning } from './column-meaning';

/** Words by which people head a column; the first quantity whose words occur is meant. */
const WORDS: readonly (readonly [QuantityName, RegExp])[] = [
  ['lifter-height', /\b(height|tall|length)\b/],
  ['foot-diameter', /\b(foot|feet|face)\b/],
  [
    'tappet-bore-diameter',
    /\b((lifter|tappet) ?(bores?|holes?)|holes?)\b|\bbores?\b(?!.*\bcylinder)/,
  ],
  ['lifter-weight', /\b(lifter|tappet)\b.*\bweight\b|\bweight\b.*\b(lifter|tappet)\b/],
  ['lifter-body-diameter', /\b(lifters?|tappets?|body|bodies)\b/],
  ['cylinder-bore', /\bcylinder bore\b|\bbore\b/],
  ['valve-lift', /\b(valve )?lift\b/],
  ['lobe-lift', /\b(lobe|cam) ?lift\b|\blift\b/],
  ['duration', /\bduration\b/],
  ['rocker-ratio', /\brocker\b|\bratio\b/],
  ['spring-load', /\bspring\b/],
  ['chamber-volume', /\bchamber\b|\bvolume\b/],
  ['piston-assembly-weight', /\bpiston\b/],
  ['connecting-rod-weight', /\b(con ?)?rods?\b|\bconnecting rod\b/],
  ['valve-head-diameter', /\bvalve\b|\bhead\b/],
];

const DEPTHS: readonly (readonly [string, RegExp])[] = [
  ['above', /\b(above|top|upper)\b/],
  ['below', /\b(below|bottom|lower)\b/],
  ['middle', /\b(middle|mid|centre|center)\b/],
];

const AXES: readonly (readonly [string, RegExp])[] = [
  ['along', /\b(along|inline|x)\b/],
  ['across', /\b(across|crosswise|y)\b/],
];

const plain = (text: string): string =>
  text
    .toLowerCase()
    .replace(/[_\-/\\.,;:()[\]{}#"″”]+/g, ' ')
    .replace(/\s+/g, ' ')
    .trim();

const named = <T>(list: readonly (readonly [T, RegExp])[], words: string): T | undefined =>
  list.find(([, pattern]) => pattern.test(words))?.[0];

/** A unit in brackets, after a comma, or as the last word: `Bore (mm)`, `Lifter, in`, `Foot in.` */
export const unitIn = (header: string, quantity: QuantityName): string | undefined => {
  const { dimension } = getQuantityEntry(quantity);
  const candidates = [
    ...[...header.matchAll(/[([{]([^)\]}]+)[)\]}]/g)].map((match) => match[1] ?? ''),
    header.split(/[,;/|]/).at(-1) ?? '',
    header.trim().split(/\s+/).at(-1) ?? '',
  ];
  for (const candidate of candidates) {
    const unit = findUnit(dimension, candidate.replace(/\.$/, ''));
    if (unit !== undefined) return unit.symbol;
  }
  return undefined;
};

/** Heads the column that says what to correct in a file that was given back; it is never read. */
export const TO_CORRECT = 'To correct (added by Tagwire)';

export const isOwnColumn = (header: string): boolean =>
  plain(header).startsWith('to correct added by tagwire');

/** What a heading says by itself; a heading that says nothing known is not taken. */
export const readHeader = (header: string, form: SheetForm): ColumnMeaning => {
  const words = plain(header);
  const label = form.columns.find(
    (column) => plain(column.label) === words.replace(/ (in|mm)$/, ''),
  );
  const wanted = WORDS.filter(([name]) => form.columns.some((column) => column.quantity === name));
  const quantity = label?.quantity ?? named(wanted, words);
  if (quantity === undefined) return { kind: 'not-taken' };
  const valve = words
    .split(' ')
    .map(findValve)
    .find((found) => found !== undefined);
  const column = form.columns.find((one) => one.quantity === quantity);
  // "in" is a unit before it is short for intake.
  const valveWord = /\b(intake|inlet|int|exhaust|exh|ex)\b/.test(words) ? valve : undefined;
  return {
    kind: 'reading',
    quantity,
    unit: unitIn(header, quantity) ?? column?.unit ?? getQuantityEntry(quantity).unit,
    depth: named(DEPTHS, words) ?? '',
    axis: named(AXES, words) ?? '',
    ...(valveWord === undefined ? {} : { valve: valveWord }),
  };
};
