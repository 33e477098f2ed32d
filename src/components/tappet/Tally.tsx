import { Mark } from '../look/Mark';
import { type Status, statusWord } from '../look/status';

interface TallyProps {
  readonly statuses: readonly Status[];
}

const order: readonly Status[] = [
  'within',
  'outside',
  'not-measured',
  'too-close',
  'could-not-be-reached',
  'unreadable',
  'set-aside',
];

/** How many bores carry each mark; the map's key at the same time. Marks that do not occur are left out. */
export const Tally = ({ statuses }: TallyProps) => (
  <ul className="tally">
    {order
      .map((status) => ({ status, count: statuses.filter((one) => one === status).length }))
      .filter(({ count }) => count > 0)
      .map(({ status, count }) => (
        <li key={status}>
          <Mark status={status} size={22} />
          <span className="num">{count}</span>
          {status === 'set-aside' ? 'no statement' : statusWord[status]}
        </li>
      ))}
  </ul>
);
