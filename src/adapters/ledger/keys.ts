import { createPrivateKey, createPublicKey, type KeyObject, sign } from 'node:crypto';
import { readFileSync } from 'node:fs';
import { originOf } from '@/domain/ledger/checkpoint';
import type { NoteSigner } from '@/domain/ledger/note/signed-note';
import { isKeyName, verifierKey } from '@/domain/ledger/note/verifier-key';
import type { LedgerKeys } from '@/services/ports';

const readKey = (file: string): KeyObject => {
  const key = createPrivateKey(readFileSync(file));
  if (key.asymmetricKeyType !== 'ed25519') throw new Error(`${file} holds no Ed25519 key.`);
  return key;
};

const signerOf = (origin: string, key: KeyObject): NoteSigner => {
  const spki = createPublicKey(key).export({ format: 'der', type: 'spki' });
  return {
    key: verifierKey(origin, Uint8Array.from(spki.subarray(-32))),
    sign: (message) => Uint8Array.from(sign(null, message, key)),
  };
};

/**
 * The keys that sign the ledgers' heads, from files outside the database; one file serves every
 * series, whose id is part of the name it signs under.
 *
 * @throws Error when a file is missing or holds another kind of key
 */
export const openLedgerKeys = (files: {
  readonly name: string;
  readonly current: string;
  /** The key that hands over to the current one, while it does. */
  readonly previous?: string | undefined;
}): LedgerKeys => {
  if (!isKeyName(files.name)) throw new Error('LEDGER_NAME has no space and no plus.');
  const current = readKey(files.current);
  const previous = files.previous === undefined ? undefined : readKey(files.previous);
  return {
    signer: (seriesId) => signerOf(originOf(files.name, seriesId), current),
    findPrevious: (seriesId) =>
      previous === undefined ? undefined : signerOf(originOf(files.name, seriesId), previous),
  };
};
