import type { DeclaredAgainstFound } from '@/domain/inspection/declared-against-found';
import { againstLastFound, type LastFound } from '@/domain/paperwork/last-found';
import type { Facts } from '@/domain/rulebook/evaluate/facts';
import { displayNumber } from '../../look/ReadingValue';
import { StatusWord } from '../../look/StatusWord';

interface LastFoundProps {
  readonly last: LastFound;
  /** What is declared so far. */
  readonly facts: Facts;
}

const Row = ({ row }: { readonly row: DeclaredAgainstFound }) => (
  <tr className={row.differs ? 'row-close' : undefined}>
    <th scope="row" data-label="What">
      {row.label}
    </th>
    <td data-label="Where">{row.position}</td>
    <td className="num" data-label="Declared now">
      {displayNumber(row.declared.text)} {row.declared.unit}
    </td>
    <td className="num" data-label="Found then">
      {displayNumber(row.found.text)} {row.found.unit}
    </td>
    <td>
      <StatusWord
        status={row.differs ? 'too-close' : 'within'}
        word={row.differs ? 'differs' : 'agrees'}
        size={22}
      />
    </td>
  </tr>
);

/** What is declared now beside what the last teardown found; the differences stand open. */
export const LastFoundList = ({ last, facts }: LastFoundProps) => {
  const rows = againstLastFound(facts, last);
  const differing = rows.filter(({ differs }) => differs);
  const table = (list: readonly DeclaredAgainstFound[]) => (
    <table className="table-stack">
      <thead>
        <tr>
          <th scope="col">What</th>
          <th scope="col">Where</th>
          <th scope="col">Declared now</th>
          <th scope="col">Found then</th>
          <td />
        </tr>
      </thead>
      <tbody>
        {list.map((row) => (
          <Row key={`${row.quantity} ${row.position}`} row={row} />
        ))}
      </tbody>
    </table>
  );
  return (
    <section aria-labelledby="last-found" className="mt-6">
      <h3 id="last-found">Against the last teardown</h3>
      <p>
        Notice <span className="num">{last.number}</span>, {last.event}.{' '}
        {rows.length === 0
          ? `${last.found.length} numbers were found then; none of them is declared yet.`
          : `Of ${rows.length} numbers known from both, ${differing.length} differ by more than the uncertainty of what was found. An engine rebuilt since may well differ; a slip of the pen may too.`}
      </p>
      {differing.length > 0 && table(differing)}
      {rows.length > differing.length && (
        <details>
          <summary className="min-h-12 cursor-pointer font-semibold">
            {rows.length - differing.length} agree
          </summary>
          {table(rows.filter(({ differs }) => !differs))}
        </details>
      )}
    </section>
  );
};
