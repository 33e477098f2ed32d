import { useContext, useId } from 'react';
import type { ItemRemark } from '@/domain/paperwork/state';
import { RepliesContext } from './replies';

/** What the officials remarked on one item, and the place to answer where it is put right. */
export const RemarksOn = ({
  remarks,
  item,
}: {
  readonly remarks: readonly ItemRemark[];
  readonly item: string;
}) => {
  const id = useId();
  const replies = useContext(RepliesContext);
  const own = remarks.filter((remark) => remark.item === item);
  if (own.length === 0) return null;
  const given = replies?.given.find((reply) => reply.item === item)?.text ?? '';
  const open = replies?.open.includes(item) === true;
  return (
    <div className="my-2 border-l-4 border-outside pl-3">
      <ul>
        {own.map((remark) => (
          <li key={remark.text}>
            <strong>Remark:</strong> {remark.text}
          </li>
        ))}
      </ul>
      {replies !== undefined && (
        <>
          <p className={open ? 'font-semibold' : 'text-ink-2'}>
            {open
              ? 'Change it, or answer the remark.'
              : given === ''
                ? 'Changed since it came back.'
                : 'Answered.'}
          </p>
          <details open={open || given !== ''}>
            <summary className="btn-link inline-flex items-center">Answer instead</summary>
            <div className="field pb-3">
              <label htmlFor={id}>Your answer to the remark</label>
              <textarea
                id={id}
                maxLength={1000}
                value={given}
                onChange={(event) => replies.onReply({ item, text: event.target.value })}
              />
            </div>
          </details>
        </>
      )}
    </div>
  );
};
