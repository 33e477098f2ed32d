import { mkdirSync } from 'node:fs';
import { open, readdir, readFile, rename } from 'node:fs/promises';
import { join } from 'node:path';
import type { HeadMemory } from '@/services/ports';

const UUID = /^([0-9a-f]{8}(?:-[0-9a-f]{4}){3}-[0-9a-f]{12})\.note$/;

/** One file a series, the signed note as it is; replaced as a whole, so that a power cut leaves one. */
export const openHeadMemory = (storageDir: string): HeadMemory => {
  const folder = join(storageDir, 'ledger-heads');
  mkdirSync(folder, { recursive: true, mode: 0o700 });
  const fileOf = (seriesId: string) => join(folder, `${seriesId}.note`);
  const read = async (seriesId: string) => {
    try {
      return await readFile(fileOf(seriesId), 'utf8');
    } catch (error) {
      if ((error as NodeJS.ErrnoException).code === 'ENOENT') return undefined;
      throw error;
    }
  };
  return {
    find: read,
    list: async () => {
      const names = await readdir(folder);
      const heads = [];
      for (const name of names.sort()) {
        const seriesId = UUID.exec(name)?.[1];
        const note = seriesId === undefined ? undefined : await read(seriesId);
        if (seriesId !== undefined && note !== undefined) heads.push({ seriesId, note });
      }
      return heads;
    },
    remember: async (seriesId, note) => {
      const unfinished = `${fileOf(seriesId)}.${process.pid}`;
      const file = await open(unfinished, 'w', 0o600);
      try {
        await file.writeFile(note);
        await file.sync();
      } finally {
        await file.close();
      }
      await rename(unfinished, fileOf(seriesId));
    },
    setAside: async (seriesId, word) => {
      await rename(fileOf(seriesId), join(folder, `${seriesId}.${word}`));
    },
  };
};
