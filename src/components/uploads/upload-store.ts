import { type DBSchema, type IDBPDatabase, openDB } from 'idb';
import type { Upload } from './upload';

interface Schema extends DBSchema {
  uploads: { key: string; value: Upload; indexes: { 'by-group': string } };
  /** Apart, so that a change of state does not write the bytes again. */
  bytes: { key: string; value: { readonly id: string; readonly bytes: ArrayBuffer } };
}

const strict = { durability: 'strict' } as const;

let open: Promise<IDBPDatabase<Schema>> | undefined;

const connect = (): Promise<IDBPDatabase<Schema>> => {
  open ??= openDB<Schema>('tagwire-uploads', 1, {
    upgrade: (db) => {
      const uploads = db.createObjectStore('uploads', { keyPath: 'id' });
      uploads.createIndex('by-group', 'group');
      db.createObjectStore('bytes', { keyPath: 'id' });
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

const withStore = async <T>(run: (db: IDBPDatabase<Schema>) => Promise<T>): Promise<T> => {
  try {
    return await run(await connect());
  } catch (error) {
    if (error instanceof DOMException && error.name === 'QuotaExceededError') throw error;
    open = undefined;
    return run(await connect());
  }
};

/** Resolves when file and bytes are written through to the device; throws where there is no room. */
export const keepUpload = (upload: Upload, bytes: ArrayBuffer): Promise<void> =>
  withStore(async (db) => {
    const write = db.transaction(['uploads', 'bytes'], 'readwrite', strict);
    await Promise.all([
      write.objectStore('uploads').put(upload),
      write.objectStore('bytes').put({ id: upload.id, bytes }),
      write.done,
    ]);
  });

export const changeUpload = (id: string, change: Partial<Upload>): Promise<void> =>
  withStore(async (db) => {
    const write = db.transaction('uploads', 'readwrite', strict);
    const before = await write.store.get(id);
    if (before !== undefined) await write.store.put({ ...before, ...change });
    await write.done;
  });

/** Lets go of it: the server has it, or the person does not want it. */
export const forgetUpload = (id: string): Promise<void> =>
  withStore(async (db) => {
    const write = db.transaction(['uploads', 'bytes'], 'readwrite', strict);
    await Promise.all([
      write.objectStore('uploads').delete(id),
      write.objectStore('bytes').delete(id),
      write.done,
    ]);
  });

/** In the order in which they were added. */
export const readUploads = (group: string): Promise<readonly Upload[]> =>
  withStore(async (db) =>
    (await db.getAllFromIndex('uploads', 'by-group', group)).sort((a, b) => a.keptAt - b.keptAt),
  );

export const readBytes = (id: string): Promise<ArrayBuffer | undefined> =>
  withStore(async (db) => (await db.get('bytes', id))?.bytes);
