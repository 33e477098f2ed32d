import { type DBSchema, type IDBPDatabase, openDB } from 'idb';
import type { CapturesRequest } from '@/contracts/inspection/captures';
import type { SentRow } from '@/contracts/inspection/rows';

/** What goes with a sending's rows; a repeat must say the very same. */
export type Sending = Pick<CapturesRequest, 'act' | 'clockOffsetMs' | 'tablet'>;

/** One act of the hand: a reading, a strike, an answer. Kept on the device before anything else. */
export interface KeptAct {
  /** Order on this device, given by it. */
  readonly seq?: number;
  readonly inspectionId: string;
  readonly rows: readonly SentRow[];
  /** The sending it belongs to, once one was made: the same content under the same act id for good. */
  readonly sending?: Sending | undefined;
  readonly state: 'waiting' | 'sent' | 'refused';
  /** What the server said, where it refused. */
  readonly problem?: string | undefined;
  /** Instant by the device's clock. */
  readonly keptAt: number;
  /** The picture that its rows name: it goes to the server before them. */
  readonly pictureId?: string | undefined;
}

/** A photograph on its way; every try sends it under the same ids. Bytes, as some stores lose blobs. */
export interface KeptPicture {
  readonly fileId: string;
  readonly inspectionId: string;
  readonly name: string;
  readonly type: string;
  readonly bytes: ArrayBuffer;
  /** What it shows: the bore's name. */
  readonly item: string;
  readonly announceAct: string;
  readonly confirmAct: string;
}

interface Schema extends DBSchema {
  acts: { key: number; value: KeptAct; indexes: { 'by-inspection': string } };
  /** Where the inspector stands on each inspection's sheet, and how it is set up. */
  places: { key: string; value: { readonly inspectionId: string; readonly place: unknown } };
  pictures: { key: string; value: KeptPicture; indexes: { 'by-inspection': string } };
}

const NAME = 'tagwire-bay';

let open: Promise<IDBPDatabase<Schema>> | undefined;

const connect = (): Promise<IDBPDatabase<Schema>> => {
  open ??= openDB<Schema>(NAME, 2, {
    upgrade: (db, from) => {
      if (from < 2) {
        const pictures = db.createObjectStore('pictures', { keyPath: 'fileId' });
        pictures.createIndex('by-inspection', 'inspectionId');
      }
      if (from >= 1) return;
      const acts = db.createObjectStore('acts', { keyPath: 'seq', autoIncrement: true });
      acts.createIndex('by-inspection', 'inspectionId');
      db.createObjectStore('places', { keyPath: 'inspectionId' });
    },
    // A page of an older version in another tab would hold up the new one for good.
    blocking: (_current, _next, event) => {
      (event.target as IDBDatabase).close();
      open = undefined;
    },
    // Some browsers drop the connection without a word: the next use opens it anew.
    terminated: () => {
      open = undefined;
    },
  });
  open.catch(() => {
    open = undefined;
  });
  return open;
};

/** Runs on the store; once more on a new connection when the first was lost. */
export const withStore = async <T>(run: (db: IDBPDatabase<Schema>) => Promise<T>): Promise<T> => {
  try {
    return await run(await connect());
  } catch {
    open = undefined;
    return run(await connect());
  }
};

export const strict = { durability: 'strict' } as const;

/**
 * Keeps an act, with where its hand goes on to, both or neither; resolves when it is written through to
 * the device.
 */
export const keepAct = (act: Omit<KeptAct, 'seq' | 'state'>, place?: unknown): Promise<void> =>
  withStore(async (db) => {
    const change = db.transaction(['acts', 'places'], 'readwrite', strict);
    await change.objectStore('acts').add({ ...act, state: 'waiting' });
    const { inspectionId } = act;
    if (place !== undefined) await change.objectStore('places').put({ inspectionId, place });
    await change.done;
  });

export const readActs = (inspectionId: string): Promise<readonly KeptAct[]> =>
  withStore((db) => db.getAllFromIndex('acts', 'by-inspection', inspectionId));

/** Every act of any inspection that still has to go, in the order in which it was kept. */
export const readWaiting = (): Promise<readonly KeptAct[]> =>
  withStore(async (db) => (await db.getAll('acts')).filter((act) => act.state === 'waiting'));

/** Writes what became of acts, all or none. */
export const changeActs = (
  seqs: readonly number[],
  change: (act: KeptAct) => KeptAct,
): Promise<void> =>
  withStore(async (db) => {
    const write = db.transaction('acts', 'readwrite', strict);
    for (const seq of seqs) {
      const act = await write.store.get(seq);
      if (act !== undefined) await write.store.put(change(act));
    }
    await write.done;
  });

/** Lets go of sent acts whose rows the server has shown to have, and of their pictures. */
export const forgetActs = (acts: readonly KeptAct[]): Promise<void> =>
  withStore(async (db) => {
    const write = db.transaction(['acts', 'pictures'], 'readwrite');
    for (const { seq, pictureId } of acts) {
      if (seq !== undefined) await write.objectStore('acts').delete(seq);
      if (pictureId !== undefined) await write.objectStore('pictures').delete(pictureId);
    }
    await write.done;
  });

export const readPlace = <P>(inspectionId: string): Promise<P | undefined> =>
  withStore(async (db) => (await db.get('places', inspectionId))?.place as P | undefined);

export const keepPlace = (inspectionId: string, place: unknown): Promise<void> =>
  withStore(async (db) => {
    await db.put('places', { inspectionId, place });
  });
