import { useState } from 'react';
import { Caution } from '@/components/look/Caution';
import { OTHER_LOBE, orderOf, orderWords, signedReturnOf } from '@/domain/inspection/rack/rack';
import type { Bay, Hands } from '../../bay';
import { clockWithSeconds } from '../../report/clock';
import { liftersReturnedRow } from '../../sheet/rows';

/** Where the lifters are, and their return in order, signed for. */
export const RackWork = ({ bay, hands }: { readonly bay: Bay; readonly hands: Hands }) => {
  const { rack, rows, sheet } = bay;
  const [name, setName] = useState(sheet.inspector);
  const order = orderOf(rack);
  const signed = signedReturnOf(rows.remarks);
  const out = rack.filter(({ state }) => state === 'racked').length;
  const back = rack.filter(({ state }) => state === 'returned').length;
  const complete = back > 0 && out === 0 && order.twice.length === 0;
  const sign = () =>
    void hands.record([
      liftersReturnedRow(name.trim(), order.kept ? 'kept' : 'changed', orderWords(order)),
    ]);
  return (
    <div className="grid gap-4">
      <h2>Lifters, racked by bore</h2>
      <p>
        {out} out, {back} in again, {rack.length - out - back} not taken out.
      </p>
      {order.changed.length > 0 && (
        <Caution title="Into another bore than its own">
          <p>{orderWords(order)}.</p>
          <p>{OTHER_LOBE}</p>
        </Caution>
      )}
      {order.twice.length > 0 && (
        <Caution status="unreadable" title="Two lifters for one bore">
          <p>{order.twice.join(', ')}: say again where each went.</p>
        </Caution>
      )}
      {signed !== undefined && (
        <Caution
          status={signed.outdated ? 'unreadable' : 'within'}
          title={
            signed.outdated ? 'A lifter moved after the return was signed' : 'Return signed for'
          }
        >
          <p>
            {signed.signedBy}, {clockWithSeconds(signed.at, sheet.zone)}:{' '}
            {signed.order === 'kept' ? 'order kept' : `order changed, ${signed.words}`}.
          </p>
        </Caution>
      )}
      {complete && (signed === undefined || signed.outdated) && (
        <div className="field">
          <label htmlFor="returned-by">Signed for by</label>
          <input
            id="returned-by"
            value={name}
            maxLength={120}
            onChange={(event) => setName(event.target.value)}
          />
          <button
            type="button"
            className="btn btn-primary"
            disabled={name.trim() === ''}
            onClick={sign}
          >
            {order.kept
              ? 'Sign: all back, order kept'
              : `Sign: all back, ${order.changed.length} in other bores`}
          </button>
        </div>
      )}
    </div>
  );
};
