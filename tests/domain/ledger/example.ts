import { createHash, createPrivateKey, createPublicKey, sign } from 'node:crypto';
import type { DrawCommitment } from '@/domain/draw/documents';
import { makeDraw } from '@/domain/draw/make-draw';
import { secretHash } from '@/domain/draw/seed';
import { toHex, utf8 } from '@/domain/ledger/bytes';
import { canonicalJson, type Json } from '@/domain/ledger/canonical';
import { chainHead } from '@/domain/ledger/chain';
import { originOf, signCheckpoint } from '@/domain/ledger/checkpoint';
import { commit } from '@/domain/ledger/commitment';
import { lineLeaf, lineText, type NewLine } from '@/domain/ledger/line';
import type { NoteSigner } from '@/domain/ledger/note/signed-note';
import { formatVerifierKey, verifierKey } from '@/domain/ledger/note/verifier-key';
import { fillPlan, planConsistency, planInclusion } from '@/domain/ledger/proof';
import type { Extension, LineProof } from '@/domain/ledger/verify/line-proof';
import { writeNoticeFile, writePdfFile } from '@/domain/ledger/verify/notice-file';
import { grow } from './grown-tree';

/** A small ledger from fixed seeds: the worked example of docs/record-format.md. */

export const seedOf = (label: string): Uint8Array =>
  Uint8Array.from(createHash('sha256').update(`record-format example: ${label}`).digest());

export const uuid = (label: string): string => {
  const hex = toHex(seedOf(label));
  return `${hex.slice(0, 8)}-${hex.slice(8, 12)}-7${hex.slice(13, 16)}-a${hex.slice(17, 20)}-${hex.slice(20, 32)}`;
};

/** An Ed25519 key of a fixed seed, signing with OpenSSL: other code than what verifies. */
export const testSigner = (name: string, label: string): NoteSigner => {
  const der = Buffer.concat([
    Buffer.from('302e020100300506032b657004220420', 'hex'),
    seedOf(label),
  ]);
  const privateKey = createPrivateKey({ key: der, format: 'der', type: 'pkcs8' });
  const spki = createPublicKey(privateKey).export({ format: 'der', type: 'spki' });
  return {
    key: verifierKey(name, Uint8Array.from(spki.subarray(-32))),
    sign: (message) => Uint8Array.from(sign(null, message, privateKey)),
  };
};

export const SERIES = uuid('series');
const EVENT = uuid('event');
const INSPECTION = uuid('inspection');
export const ORIGIN = originOf('records.example/ledger', SERIES);
export const signer = testSigner(ORIGIN, 'key');
const nextSigner = testSigner(ORIGIN, 'next key');
export const KEY = formatVerifierKey(signer.key);

export const commitments = (label: string, contents: Readonly<Record<string, string>>) =>
  Object.fromEntries(
    Object.entries(contents).map(([role, content]) => [
      role,
      toHex(commit(seedOf(`salt of ${label}`), utf8(content))),
    ]),
  );

export const saltOf = (label: string): string => toHex(seedOf(`salt of ${label}`));

const batches: readonly Json[] = [
  {
    v: '1',
    type: 'tagwire/batch',
    inspection: INSPECTION,
    act: uuid('batch 1'),
    rows: [{ bore: '3', valve: 'intake', value: '0.0018', unit: 'in' }],
  },
  {
    v: '1',
    type: 'tagwire/batch',
    inspection: INSPECTION,
    act: uuid('batch 2'),
    rows: [{ strikes: '1', reason: 'gauge moved' }],
  },
];

const drawSecret = seedOf('draw secret');

const drawCommitment: DrawCommitment = {
  v: '1',
  type: 'tagwire/draw-commitment',
  draw: uuid('draw'),
  series: SERIES,
  event: EVENT,
  subject: 'Street stock, cars 3rd and below',
  follows: '',
  pool: ['7', '12J', '21', '33', '40', '58', '64', '77', '81', '90X'].map((car, i) => ({
    number: String(i + 1),
    car,
  })),
  select: '2',
  secretHash: toHex(secretHash(drawSecret)),
  sessionAt: '2027-05-01T18:00:00.000Z',
  values: [
    {
      name: 'Fastest lap of the feature, every car that has one, thousandths of a second',
      ifMissing: 'left-out',
      substitute: '',
    },
    {
      name: 'Two dice thrown by a spectator at the fence',
      ifMissing: 'substitute',
      substitute: 'Laps led by the winner',
    },
  ],
};

const made = makeDraw(drawCommitment, drawSecret, [
  {
    name: 'Fastest lap of the feature, every car that has one, thousandths of a second',
    source: 'announced',
    numbers: ['21417', '21390', '21802', '22005'],
  },
  {
    name: 'Two dice thrown by a spectator at the fence',
    source: 'substitute',
    numbers: ['14'],
  },
]);
if (!made.ok) throw new Error(made.failure.detail);

const documents = {
  rulebook: { v: '1', type: 'example/rulebook', title: 'Street stock, edition 1' },
  report: { v: '1', type: 'example/report', findings: [{ clause: '4.2', finding: 'pass' }] },
  notice: {
    v: '1',
    type: 'example/notice',
    number: '2027-014',
    clause: '4.2',
    verdict: 'no breach',
    limit: { value: '0.8440', unit: 'in' },
  },
  key: { v: '1', type: 'tagwire/key', key: formatVerifierKey(nextSigner.key), replaces: KEY },
} as const;

export const text = {
  rulebook: canonicalJson(documents.rulebook),
  report: canonicalJson(documents.report),
  notice: canonicalJson(documents.notice),
  key: canonicalJson(documents.key),
  drawCommitment: canonicalJson(drawCommitment),
  drawMade: canonicalJson(made.value),
};

export const pdf = utf8('%PDF-1.7 stands for the bytes of a notice\n');

const line = (index: number, rest: Omit<NewLine, 'series' | 'index' | 'act' | 'at'>): string =>
  lineText({
    series: SERIES,
    index,
    act: uuid(`act ${index}`),
    at: `2027-05-01T1${index}:00:00.125Z`,
    ...rest,
  });

export const lines: readonly string[] = [
  line(0, {
    kind: 'rulebook-published',
    commitments: commitments('rulebook', { rulebook: text.rulebook }),
  }),
  line(1, {
    kind: 'draw-committed',
    commitments: commitments('draw', { draw: text.drawCommitment }),
  }),
  line(2, {
    kind: 'draw-made',
    commitments: commitments('result', { draw: text.drawMade }),
    refs: { committed: '1' },
  }),
  line(3, {
    kind: 'report-signed',
    commitments: commitments('report', { report: text.report }),
    refs: { chain: toHex(chainHead(INSPECTION, batches)) },
  }),
  line(4, {
    kind: 'verdict-published',
    commitments: commitments('notice', { notice: text.notice }),
  }),
  line(5, {
    kind: 'notice-pdf',
    commitments: { pdf: toHex(commit(seedOf('salt of pdf'), pdf)) },
    refs: { notice: '4' },
  }),
  line(6, { kind: 'key-published', commitments: commitments('key', { key: text.key }) }),
];

export const tree = grow(lines.length, lines.map(lineLeaf));

export const headAt = (
  size: number,
  by: readonly NoteSigner[] = [signer],
  time: { readonly signedAt?: string } = {},
): Promise<string> => signCheckpoint({ origin: ORIGIN, size, root: tree.root(size), ...time }, by);

/** Proves a line of any small ledger under a head of all its lines. */
export const proofIn = async (
  ledger: readonly string[],
  index: number,
  by: NoteSigner,
): Promise<LineProof> => {
  const grown = grow(ledger.length, ledger.map(lineLeaf));
  const head = { origin: by.key.name, size: ledger.length, root: grown.root(ledger.length) };
  return {
    line: ledger[index] ?? '',
    path: fillPlan(planInclusion(index, ledger.length), grown.read).map(toHex),
    checkpoint: await signCheckpoint(head, [by]),
  };
};

export const proofOf = async (
  index: number,
  size: number,
  by?: readonly NoteSigner[],
): Promise<LineProof> => ({
  line: lines[index] ?? '',
  path: fillPlan(planInclusion(index, size), tree.read).map(toHex),
  checkpoint: await headAt(size, by),
});

export const extensionOf = async (first: number, second: number): Promise<Extension> => ({
  path: fillPlan(planConsistency(first, second), tree.read).map(toHex),
  checkpoint: await headAt(second),
});

export const noticeFile = async (): Promise<string> =>
  writeNoticeFile({
    document: text.notice,
    role: 'notice',
    salt: saltOf('notice'),
    proof: await proofOf(4, 5),
    key: KEY,
  });

export const pdfFile = async (): Promise<string> =>
  writePdfFile({ salt: saltOf('pdf'), proof: await proofOf(5, 7) });

export const example = {
  inspection: INSPECTION,
  batches,
  nextSigner,
  drawSecret,
  drawCommitment,
  made: made.value,
};
