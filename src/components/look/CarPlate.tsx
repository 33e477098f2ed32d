interface CarPlateProps {
  /** The car number is text: "12J" exists. */
  readonly number: string;
  /** `row` in tables, `bar` in the top bar, `sheet` on a notice. */
  readonly size?: 'row' | 'bar' | 'sheet';
  readonly href?: string;
}

const sizeClass = { row: 'plate', bar: 'plate plate-bar', sheet: 'plate plate-sheet' } as const;

/** The car number on its solid blue plate. */
export const CarPlate = ({ number, size = 'row', href }: CarPlateProps) => {
  const content = (
    <>
      <span className="visually-hidden">Car </span>
      {number}
    </>
  );
  return href === undefined ? (
    <span className={sizeClass[size]}>{content}</span>
  ) : (
    <a className={sizeClass[size]} href={href}>
      {content}
    </a>
  );
};
