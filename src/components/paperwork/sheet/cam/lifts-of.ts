import type { LiftReading } from '@/domain/paperwork/cam/cam-table';
import type { JudgedCell } from '@/domain/paperwork/sheet/judge-cells';

/** The lifts of a cam table that are numbers, whether they are asked about or not. */
export const liftsOf = (judged: readonly JudgedCell[]): readonly LiftReading[] =>
  judged.flatMap(({ cell, quantity }) => {
    if (quantity === undefined) return [];
    const { position, axis } = cell;
    const value = { text: quantity.text, unit: quantity.unit };
    return [{ position, axis, quantity: cell.quantity, value }];
  });
