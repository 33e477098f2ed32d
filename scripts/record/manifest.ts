import { createHash } from 'node:crypto';
import { createReadStream, existsSync, readFileSync, statSync, writeFileSync } from 'node:fs';
import { join } from 'node:path';
import * as z from 'zod';

const file = z.strictObject({ file: z.string(), sha256: z.string(), bytes: z.number() });

const shape = z.strictObject({
  v: z.literal('1'),
  type: z.literal('tagwire/backup'),
  madeAt: z.string(),
  database: file,
  objects: z.array(z.strictObject({ ...file.shape, key: z.string(), type: z.string() })),
  /** The newest signed head of every series in the database. */
  heads: z.array(z.strictObject({ series: z.string(), note: z.string() })),
});

export type Manifest = z.infer<typeof shape>;

const NAME = 'manifest.json';
const SUM = 'manifest.sha256';

export const sha256File = async (path: string): Promise<string> => {
  const hash = createHash('sha256');
  for await (const part of createReadStream(path)) hash.update(part as Buffer);
  return hash.digest('hex');
};

export const writeManifest = (folder: string, manifest: Manifest): string => {
  const text = `${JSON.stringify(manifest, null, 2)}\n`;
  const sum = createHash('sha256').update(text).digest('hex');
  writeFileSync(join(folder, NAME), text);
  writeFileSync(join(folder, SUM), `${sum}  ${NAME}\n`);
  return sum;
};

/** Reads a backup's manifest and compares every file with it. Throws on the first thing amiss. */
export const readBackup = async (folder: string): Promise<Manifest> => {
  const at = join(folder, NAME);
  if (!existsSync(at) || !existsSync(join(folder, SUM)))
    throw new Error(`${folder} holds no whole backup: ${NAME} or ${SUM} is missing.`);
  const wanted = readFileSync(join(folder, SUM), 'utf8').slice(0, 64);
  if ((await sha256File(at)) !== wanted) throw new Error(`The backup is damaged: ${NAME}.`);
  const manifest = shape.parse(JSON.parse(readFileSync(at, 'utf8')));
  for (const { file: name, sha256, bytes } of [manifest.database, ...manifest.objects]) {
    const path = join(folder, name);
    const whole =
      existsSync(path) && statSync(path).size === bytes && (await sha256File(path)) === sha256;
    if (!whole) throw new Error(`The backup is damaged or not whole: ${name}.`);
  }
  return manifest;
};
