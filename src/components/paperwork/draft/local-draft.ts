import { type DBSchema, type IDBPDatabase, openDB } from 'idb';
import type { PaperworkDraft } from '@/domain/paperwork/draft';

/** A draft as this device has it. */
export interface LocalDraft {
  readonly paperworkId: string;
  readonly draft: PaperworkDraft;
  /** The server's version it was written on. */
  readonly version: number;
  /** The server's draft at that version; drafts kept by older pages have none. */
  readonly base?: PaperworkDraft | undefined;
  /** Whether the server has acknowledged it. */
  readonly sent: boolean;
  readonly at: string;
}

interface Schema extends DBSchema {
  drafts: { key: string; value: LocalDraft };
}

let opened: Promise<IDBPDatabase<Schema>> | undefined;

const open = (): Promise<IDBPDatabase<Schema>> => {
  opened ??= openDB<Schema>('tagwire-paperwork', 1, {
    upgrade: (database) => void database.createObjectStore('drafts', { keyPath: 'paperworkId' }),
    // Some browsers drop connections without a word: the next use opens anew.
    terminated: () => {
      opened = undefined;
    },
  });
  return opened;
};

const again = async <T>(work: () => Promise<T>): Promise<T> => {
  try {
    return await work();
  } catch {
    opened = undefined;
    return work();
  }
};

/** Written through to the disk before it resolves. */
export const keepLocalDraft = (draft: LocalDraft): Promise<void> =>
  again(async () => {
    const database = await open();
    const transaction = database.transaction('drafts', 'readwrite', { durability: 'strict' });
    await Promise.all([transaction.store.put(draft), transaction.done]);
  });

export const findLocalDraft = (paperworkId: string): Promise<LocalDraft | undefined> =>
  again(async () => (await open()).get('drafts', paperworkId));
