import type { CapturesAnswer, CapturesRequest } from '@/contracts/inspection/captures';
import type { KeptAct, Sending } from './device-store';

/** What the sender needs of the device and of the network; tests put their own in. */
export interface SendDeps {
  readonly readWaiting: () => Promise<readonly KeptAct[]>;
  readonly changeActs: (
    seqs: readonly number[],
    change: (act: KeptAct) => KeptAct,
  ) => Promise<void>;
  readonly post: (inspectionId: string, body: CapturesRequest) => Promise<PostAnswer>;
  /** Brings a picture to the server; asked again, it brings the same one and nothing twice. */
  readonly sendPicture: (pictureId: string) => Promise<PictureAnswer>;
  /** A new act id, the clock's offset, and what this device makes of its rows. */
  readonly newSending: (inspectionId: string) => Sending;
}

export type PostAnswer =
  | { readonly kind: 'kept'; readonly answer: CapturesAnswer }
  /** Read and refused: sending the same again changes nothing. */
  | { readonly kind: 'refused'; readonly detail: string; readonly places: readonly string[] }
  | { readonly kind: 'sign-in' }
  /** No answer, or none that says what became of it. */
  | { readonly kind: 'unreachable' };

export type PictureAnswer =
  | { readonly kind: 'kept' | 'sign-in' | 'unreachable' }
  | { readonly kind: 'refused'; readonly detail: string };

export type SendOutcome = 'all-sent' | 'sign-in' | 'unreachable';

const MOST_ROWS = 60;

const seqsOf = (acts: readonly KeptAct[]): readonly number[] =>
  acts.flatMap(({ seq }) => (seq === undefined ? [] : [seq]));

/**
 * The next acts that go together: those of a sending already begun, else the oldest of one inspection.
 * Numbers go before pictures, so that no reading waits behind megabytes; each kind keeps its order.
 */
const nextActs = (kept: readonly KeptAct[], alone: ReadonlySet<number>): readonly KeptAct[] => {
  const numbers = kept.filter((act) => act.pictureId === undefined);
  const waiting = numbers.length > 0 ? numbers : kept;
  const [first] = waiting;
  if (first === undefined) return [];
  if (first.pictureId !== undefined) return [first];
  if (first.sending !== undefined)
    return waiting.filter((act) => act.sending?.act === first.sending?.act);
  if (first.seq !== undefined && alone.has(first.seq)) return [first];
  const taken: KeptAct[] = [];
  let rows = 0;
  for (const act of waiting) {
    const fits = rows === 0 || rows + act.rows.length <= MOST_ROWS;
    const other = act.inspectionId !== first.inspectionId || act.sending !== undefined;
    if (other || !fits || (act.seq !== undefined && alone.has(act.seq))) break;
    taken.push(act);
    rows += act.rows.length;
  }
  return taken;
};

/**
 * Sends what waits, in order, exactly once: before its first try a sending's id is written beside its
 * acts, so that any later try, after a crash too, is the same act to the server. A sending that is
 * refused is taken apart, so that one bad row holds up no other; the bad one stays, with the words.
 */
export const sendWaiting = async (deps: SendDeps): Promise<SendOutcome> => {
  const alone = new Set<number>();
  for (;;) {
    const waiting = await deps.readWaiting();
    const acts = nextActs(waiting, alone);
    const [first] = acts;
    if (first === undefined) return 'all-sent';
    if (first.pictureId !== undefined) {
      const brought = await deps.sendPicture(first.pictureId);
      if (brought.kind === 'sign-in' || brought.kind === 'unreachable') return brought.kind;
      if (brought.kind === 'refused') {
        const problem = brought.detail;
        await deps.changeActs(seqsOf(acts), (act) => ({ ...act, state: 'refused', problem }));
        continue;
      }
    }
    const sending = first.sending ?? deps.newSending(first.inspectionId);
    const seqs = seqsOf(acts);
    if (first.sending === undefined) await deps.changeActs(seqs, (act) => ({ ...act, sending }));
    const answer = await deps.post(first.inspectionId, {
      ...sending,
      rows: acts.flatMap((act) => [...act.rows]),
    });
    if (answer.kind === 'sign-in' || answer.kind === 'unreachable') return answer.kind;
    if (answer.kind === 'kept') {
      await deps.changeActs(seqs, (act) => ({ ...act, state: 'sent' }));
    } else if (acts.length > 1) {
      for (const seq of seqs) alone.add(seq);
      await deps.changeActs(seqs, (act) => ({ ...act, sending: undefined }));
    } else {
      const problem = [answer.detail, ...answer.places].join(' ');
      await deps.changeActs(seqs, (act) => ({ ...act, state: 'refused', problem }));
    }
  }
};
