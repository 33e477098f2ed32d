/** How a seal was found. */
export type SealState = 'intact' | 'broken' | 'missing' | 'other-number';

/** One act on an engine's seals. */
export type SealAct =
  | {
      readonly kind: 'applied';
      readonly number: string;
      readonly place: string;
      readonly by: string;
    }
  | {
      readonly kind: 'found';
      readonly number: string;
      readonly place: string;
      readonly state: SealState;
    }
  | {
      readonly kind: 'removed';
      readonly number: string;
      readonly place: string;
      readonly by: string;
    };

export interface SealRow {
  readonly id: string;
  /** ISO 8601 instant in UTC. */
  readonly at: string;
  readonly act: SealAct;
}

export interface SealHistory {
  /** The number that should be at each place now; nothing where it was removed. */
  readonly onRecord: ReadonlyMap<string, string>;
  readonly faults: readonly { readonly row: string; readonly words: string }[];
}

/** Seals by place over time, and where what was found does not follow from what was done. */
export const sealHistoryOf = (rows: readonly SealRow[]): SealHistory => {
  const onRecord = new Map<string, string>();
  const faults: { row: string; words: string }[] = [];
  const ordered = [...rows].sort(
    (a, b) => Date.parse(a.at) - Date.parse(b.at) || (a.id < b.id ? -1 : 1),
  );
  for (const { id, act } of ordered) {
    const known = onRecord.get(act.place);
    const fault = (words: string) => faults.push({ row: id, words });
    if (act.kind === 'applied') {
      if (known !== undefined)
        fault(`Seal ${act.number} was applied at ${act.place} over seal ${known}.`);
      onRecord.set(act.place, act.number);
    } else if (act.kind === 'removed') {
      if (known === undefined)
        fault(`Seal ${act.number} was removed at ${act.place}, where none is on record.`);
      else if (known !== act.number)
        fault(`Seal ${act.number} was removed at ${act.place}; ${known} is on record.`);
      onRecord.delete(act.place);
    } else if (act.state !== 'intact') {
      fault(
        `The seal at ${act.place} was found ${act.state === 'other-number' ? `as ${act.number}, another number` : act.state}.`,
      );
    } else if (known !== act.number) {
      fault(
        known === undefined
          ? `Seal ${act.number} was found at ${act.place}, where none is on record.`
          : `Seal ${act.number} was found at ${act.place}; ${known} is on record.`,
      );
    }
  }
  return { onRecord, faults };
};
