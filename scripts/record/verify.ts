import { readFileSync } from 'node:fs';
import { MOST_BYTES } from '@/components/verify/find-attachment';
import type { Report } from '@/components/verify/report';
import { askServer, checkBytes, checkNumber } from '@/components/verify/run-check';
import { readArguments, run } from './arguments';

const usage = `usage: npm run verify -- <file or address> [--key <verifier key> | --key-file <file>] [--server <address>]
  A notice's PDF, the file in it, a case file, or the address of one of them or of a notice's page.
  --key, --key-file  the series' key as you got it elsewhere; nothing else is trusted
  --server           whom to ask for the PDF's line and for newer heads, where a file is given
  Ends with 0: all holds; 1: something does not; 2: not everything could be checked.`;

const codes = { passed: 0, failed: 1, 'not checked': 2 } as const;
const signs = {
  passed: 'holds      ',
  failed: 'DOES NOT   ',
  'not checked': 'not checked',
} as const;

const fetchBytes = async (url: URL): Promise<Uint8Array> => {
  const response = await fetch(url);
  if (!response.ok) throw new Error(`${url.href} answers ${response.status}.`);
  const bytes = new Uint8Array(await response.arrayBuffer());
  if (bytes.length > MOST_BYTES) throw new Error('This file is too large to be a notice.');
  return bytes;
};

const check = async (target: string, pinned: string, server?: string): Promise<Report> => {
  if (!/^https?:\/\//.test(target)) {
    const ask = server === undefined ? async () => undefined : askServer(new URL(server).origin);
    return checkBytes(new Uint8Array(readFileSync(target)), pinned, ask);
  }
  const url = new URL(target);
  const ask = askServer(url.origin);
  const [, slug, number] = /^\/series\/([^/]+)\/verdicts\/([^/.]+)\/?$/.exec(url.pathname) ?? [];
  if (slug !== undefined && number !== undefined) {
    return checkNumber(decodeURIComponent(slug), decodeURIComponent(number), pinned, ask);
  }
  return checkBytes(await fetchBytes(url), pinned, ask);
};

const print = (report: Report, pinned: string): number => {
  for (const { outcome, checked, found } of report.steps) {
    console.info(`${signs[outcome]}  ${checked}\n             ${found}`);
  }
  console.info(`\n${report.headline}`);
  for (const sentence of report.says) console.info(`  ${sentence}`);
  if (pinned !== '' || report.outcome === 'failed') return codes[report.outcome];
  const [first = ''] = report.keys;
  console.info(
    first === ''
      ? '\nNo key was given (--key), so nothing says whose signature this is.'
      : `\nThe key was taken from where the rest came from; compare it with one you got elsewhere, then give it:\n  --key '${first}'`,
  );
  return codes['not checked'];
};

await run(usage, async () => {
  const { files, flags } = readArguments(['key', 'key-file', 'server']);
  const [target] = files;
  if (target === undefined || files.length > 1) throw new Error('Give one file or address.');
  const keyFile = flags['key-file'];
  const pinned = flags['key'] ?? (keyFile === undefined ? '' : readFileSync(keyFile, 'utf8'));
  return print(await check(target, pinned.trim(), flags['server']), pinned.trim());
});
