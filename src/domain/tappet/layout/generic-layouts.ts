import type { Bank, BoreLayout, Valve } from './bore-layout';

/**
 * A bank from its cylinder numbers and its valve order along the bank in letters, `EIIEEIIE`: each run
 * of `perCylinder` letters belongs to the next cylinder.
 */
export const bankOf = (bank: Omit<Bank, 'bores'>, valveOrder: string, perCylinder = 2): Bank => ({
  ...bank,
  bores: [...valveOrder].flatMap((letter, i) => {
    const cylinder = bank.cylinders[Math.floor(i / perCylinder)];
    const valve: Valve = letter === 'I' ? 'intake' : 'exhaust';
    return cylinder === undefined ? [] : [{ cylinder, valve }];
  }),
});

/**
 * Starting points by common practice; an engine family's own order goes in as its own layout, since
 * valve order and numbering differ between families.
 */
export const GENERIC_LAYOUTS: readonly BoreLayout[] = [
  {
    name: 'V8, odd cylinders left, exhaust outermost',
    viewedFrom: 'front',
    banks: [
      bankOf({ name: 'left', side: 'right', offset: 'ahead', cylinders: [1, 3, 5, 7] }, 'EIIEEIIE'),
      bankOf(
        { name: 'right', side: 'left', offset: 'behind', cylinders: [2, 4, 6, 8] },
        'EIIEEIIE',
      ),
    ],
  },
  {
    name: 'V8, numbered along each bank, alternating valves',
    viewedFrom: 'front',
    banks: [
      bankOf({ name: 'right', side: 'left', offset: 'ahead', cylinders: [1, 2, 3, 4] }, 'IEIEIEIE'),
      bankOf(
        { name: 'left', side: 'right', offset: 'behind', cylinders: [5, 6, 7, 8] },
        'EIEIEIEI',
      ),
    ],
  },
  {
    name: 'Inline four',
    viewedFrom: 'front',
    banks: [
      bankOf(
        { name: 'block', side: 'middle', offset: 'level', cylinders: [1, 2, 3, 4] },
        'EIIEEIIE',
      ),
    ],
  },
  {
    name: 'V6',
    viewedFrom: 'front',
    banks: [
      bankOf({ name: 'left', side: 'right', offset: 'ahead', cylinders: [1, 3, 5] }, 'EIEIIE'),
      bankOf({ name: 'right', side: 'left', offset: 'behind', cylinders: [2, 4, 6] }, 'EIIEIE'),
    ],
  },
];
