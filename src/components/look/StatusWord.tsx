import { Mark } from './Mark';
import { type Status, statusWord } from './status';

interface StatusWordProps {
  readonly status: Status;
  /** Another word for the same mark: Breach, No breach, pass, fail. */
  readonly word?: string;
  /** A second line: what follows from it. */
  readonly detail?: string;
  readonly size?: number;
}

/** A mark with its word. The word is always there: the mark alone is for dense drawings. */
export const StatusWord = ({ status, word, detail, size = 28 }: StatusWordProps) => (
  <span className="status">
    <Mark status={status} size={size} />
    <span>
      {detail === undefined ? (
        (word ?? statusWord[status])
      ) : (
        <>
          <strong>{word ?? statusWord[status]}</strong>
          <small>{detail}</small>
        </>
      )}
    </span>
  </span>
);
