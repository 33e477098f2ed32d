import type { ReactNode } from 'react';
import { Mark } from './Mark';
import type { Status } from './status';

interface CautionProps {
  readonly title?: string;
  /** Left out: a plain caution triangle, for work that can hurt someone. */
  readonly status?: Status;
  readonly children?: ReactNode;
  /** Heading level when the block heads a part of the page; otherwise the title is a bold line. */
  readonly heading?: 2 | 3;
}

const tone = (status: Status | undefined): string => {
  if (status === undefined || status === 'too-close' || status === 'unreadable') return 'caution';
  if (status === 'outside') return 'caution caution-outside';
  return status === 'within' ? 'caution caution-within' : 'caution caution-plain';
};

/** A block that is written on the page and stays there: a caution at its step, or a result's state. */
export const Caution = ({ title, status, children, heading }: CautionProps) => {
  const Title = heading === undefined ? 'p' : (`h${heading}` as const);
  return (
    <div className={tone(status)}>
      {status === undefined ? (
        <svg className="mark" width="46" height="42" viewBox="0 0 46 42" aria-hidden="true">
          <path d="M23 3L43.5 39h-41z" fill="none" stroke="currentColor" strokeWidth="3" />
          <path d="M23 15v13M23 31.5v4" stroke="currentColor" strokeWidth="3.6" />
        </svg>
      ) : (
        <Mark status={status} size={46} />
      )}
      <div>
        {title !== undefined && <Title className="caution-title">{title}</Title>}
        {children}
      </div>
    </div>
  );
};
