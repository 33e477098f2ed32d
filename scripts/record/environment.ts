import { existsSync, readFileSync } from 'node:fs';
import { join, resolve } from 'node:path';
import { type Config, readConfig } from '@/config';
import { root } from '../set-up/files.mjs';

export interface Installation {
  readonly config: Config;
  /** The migrating role's address; only a backup or a restore needs it. */
  readonly ownerUrl: string;
}

/**
 * The installation that the environment names, or else the one that `npm start` runs or ran here.
 * Throws when there is neither.
 */
export const openInstallation = (): Installation => {
  const home = resolve(process.env['STORAGE_DIR'] || join(root, 'storage'));
  const word = join(home, 'product.json');
  const local =
    process.env['DATABASE_URL'] === undefined && existsSync(word)
      ? (JSON.parse(readFileSync(word, 'utf8')) as {
          env: Record<string, string>;
          appUrl: string;
          ownerUrl: string;
        })
      : undefined;
  const env = { ...local?.env, ...(local && { DATABASE_URL: local.appUrl }), ...process.env };
  return {
    config: readConfig(env),
    ownerUrl: process.env['MIGRATION_DATABASE_URL'] ?? local?.ownerUrl ?? '',
  };
};
