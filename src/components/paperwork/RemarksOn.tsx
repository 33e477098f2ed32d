import type { ItemRemark } from '@/domain/paperwork/state';

/** What the officials remarked on one item when they returned the paperwork. */
export const RemarksOn = ({
  remarks,
  item,
}: {
  readonly remarks: readonly ItemRemark[];
  readonly item: string;
}) => {
  const own = remarks.filter((remark) => remark.item === item);
  return own.length === 0 ? null : (
    <ul className="my-2 border-l-4 border-outside pl-3">
      {own.map((remark) => (
        <li key={remark.text}>
          <strong>Remark:</strong> {remark.text}
        </li>
      ))}
    </ul>
  );
};
