import { memo } from 'react';
import { Mark } from '@/components/look/Mark';
import { requirementWords } from '@/domain/rulebook/describe';
import type { Row } from './numbering';

const depthOf = (number: string): number => Math.min(number.split('.').length, 4);

interface ClauseRowProps {
  readonly row: Row;
  readonly faults: number;
  readonly onOpen: (key: string) => void;
}

const wordsOf = ({ clause }: Row): string => {
  try {
    return clause.requirement === undefined ? clause.words : requirementWords(clause.requirement);
  } catch {
    return clause.words;
  }
};

/** A clause that nobody is editing: one line to read and to open. */
export const ClauseRow = memo(({ row, faults, onOpen }: ClauseRowProps) => (
  <li>
    <button
      type="button"
      className={`clause-row depth-${depthOf(row.clause.number)}`}
      onClick={() => onOpen(row.key)}
    >
      <span className="num">{row.clause.number}</span>
      <span className="grow">
        <span className="clause-row-heading">{row.clause.heading || 'No heading yet'}</span>
        <span className="note">{wordsOf(row)}</span>
      </span>
      {faults > 0 && (
        <span className="clause-row-faults">
          <Mark status="unreadable" title="Still ambiguous" /> {faults}
        </span>
      )}
    </button>
  </li>
));
