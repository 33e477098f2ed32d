import { createHash, randomBytes } from 'node:crypto';
import {
  closeSync,
  fsyncSync,
  mkdirSync,
  openSync,
  readFileSync,
  renameSync,
  writeSync,
} from 'node:fs';
import { dirname, join } from 'node:path';
import { fileURLToPath } from 'node:url';

/** The checkout's root folder. */
export const root = dirname(dirname(dirname(fileURLToPath(import.meta.url))));

/**
 * Writes a file whole or not at all, readable by its owner alone.
 *
 * @param {string} path
 * @param {string} content
 */
export function writePrivately(path, content) {
  mkdirSync(dirname(path), { recursive: true });
  const draft = join(dirname(path), `.${randomBytes(6).toString('hex')}.draft`);
  const file = openSync(draft, 'wx', 0o600);
  writeSync(file, content);
  fsyncSync(file);
  closeSync(file);
  renameSync(draft, path);
}

/**
 * @param {string} path
 * @returns {unknown} the file's JSON, or `undefined` when there is no such file
 */
export function readJson(path) {
  try {
    return JSON.parse(readFileSync(path, 'utf8'));
  } catch (error) {
    if (error instanceof Error && 'code' in error && error.code === 'ENOENT') return undefined;
    throw error;
  }
}

/** @param {string | Buffer} content */
export const sha256 = (content) => createHash('sha256').update(content).digest('hex');

/** A password of 192 random bits that needs no escaping in a URL. */
export const newSecret = () => randomBytes(24).toString('hex');
