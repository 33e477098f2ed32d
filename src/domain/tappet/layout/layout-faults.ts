import type { Fault } from '../../failure';
import type { Bank, BoreLayout } from './bore-layout';

/** What is wrong with a layout, each with a pointer to the place; none when it can be measured by. */
export const layoutFaults = (layout: BoreLayout): readonly Fault[] => [
  ...(layout.name.trim() === '' ? [fault('/name', 'Give the layout a name.')] : []),
  ...(layout.banks.length === 0 ? [fault('/banks', 'A layout has at least one bank.')] : []),
  ...repeated(layout.banks.map((bank) => bank.name)).map((name) =>
    fault('/banks', `Two banks are named "${name}".`),
  ),
  ...repeated(layout.banks.flatMap((bank) => bank.cylinders)).map((number) =>
    fault('/banks', `Cylinder ${number} is named twice.`),
  ),
  ...layout.banks.flatMap(bankFaults),
];

const bankFaults = (bank: Bank, at: number): readonly Fault[] => {
  const pointer = `/banks/${at}`;
  const own = new Set(bank.cylinders);
  return [
    ...(bank.cylinders.length === 0
      ? [fault(`${pointer}/cylinders`, 'A bank has at least one cylinder.')]
      : []),
    ...bank.cylinders.flatMap((number, i) =>
      Number.isInteger(number) && number > 0
        ? []
        : [fault(`${pointer}/cylinders/${i}`, 'A cylinder number is a whole number from 1.')],
    ),
    ...bank.bores.flatMap(({ cylinder }, i) =>
      own.has(cylinder)
        ? []
        : [fault(`${pointer}/bores/${i}`, `Cylinder ${cylinder} is not on this bank.`)],
    ),
    ...bank.cylinders.flatMap((number) =>
      (['intake', 'exhaust'] as const).flatMap((valve) =>
        bank.bores.some((bore) => bore.cylinder === number && bore.valve === valve)
          ? []
          : [fault(`${pointer}/bores`, `Cylinder ${number} has no ${valve} bore.`)],
      ),
    ),
  ];
};

const repeated = <T>(values: readonly T[]): readonly T[] => [
  ...new Set(values.filter((value, i) => values.indexOf(value) !== i)),
];

const fault = (pointer: string, detail: string): Fault => ({ pointer, detail });
