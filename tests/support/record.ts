import { createHash, createPrivateKey, createPublicKey, sign } from 'node:crypto';
import type { Actor } from '@/domain/access/permission';
import { originOf, peekCheckpoint } from '@/domain/ledger/checkpoint';
import type { NoteSigner } from '@/domain/ledger/note/signed-note';
import { verifierKey } from '@/domain/ledger/note/verifier-key';
import { ok } from '@/domain/result';
import { performAct } from '@/services/act/perform-act';
import { signCheckpoint } from '@/services/ledger/checkpoint/sign-checkpoint';
import { watchRecord } from '@/services/ledger/restore/watch-record';
import type { HeadMemory, LedgerKeys, Ports } from '@/services/ports';
import { openWorld, type World } from './world';

/** An Ed25519 key of a fixed seed, for one ledger's name. */
export const signerFrom = (label: string, origin: string): NoteSigner => {
  const seed = createHash('sha256').update(`test key: ${label}`).digest();
  const der = Buffer.concat([Buffer.from('302e020100300506032b657004220420', 'hex'), seed]);
  const privateKey = createPrivateKey({ key: der, format: 'der', type: 'pkcs8' });
  const spki = createPublicKey(privateKey).export({ format: 'der', type: 'spki' });
  return {
    key: verifierKey(origin, Uint8Array.from(spki.subarray(-32))),
    sign: (message) => Uint8Array.from(sign(null, message, privateKey)),
  };
};

/** The keys of an installation, to be changed as a test goes on. */
export class FakeKeys implements LedgerKeys {
  constructor(
    public current = 'first',
    public previous?: string,
  ) {}
  signer(seriesId: string): NoteSigner {
    return signerFrom(this.current, originOf('tagwire', seriesId));
  }
  findPrevious(seriesId: string): NoteSigner | undefined {
    return this.previous === undefined
      ? undefined
      : signerFrom(this.previous, originOf('tagwire', seriesId));
  }
}

export class FakeHeads implements HeadMemory {
  readonly notes = new Map<string, string>();
  async find(seriesId: string) {
    return this.notes.get(seriesId);
  }
  async list() {
    return [...this.notes].map(([seriesId, note]) => ({ seriesId, note }));
  }
  async remember(seriesId: string, note: string) {
    this.notes.set(seriesId, note);
  }
  async setAside(seriesId: string) {
    this.notes.delete(seriesId);
  }
}

export interface RecordWorld extends World {
  readonly keys: FakeKeys;
  readonly heads: FakeHeads;
  /** A process that begins now: what it believes of the record is its own. */
  newProcess(): () => Ports;
}

/** A world that signs heads and remembers them. */
export const openRecordWorld = async (fixed: Partial<Ports> = {}): Promise<RecordWorld> => {
  const keys = new FakeKeys();
  const heads = new FakeHeads();
  const world = await openWorld({ ...fixed, keys, heads });
  const newProcess = () => {
    const recordState = watchRecord(() => ({ db: world.orm.em.fork(), heads }));
    return () => world.ports({ recordState });
  };
  return { ...world, keys, heads, newProcess };
};

/** Writes a line by an act of its own; gives the line's number. */
export const writeLine = async (
  ports: Ports,
  seriesId: string,
  content: string,
  actor: Actor | null = null,
) => {
  const id = ports.random.uuid();
  const text = JSON.stringify(content);
  const done = await performAct(
    ports,
    actor,
    { id, kind: 'test-act', seriesId, input: { content } },
    async ({ line }) => {
      line({
        seriesId,
        kind: 'cars-selected',
        contents: { cars: { text, open: true }, reasons: { text: '"kept"', open: false } },
      });
      return ok(null);
    },
  );
  if (!done.ok) return done;
  const [row] = await ports.db.execute<{ index: string }[]>(
    'select index from record.ledger_line where series_id = ? and act_id = ?',
    [seriesId, id],
  );
  return ok(Number(row?.index));
};

/** Signs the head as it stands, as the job does; gives the note. */
export const signNow = async (ports: Ports, seriesId: string): Promise<string> => {
  await signCheckpoint(ports, { seriesId });
  const [row] = await ports.db.execute<{ note: string }[]>(
    'select note from record.checkpoint where series_id = ? order by size desc limit 1',
    [seriesId],
  );
  if (row === undefined) throw new Error('Nothing was signed.');
  return row.note;
};

export const sizeOf = (note: string): number => {
  const head = peekCheckpoint(note);
  if (!head.ok) throw new Error(head.failure.detail);
  return head.value.size;
};
