import { LOBES } from '@/domain/paperwork/cam/cam-place';
import type { JudgedCell } from '@/domain/paperwork/sheet/judge-cells';
import type { SheetCell } from '@/domain/paperwork/sheet/sheet-cell';
import type { SheetForm } from '@/domain/rulebook/form/form';

export interface GridColumn {
  readonly quantity: SheetCell['quantity'];
  readonly depth: string;
  readonly axis: string;
  readonly unit: string;
  readonly title: string;
}

/** A column for every quantity the rules want, and for each lobe, depth, axis or repeat that somebody wrote. */
export const gridColumns = (
  form: SheetForm,
  judged: readonly JudgedCell[],
): readonly GridColumn[] =>
  form.columns.flatMap(({ quantity, label, unit }) => {
    const own = judged.filter(({ cell }) => cell.quantity === quantity);
    const empty = { quantity, depth: '', axis: '', unit };
    const lobes = form.per === 'degree' ? LOBES.map((axis) => ({ ...empty, axis })) : [];
    const kinds = new Map(
      [...lobes, ...own.map(({ cell }) => cell)].map((cell) => [
        `${cell.depth}|${cell.axis}`,
        cell,
      ]),
    );
    const cells = kinds.size === 0 ? [empty] : [...kinds.values()];
    return cells.map((cell) => {
      const place = [cell.depth, cell.axis].filter((part) => part !== '').join(' ');
      const title = [label, place].filter((part) => part !== '').join(', ');
      return { quantity, depth: cell.depth, axis: cell.axis, unit: cell.unit, title };
    });
  });
