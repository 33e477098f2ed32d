import { useState } from 'react';
import { displayNumber } from '@/components/look/ReadingValue';
import type { BoreResult } from '@/domain/inspection/assess-inspection';
import { clausesHoldingEach } from '@/domain/inspection/second-set/second-sets';
import { getQuantityEntry } from '@/domain/rulebook/quantity-catalogue';
import { boreName } from '@/domain/tappet/layout/bore-layout';
import type { Bay, Hands } from '../../bay';
import { standsRow } from '../../sheet/rows';
import { placeOf } from '../../sheet/sheet';

type Stands = '1' | '2' | 'pooled';

const LABELS: Readonly<Record<Stands, string>> = {
  pooled: 'Both, pooled',
  1: 'The first stands',
  2: 'The second stands',
};

/** Two sets of one bore side by side: their difference against the joint U, and which stands. */
export const SecondSet = ({
  bay,
  hands,
  result,
}: {
  readonly bay: Bay;
  readonly hands: Hands;
  readonly result: BoreResult;
}) => {
  const [stands, setStands] = useState<Stands>('pooled');
  const [reason, setReason] = useState('');
  const { choice, secondSets } = result;
  const second = secondSets.at(-1);
  const each = clausesHoldingEach(bay.assessment.findings, boreName(bay.position));
  if (second === undefined) return null;
  const keep = () =>
    void hands.record([standsRow(placeOf(bay.position, 'bore'), stands, reason.trim())]);
  return (
    <section className="grid gap-2" aria-label={`Two sets of ${boreName(bay.position)}`}>
      <table className="both-sets">
        <caption>
          Two sets,{' '}
          {second.alone
            ? 'by the same inspector: a re-zeroed repeat'
            : 'the second by another inspector'}
          . They {second.agree ? 'agree' : 'differ by more than their uncertainty'}.
        </caption>
        <thead>
          <tr>
            <th scope="col">Mean</th>
            <th scope="col" className="num">
              First
            </th>
            <th scope="col" className="num">
              Second
            </th>
            <th scope="col" className="num">
              Difference
            </th>
            <th scope="col" className="num">
              U, k = 2
            </th>
          </tr>
        </thead>
        <tbody>
          {second.agreements.map((one) => (
            <tr key={one.quantity}>
              <th scope="row">
                {getQuantityEntry(one.quantity).label},{' '}
                {one.first.unit === 'thou' ? '0.001 in' : one.first.unit}
              </th>
              <td className="num">{displayNumber(one.first.text)}</td>
              <td className="num">{displayNumber(one.second.text)}</td>
              <td className="num">{displayNumber(one.difference.text, true)}</td>
              <td className="num">
                {one.expandedUncertainty.text}
                {one.agree ? '' : ' !'}
              </td>
            </tr>
          ))}
        </tbody>
      </table>
      {each.length > 0 && (
        <p>
          {each.length === 1 ? 'Clause' : 'Clauses'} {each.join(', ')}: each set by itself, whatever
          is chosen here.
        </p>
      )}
      {choice === undefined ? (
        <p className="note">Both count together until somebody says which stands.</p>
      ) : (
        <p>
          <b>{choice.stands === 'pooled' ? 'Both stand, pooled' : `Set ${choice.stands} stands`}</b>
          : {choice.reason}.
        </p>
      )}
      <div className="field">
        <label htmlFor="stands">Two sets of one bore: which stands?</label>
        <select
          id="stands"
          value={stands}
          onChange={(event) => setStands(event.target.value as Stands)}
        >
          {(['pooled', '1', '2'] as const).map((one) => (
            <option key={one} value={one}>
              {LABELS[one]}
            </option>
          ))}
        </select>
        <label htmlFor="stands-because">Because</label>
        <input
          id="stands-because"
          value={reason}
          maxLength={300}
          onChange={(event) => setReason(event.target.value)}
        />
        <button type="button" className="btn" disabled={reason.trim() === ''} onClick={keep}>
          Keep this choice
        </button>
      </div>
    </section>
  );
};
