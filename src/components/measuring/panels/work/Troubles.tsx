import { Caution } from '@/components/look/Caution';
import type { SentRow } from '@/contracts/inspection/rows';
import type { Capture } from '../../use-capture';

interface TroublesProps {
  readonly problem: string | undefined;
  readonly capture: Capture;
}

/** A refused row in a few words: its number, or what it does. */
const rowWords = (row: SentRow): string => {
  const where = 'place' in row ? [row.place.cylinder, row.place.valve].join(' ').trim() : '';
  if (row.kind === 'reading') return `${where}: ${row.value.text} ${row.value.unit}`;
  if (row.kind === 'zero') return `${row.end} zero ${row.reading.text} ${row.reading.unit}`;
  return `${where} ${row.remark}`.trim();
};

/** What went wrong, written where the hand is; nothing is lost by it. */
export const Troubles = ({ problem, capture }: TroublesProps) => (
  <>
    {problem !== undefined && (
      <div role="alert">
        <Caution status="unreadable" title="Look again">
          <p>{problem}</p>
        </Caution>
      </div>
    )}
    {capture.outcome === 'sign-in' && (
      <Caution title="Signed out">
        <p>
          Everything is kept on this device.{' '}
          <a href={`/sign-in?return=${encodeURIComponent(window.location.pathname)}`}>Sign in</a>{' '}
          and it is sent.
        </p>
      </Caution>
    )}
    {capture.refused.map((act) => (
      <div key={act.seq} role="alert">
        <Caution status="outside" title="Not taken by the server; kept here">
          <p>
            {act.rows.map(rowWords).join('; ')}: {act.problem}
          </p>
          <button
            className="btn"
            type="button"
            onClick={() => act.seq !== undefined && void capture.sendAgain(act.seq)}
          >
            Send again
          </button>
        </Caution>
      </div>
    ))}
  </>
);
