/** What a column of a file of entries or results may mean. */
export const FIELDS = [
  'carNumber',
  'className',
  'competitor',
  'driver',
  'email',
  'engine',
  'position',
  'laps',
] as const;

export type Field = (typeof FIELDS)[number];

export const FIELD_WORDS: Readonly<Record<Field, string>> = {
  carNumber: 'Car number',
  className: 'Class',
  competitor: 'Competitor',
  driver: 'Driver',
  email: 'E-mail address',
  engine: 'Engine',
  position: 'Position',
  laps: 'Lap times',
};

/** Without these nothing can be entered. A file of one class need not name it in every line. */
export const NEEDED: readonly Field[] = ['carNumber', 'competitor'];

const NAMES: Readonly<Record<Field, readonly string[]>> = {
  carNumber: ['car number', 'car no', 'car no.', 'car', 'number', 'no', 'no.', 'nr', 'nr.', '#'],
  className: ['class', 'division', 'group'],
  competitor: ['competitor', 'entrant', 'owner', 'name'],
  driver: ['driver', 'drivers', 'driver name'],
  email: ['e-mail', 'email', 'mail', 'e-mail address', 'email address'],
  engine: ['engine', 'engine reference', 'engine no', 'engine number'],
  position: ['position', 'finish', 'pos', 'pos.', 'result', 'place', 'finished', 'rank'],
  laps: ['lap times', 'laps', 'times'],
};

/** For a field the column's name in small letters, or `LAP_COLUMNS`; a field left out has no column. */
export type ColumnChoices = Readonly<Partial<Record<Field, string>>>;

/** Stands for all columns that are named after a lap: Lap 1, Lap 2 … */
export const LAP_COLUMNS = 'lap 1, lap 2 …';

const isLap = (head: string): boolean => /^(lap|l|runde)[ ._-]?\d{1,3}$/.test(head);

export const plainHead = (head: string): string => head.trim().toLowerCase().replace(/\s+/g, ' ');

/** The columns named after a lap, in the laps' order. */
export const lapColumns = (heads: readonly string[]): readonly number[] =>
  heads
    .map((head, at) => ({
      lap: Number(/\d+$/.exec(head)?.[0] ?? 0),
      at,
      is: isLap(plainHead(head)),
    }))
    .filter(({ is }) => is)
    .sort((a, b) => a.lap - b.lap)
    .map(({ at }) => at);

/**
 * Which column is which: what was chosen for this series before, else what the names say. A competitor
 * is taken from the driver's column where there is no other.
 */
export const guessColumns = (
  heads: readonly string[],
  remembered: ColumnChoices,
): ColumnChoices => {
  const plain = heads.map(plainHead);
  const laps = lapColumns(heads).length > 0;
  const choices: Partial<Record<Field, string>> = {};
  for (const field of FIELDS) {
    const before = remembered[field];
    if (before !== undefined && (plain.includes(before) || (before === LAP_COLUMNS && laps)))
      choices[field] = before;
    else if (field === 'laps' && laps) choices.laps = LAP_COLUMNS;
    else {
      const taken = Object.values(choices);
      const named = NAMES[field].find((name) => plain.includes(name) && !taken.includes(name));
      if (named !== undefined) choices[field] = named;
    }
  }
  if (choices.competitor === undefined && choices.driver !== undefined)
    choices.competitor = choices.driver;
  return choices;
};
