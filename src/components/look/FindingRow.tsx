import type { ReactNode } from 'react';
import { GaugeStrip, type GaugeStripProps } from './GaugeStrip';
import { displayNumber } from './ReadingValue';
import { StatusWord } from './StatusWord';
import type { Status } from './status';

interface FindingTableProps {
  readonly caption?: string;
  /** Unit of every number in the table: "in", "0.001 in". */
  readonly unit: string;
  /** Coverage factor behind the ± U column. */
  readonly k: string;
  /** Head of the strip's column: "Against max 0.0010". */
  readonly against: string;
  /** Head of the first column: "Lifter", "Bore", "Clause". */
  readonly subject: string;
  readonly children: ReactNode;
}

interface FindingRowProps {
  readonly subject: string;
  readonly clause?: string;
  /** As written. */
  readonly value: string;
  readonly uncertainty: string;
  readonly strip: Omit<GaugeStripProps, 'size' | 'status'>;
  readonly status: Status;
  /** "pass" or "fail" by the decision rule; without one the measurement's own word stands. */
  readonly finding?: string;
}

/** Findings as a table: one row a number, its strip beside it, its word at the end. */
export const FindingTable = ({
  caption,
  unit,
  k,
  against,
  subject,
  children,
}: FindingTableProps) => (
  <table className="rows-mid table-stack">
    {caption !== undefined && <caption>{caption}</caption>}
    <thead>
      <tr>
        <th scope="col">{subject}</th>
        <th scope="col" className="num">{`Measured, ${unit}`}</th>
        <th scope="col" className="num">{`± U, ${unit} (k = ${k})`}</th>
        <th scope="col">{against}</th>
        <th scope="col">Finding</th>
      </tr>
    </thead>
    <tbody>{children}</tbody>
  </table>
);

const tint = (status: Status): string | undefined => {
  if (status === 'outside') return 'row-outside';
  return status === 'too-close' ? 'row-close' : undefined;
};

export const FindingRow = (props: FindingRowProps) => {
  const { subject, clause, value, uncertainty, strip, status, finding } = props;
  return (
    <tr className={tint(status)}>
      <th scope="row">
        {clause !== undefined && <span className="finding-clause">{clause} </span>}
        {subject}
      </th>
      <td className="num" data-label="Measured">
        {displayNumber(value)}
      </td>
      <td className="num" data-label="± U">
        {uncertainty}
      </td>
      <td data-label="Strip">
        <GaugeStrip {...strip} size="table" status={status} />
      </td>
      <td data-label="Finding">
        <StatusWord status={status} size={22} {...(finding !== undefined && { word: finding })} />
      </td>
    </tr>
  );
};
