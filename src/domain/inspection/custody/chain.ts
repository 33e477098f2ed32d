/** One act on a held part, sample or reference part under its tag. */
export type CustodyAct =
  | { readonly kind: 'taken'; readonly from: string; readonly by: string; readonly place: string }
  | {
      readonly kind: 'hand-over';
      readonly from: string;
      readonly to: string;
      readonly reason: string;
      readonly place: string;
    }
  | {
      readonly kind: 'bag-opened';
      readonly by: string;
      readonly witness: string;
      readonly reason: string;
      readonly bag: string;
    }
  | { readonly kind: 'bag-closed'; readonly by: string; readonly bag: string }
  | { readonly kind: 'returned'; readonly from: string; readonly to: string };

export interface CustodyRow {
  readonly id: string;
  readonly tag: string;
  /** ISO 8601 instant in UTC. */
  readonly at: string;
  readonly act: CustodyAct;
}

/** A place where the chain does not hold together: shown as a gap, never mended. */
export interface Gap {
  readonly after: string | undefined;
  readonly before: string;
  readonly words: string;
}

export interface Custody {
  readonly tag: string;
  readonly rows: readonly CustodyRow[];
  /** Who has it now; nothing before it was taken and after it was returned. */
  readonly holder: string | undefined;
  readonly openBag: string | undefined;
  readonly gaps: readonly Gap[];
}

interface Running {
  readonly holder: string | undefined;
  readonly openBag: string | undefined;
  readonly taken: boolean;
}

const giver = (act: CustodyAct): string | undefined => {
  if (act.kind === 'hand-over' || act.kind === 'returned') return act.from;
  return act.kind === 'taken' ? undefined : act.by;
};

const gapWords = ({ holder, openBag, taken }: Running, act: CustodyAct): string | undefined => {
  if (act.kind === 'taken')
    return holder === undefined ? undefined : `Taken again while ${holder} held it.`;
  if (!taken) return 'Nobody is on record as having taken it.';
  const by = giver(act);
  if (holder === undefined) return `${by} acted on it after it was returned.`;
  if (by !== holder) return `${by} acted on it; the last on record as holding it is ${holder}.`;
  if (act.kind === 'bag-opened' && act.witness.trim() === '') return 'Opened without a witness.';
  if ((act.kind === 'hand-over' || act.kind === 'returned') && openBag !== undefined)
    return `Handed on with bag ${openBag} open.`;
  return undefined;
};

const next = (running: Running, act: CustodyAct): Running => {
  switch (act.kind) {
    case 'taken':
      return { holder: act.by, openBag: undefined, taken: true };
    case 'hand-over':
      return { ...running, holder: act.to };
    case 'returned':
      return { ...running, holder: undefined };
    case 'bag-opened':
      return { ...running, openBag: act.bag };
    case 'bag-closed':
      return { ...running, openBag: undefined };
  }
};

/** A part's history by time, who holds it, and every gap in the chain. */
export const custodyOf = (tag: string, rows: readonly CustodyRow[]): Custody => {
  const own = rows
    .filter((row) => row.tag === tag)
    .sort((a, b) => Date.parse(a.at) - Date.parse(b.at) || (a.id < b.id ? -1 : 1));
  let running: Running = { holder: undefined, openBag: undefined, taken: false };
  const gaps: Gap[] = [];
  let after: string | undefined;
  for (const row of own) {
    const words = gapWords(running, row.act);
    if (words !== undefined) gaps.push({ after, before: row.id, words });
    running = next(running, row.act);
    after = row.id;
  }
  return { tag, rows: own, holder: running.holder, openBag: running.openBag, gaps };
};
