import { displayNumber } from '@/components/look/ReadingValue';
import { LiveReading } from '@/components/tappet/BorePanels';
import type { JudgedReading } from '@/domain/inspection/capture/readings-that-count';
import { positionKey } from '@/domain/inspection/capture/rows';
import { boreName } from '@/domain/tappet/layout/bore-layout';
import type { Bay } from '../../bay';
import { takenAt } from '../../sheet/flow/taken';
import { aloud, type Typed, typedNumber } from '../../sheet/keys/typing';
import { cellKey, cellWords, type Part } from '../../sheet/parts';
import { isComparative } from '../../sheet/set-up';

/** The last reading here; else the last of this part that was taken at this tablet, else anybody's. */
export const lastOf = (bay: Bay, part: Part): JudgedReading | undefined => {
  const { judged, position, cursor, whose } = bay;
  const here = new Set(takenAt(judged, part, position, cursor.set).values());
  if (here.size > 0) return judged.findLast((reading) => here.has(reading));
  const read = judged.filter(
    ({ row, state }) => state === 'counts' && row.quantity === part.quantity,
  );
  return read.findLast(({ row }) => whose(row) === undefined) ?? read.at(-1);
};

/** The number that is being typed, or the last one for the read-back. */
export const Live = ({
  bay,
  part,
  typed,
}: {
  readonly bay: Bay;
  readonly part: Part;
  readonly typed: Typed;
}) => {
  const { position, step, scale, cursor, judged, setUp, base } = bay;
  const comparative = isComparative(setUp, part.quantity);
  const zero = step?.kind === 'opening' || step?.kind === 'closing' ? step.kind : undefined;
  const value = scale && typedNumber(typed, scale.decimals, base);
  const last = zero === undefined && typed.digits === '' ? lastOf(bay, part) : undefined;
  const key = step?.kind === 'cell' ? step.cell : cursor.cell;
  const place = bay.asked(part, position).find((one) => cellKey(one) === key);
  const shown = last === undefined ? (value ?? '') : last.row.value.text;
  const at = last && positionKey(last.place, part.per);
  const elsewhere = at !== undefined && part.per === 'bore' && at !== boreName(position);
  const words =
    zero !== undefined
      ? `${zero === 'opening' ? 'Opening' : 'Closing'} zero`
      : last !== undefined
        ? cellWords(part, { depth: last.row.referencePart ?? last.row.depth, axis: last.row.axis })
        : place === undefined
          ? part.label
          : cellWords(part, place);
  const lifter = [
    ...takenAt(
      judged,
      { quantity: 'lifter-body-diameter', per: 'bore' },
      position,
      cursor.set,
    ).values(),
  ].at(-1);
  const by = last && bay.whose(last.row);
  const meanwhile =
    typed.digits === '' || key === undefined || zero !== undefined
      ? undefined
      : takenAt(judged, part, position, cursor.set).get(key);
  const filledBy = meanwhile && bay.whose(meanwhile.row);
  const against =
    zero !== undefined
      ? 'as the dial stands'
      : last !== undefined
        ? ['last value', elsewhere ? at : undefined, by].filter(Boolean).join(', ')
        : filledBy !== undefined
          ? `${filledBy} has read this too: yours is a repeat`
          : comparative && lifter
            ? `lifter ${lifter.row.value.text} ${lifter.row.value.unit}`
            : undefined;
  return (
    <LiveReading
      place={words}
      {...(against === undefined ? {} : { against })}
      value={displayNumber(shown, comparative)}
      unit={scale?.shown ?? ''}
      {...(shown === '' || !comparative ? {} : { aloud: aloud(shown, true) })}
    />
  );
};
