import type { EntityManager } from '@mikro-orm/postgresql';
import type { Ports } from '../../ports';

/**
 * Waits for whoever else names or removes objects of this content, and keeps them waiting to the end
 * of the transaction: objects are kept once under their hash, whoever handed them in.
 */
export const lockContent = async (em: EntityManager, hash: string): Promise<void> => {
  await em.execute('select pg_advisory_xact_lock(hashtextextended(?, 1))', [hash]);
};

/** Before a row names an object: it is there, and no erasure removes it until the row can be seen. */
export const holdObject = async (
  { objects }: Pick<Ports, 'objects'>,
  em: EntityManager,
  object: {
    /** Hexadecimal SHA-256 of the bytes. */
    readonly hash: string;
    readonly key: string;
    readonly bytes: Uint8Array;
    readonly type: string;
  },
): Promise<void> => {
  await lockContent(em, object.hash);
  if ((await objects.findHead(object.key)) === undefined)
    await objects.write(object.key, object.bytes, object.type);
};
