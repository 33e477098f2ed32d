import { type BoreLayout, boreName, positionsOf } from '../../tappet/layout/bore-layout';
import { inTakingOrder, positionKey, type RemarkRow } from '../capture/rows';

/** One lifter, named by the bore that it came out of. */
export interface RackedLifter {
  readonly lifter: string;
  readonly state: 'in-engine' | 'racked' | 'returned';
  /** The bore that it went into again. */
  readonly into?: string | undefined;
}

/** Where every lifter is: the last thing said of each. */
export const rackOf = (
  layout: BoreLayout,
  remarks: readonly RemarkRow[],
): readonly RackedLifter[] => {
  const last = new Map<string, RackedLifter>();
  for (const { kind, place, subject, standing } of inTakingOrder(remarks)) {
    if (standing !== 'accepted') continue;
    const at = positionKey(place, 'bore');
    if (kind === 'lifter-out') last.set(at, { lifter: at, state: 'racked' });
    if (kind === 'lifter-in') last.set(subject, { lifter: subject, state: 'returned', into: at });
  }
  return positionsOf(layout)
    .map(boreName)
    .map((lifter): RackedLifter => last.get(lifter) ?? { lifter, state: 'in-engine' });
};

export interface Order {
  readonly kept: boolean;
  /** Lifters that went into another bore than their own. */
  readonly changed: readonly RackedLifter[];
  readonly racked: readonly string[];
  /** Bores into which more than one lifter was said to go. */
  readonly twice: readonly string[];
}

export const orderOf = (rack: readonly RackedLifter[]): Order => {
  const changed = rack.filter(({ lifter, into }) => into !== undefined && into !== lifter);
  const racked = rack.flatMap(({ lifter, state }) => (state === 'racked' ? [lifter] : []));
  const full = rack.flatMap(({ lifter, state, into }) =>
    state === 'in-engine' ? [lifter] : (into ?? []),
  );
  const twice = [...new Set(full.filter((bore, at) => full.indexOf(bore) !== at))];
  return { kept: changed.length === 0 && racked.length === 0, changed, racked, twice };
};

/** The order in words: "1 intake into 3 exhaust". */
export const orderWords = ({ changed }: Order): string =>
  changed.map(({ lifter, into }) => `${lifter} into ${into}`).join(', ');

/** The lifters' return as it was signed for. */
export interface SignedReturn {
  readonly signedBy: string;
  readonly order: 'kept' | 'changed';
  readonly words: string;
  readonly takenBy: string;
  readonly at: string;
  /** A lifter moved after the signature. */
  readonly outdated: boolean;
}

export const signedReturnOf = (remarks: readonly RemarkRow[]): SignedReturn | undefined => {
  const rows = inTakingOrder(remarks).filter(({ standing }) => standing === 'accepted');
  const at = rows.findLastIndex(({ kind }) => kind === 'lifters-returned');
  const row = rows[at];
  if (row === undefined) return undefined;
  return {
    signedBy: row.subject,
    order: row.answer.value === 'kept' ? 'kept' : 'changed',
    words: row.reason,
    takenBy: row.takenBy,
    at: row.occurredAt,
    outdated: rows.slice(at + 1).some(({ kind }) => kind === 'lifter-out' || kind === 'lifter-in'),
  };
};

/** Of a lifter that has run. Common practice. */
export const OTHER_LOBE =
  'A flat tappet that has run stays with its own lobe. On another it can stop rotating and ruin lifter and cam.';
