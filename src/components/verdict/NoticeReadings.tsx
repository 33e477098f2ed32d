import { Budgets } from '@/components/finding/Budgets';
import { FindingRow, FindingTable } from '@/components/look/FindingRow';
import { GaugeStrip, type GaugeStripProps } from '@/components/look/GaugeStrip';
import { displayNumber, ReadingValue } from '@/components/look/ReadingValue';
import { markOfState } from '@/components/look/status';
import type { NoticeClause, NoticePosition } from '@/domain/verdict/notice/notice';

const beyond = ({ limits }: NoticeClause, { value }: NoticePosition): number => {
  const reading = Number(value?.text);
  return Math.max(
    limits?.max === undefined ? -Infinity : reading - Number(limits.max.text),
    limits?.min === undefined ? -Infinity : Number(limits.min.text) - reading,
  );
};

const bound = ({ limits }: NoticeClause, name: 'min' | 'max') => {
  const written = limits?.[name];
  return (
    written && {
      value: Number(written.text),
      label: `${name} ${displayNumber(written.text)} ${written.unit}`,
    }
  );
};

const strip = (
  clause: NoticeClause,
  { value, uncertainty }: NoticePosition,
): Omit<GaugeStripProps, 'size' | 'status'> => {
  const guard = clause.limits?.guard;
  return {
    min: bound(clause, 'min'),
    max: bound(clause, 'max'),
    reading: value && {
      value: Number(value.text),
      label: `${displayNumber(value.text)} ${value.unit}`,
    },
    uncertainty: uncertainty && Number(uncertainty.text),
    guard: guard && { kind: guard.kind, width: Number(guard.width.text) },
    unit: value?.unit ?? '',
  };
};

/** The breached clause's values: the farthest one large on its strip, every failing position in a table. */
export const NoticeReadings = ({ clause }: { readonly clause: NoticeClause }) => {
  const measured = clause.positions.filter(({ value }) => value !== undefined);
  const [worst] = [...measured].sort((a, b) => beyond(clause, b) - beyond(clause, a));
  if (worst?.value === undefined) return null;
  const { unit, text } = worst.value;
  const spread =
    worst.uncertainty === undefined || worst.k === undefined
      ? {}
      : { uncertainty: { value: worst.uncertainty.text, k: worst.k } };
  const against = [bound(clause, 'min')?.label, bound(clause, 'max')?.label].filter(Boolean);
  return (
    <>
      <p>
        <ReadingValue large value={text} unit={unit} {...spread} />{' '}
        <strong>
          {clause.measured?.toLowerCase()}, {worst.position}
        </strong>
      </p>
      {clause.limits !== undefined && (
        <GaugeStrip
          {...strip(clause, worst)}
          size="print"
          status={markOfState(worst.state)}
          outsideWord="outside: past what the clause allows"
        />
      )}
      <FindingTable
        unit={unit}
        k={worst.k ?? ''}
        against={`Against ${against.join(', ')}`}
        subject="Position"
      >
        {measured.map((position) => (
          <FindingRow
            key={position.position}
            subject={position.position}
            value={position.value?.text ?? ''}
            uncertainty={position.uncertainty?.text ?? ''}
            strip={strip(clause, position)}
            status={markOfState(position.state)}
            finding={position.pass === false ? 'fail' : 'no finding'}
          />
        ))}
      </FindingTable>
      <Budgets results={measured} />
    </>
  );
};
