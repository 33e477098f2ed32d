import type { Clause } from '@/domain/rulebook/clause';
import type { ClauseResult } from '@/domain/rulebook/clause-result';
import { GaugeStrip } from '../../look/GaugeStrip';
import { displayNumber } from '../../look/ReadingValue';
import { shownResult } from '../../measuring/sheet/shown';

interface DeclaredStripsProps {
  readonly clause: Clause;
  readonly result: ClauseResult;
}

/** Each declared value against its limit, one tap away, with the rule that will decide; nothing without numbers. */
export const DeclaredStrips = ({ clause, result }: DeclaredStripsProps) => {
  const rows = result.perPosition.flatMap((row) => {
    const shown = shownResult(clause, row);
    return shown === undefined ? [] : [{ row, shown }];
  });
  const [first] = rows;
  if (first === undefined) return null;
  return (
    <details className="mt-1">
      <summary>Each value against the limit</summary>
      <ul>
        {rows.map(({ row, shown: { value, unit, strip, uncertainty, k } }) => (
          <li key={row.position} className="flex flex-wrap items-center gap-x-3 py-1">
            <span className="grow">{row.position}</span>
            <span>
              <span className="num">{displayNumber(value)}</span>
              {row.uncertainty !== undefined && (
                <>
                  {' '}
                  <span className="num">± {uncertainty}</span> (k = {k})
                </>
              )}{' '}
              {unit}
            </span>
            <span className="w-44 shrink-0">
              <GaugeStrip
                {...strip}
                uncertainty={row.uncertainty === undefined ? undefined : strip.uncertainty}
                size="table"
              />
            </span>
          </li>
        ))}
      </ul>
      {first.row.rule !== undefined && <p className="note">{first.row.rule}</p>}
    </details>
  );
};
