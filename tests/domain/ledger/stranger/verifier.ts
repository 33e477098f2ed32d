import { createHash, createPublicKey, verify } from 'node:crypto';

/**
 * A verifier written from docs/record-format.md alone. It shares no code with the product and
 * uses nothing but the hash and signature functions of its runtime. Each function throws an
 * Error that says what does not hold.
 */

const sha256 = (...parts: readonly (string | Uint8Array)[]): Buffer => {
  const hash = createHash('sha256');
  for (const part of parts) hash.update(part);
  return hash.digest();
};

const demand = (holds: boolean, what: string): void => {
  if (!holds) throw new Error(what);
};

const hexOf = (text: string): Buffer => {
  demand(/^[0-9a-f]{64}$/.test(text), `not a hash: ${text}`);
  return Buffer.from(text, 'hex');
};

const base64Of = (text: string): Buffer => {
  const bytes = Buffer.from(text, 'base64');
  demand(bytes.toString('base64') === text, `not base64: ${text}`);
  return bytes;
};

export interface Head {
  readonly origin: string;
  readonly size: bigint;
  readonly root: Buffer;
  /** The instant at which it was signed; empty where the head says none. */
  readonly signedAt: string;
}

export interface Proof {
  readonly line: string;
  readonly path: readonly string[];
  readonly checkpoint: string;
}

interface Line {
  readonly v: string;
  readonly type: string;
  readonly series: string;
  readonly index: string;
  readonly kind: string;
  readonly at: string;
  readonly commitments: readonly { readonly role: string; readonly commitment: string }[];
  readonly refs: Readonly<Record<string, string>>;
}

/** "Signed heads" and "Keys". */
export const readHead = (note: string, verifierKey: string): Head => {
  const [name = '', id = ''] = verifierKey.split('+', 2);
  const typed = base64Of(verifierKey.slice(name.length + id.length + 2));
  demand(typed.length === 33 && typed[0] === 1, 'not an Ed25519 key');
  const expectedId = sha256(name, '\n', typed).subarray(0, 4);
  demand(expectedId.toString('hex') === id, 'the key id does not fit the key');
  demand(note.endsWith('\n'), 'the note is cut off');
  const cut = note.lastIndexOf('\n\n') + 1;
  const text = note.slice(0, cut);
  const prefix = `— ${name} `;
  const signatures = note
    .slice(cut + 1)
    .split('\n')
    .filter((line) => line.startsWith(prefix))
    .map((line) => base64Of(line.slice(prefix.length)))
    .filter((bytes) => bytes.subarray(0, 4).equals(expectedId));
  const spki = Buffer.concat([Buffer.from('302a300506032b6570032100', 'hex'), typed.subarray(1)]);
  const key = createPublicKey({ key: spki, format: 'der', type: 'spki' });
  demand(signatures.length > 0, 'not signed with this key');
  for (const bytes of signatures) {
    demand(verify(null, Buffer.from(text), key, bytes.subarray(4)), 'the signature is wrong');
  }
  const [origin = '', size = '', root = '', ...extensions] = text.slice(0, -1).split('\n');
  demand(origin === name, 'the key is another ledger’s');
  const times = extensions.filter((line) => line.startsWith('tagwire/signed-at '));
  const signedAt = (times[0] ?? '').slice('tagwire/signed-at '.length);
  demand(times.length <= 1, 'two times');
  demand(
    times.length === 0 || /^\d{4}-\d\d-\d\dT\d\d:\d\d:\d\d\.\d{3}Z$/.test(signedAt),
    'the time is no instant',
  );
  return { origin, size: BigInt(size), root: base64Of(root), signedAt };
};

const leaf = (line: string): Buffer => sha256(Uint8Array.of(0), line);
const inner = (left: Uint8Array, right: Uint8Array): Buffer =>
  sha256(Uint8Array.of(1), left, right);

/** "Inclusion", written from the recursion: the path's last hash is the sibling nearest the root. */
const rootFrom = (hash: Buffer, index: bigint, size: bigint, path: readonly Buffer[]): Buffer => {
  if (size === 1n) {
    demand(path.length === 0, 'the path is too long');
    return hash;
  }
  const sibling = path.at(-1);
  if (sibling === undefined) throw new Error('the path is too short');
  let k = 1n;
  while (k * 2n < size) k *= 2n;
  const rest = path.slice(0, -1);
  return index < k
    ? inner(rootFrom(hash, index, k, rest), sibling)
    : inner(sibling, rootFrom(hash, index - k, size - k, rest));
};

/** "Consistency", by the same recursion: gives the older and the newer root a path leads to. */
const rootsFrom = (
  older: Buffer,
  first: bigint,
  second: bigint,
  path: readonly Buffer[],
  whole: boolean,
): readonly [Buffer, Buffer] => {
  if (first === second) {
    const [only] = path;
    demand(path.length === (whole ? 0 : 1), 'the path has a wrong length');
    const hash = whole ? older : (only ?? older);
    return [hash, hash];
  }
  const sibling = path.at(-1);
  if (sibling === undefined) throw new Error('the path is too short');
  let k = 1n;
  while (k * 2n < second) k *= 2n;
  const rest = path.slice(0, -1);
  if (first <= k) {
    const [a, b] = rootsFrom(older, first, k, rest, whole);
    return [a, inner(b, sibling)];
  }
  const [a, b] = rootsFrom(older, first - k, second - k, rest, false);
  return [inner(sibling, a), inner(sibling, b)];
};

export const checkConsistency = (older: Head, newer: Head, path: readonly string[]): void => {
  demand(older.origin === newer.origin, 'two ledgers');
  demand(older.size > 0n && older.size <= newer.size, 'the newer head is smaller');
  const [a, b] = rootsFrom(older.root, older.size, newer.size, path.map(hexOf), true);
  demand(a.equals(older.root) && b.equals(newer.root), 'the history was rewritten');
};

/** "Lines" and "Inclusion". */
export const checkLine = (proof: Proof, verifierKey: string): Line => {
  const head = readHead(proof.checkpoint, verifierKey);
  const line = JSON.parse(proof.line) as Line;
  demand(line.v === '1' && line.type === 'tagwire/line', 'not a line of version 1');
  demand(head.origin.split('/').at(-1) === line.series, 'the line is of another series');
  const index = BigInt(line.index);
  demand(index >= 0n && index < head.size, 'the line is beyond the head');
  const root = rootFrom(leaf(proof.line), index, head.size, proof.path.map(hexOf));
  demand(root.equals(head.root), 'the line is not in the ledger');
  return line;
};

/** "Commitments". */
export const checkCommitment = (line: Line, role: string, salt: string, content: Buffer): void => {
  const entry = line.commitments.find((item) => item.role === role);
  if (entry === undefined) throw new Error(`the line has no ${role}`);
  const made = sha256('tagwire/commitment/1\0', hexOf(salt), sha256(content));
  demand(made.toString('hex') === entry.commitment, `the line commits to another ${role}`);
};

/** "Notices". Gives the notice's own text. */
export const checkNotice = (
  file: string,
  verifierKey: string,
): { line: Line; document: string } => {
  const { v, type, document, role, salt, proof, key } = JSON.parse(file) as {
    v: string;
    type: string;
    document: string;
    role: string;
    salt: string;
    proof: Proof;
    key: string;
  };
  demand(v === '1' && type === 'tagwire/notice', 'not a notice of version 1');
  demand(key === verifierKey, 'the notice names another key');
  const line = checkLine(proof, verifierKey);
  checkCommitment(line, role, salt, Buffer.from(document));
  return { line, document };
};

export const checkPdf = (pdf: Buffer, file: string, notice: Line, verifierKey: string): void => {
  const { type, salt, proof } = JSON.parse(file) as { type: string; salt: string; proof: Proof };
  demand(type === 'tagwire/notice-pdf', 'not the proof of a PDF');
  const line = checkLine(proof, verifierKey);
  demand(line.kind === 'notice-pdf' && line.refs['notice'] === notice.index, 'of another notice');
  checkCommitment(line, 'pdf', salt, pdf);
};

/** "Handing over a key". Gives the new verifier key. */
export const checkHandOver = (file: string, verifierKey: string): string => {
  const { document, salt, proof } = JSON.parse(file) as {
    document: string;
    salt: string;
    proof: Proof;
  };
  const line = checkLine(proof, verifierKey);
  demand(line.kind === 'key-published', 'not a hand-over');
  checkCommitment(line, 'key', salt, Buffer.from(document));
  const { key, replaces } = JSON.parse(document) as { key: string; replaces: string };
  demand(replaces === verifierKey, 'the hand-over replaces another key');
  return key;
};

/** "Chains of readings". */
export const chainHead = (inspection: string, batches: readonly string[]): string => {
  let head = sha256('tagwire/chain/1', Uint8Array.of(0), inspection);
  for (const batch of batches)
    head = sha256('tagwire/chain/1', Uint8Array.of(1), head, sha256(batch));
  return head.toString('hex');
};

interface Value {
  readonly name: string;
  readonly source: string;
  readonly numbers: readonly string[];
}

/** "Draws". Gives the cars in the order drawn. */
export const checkDraw = (announced: string, made: string): readonly string[] => {
  const a = JSON.parse(announced) as {
    draw: string;
    pool: readonly { number: string; car: string }[];
    select: string;
    secretHash: string;
    values: readonly { name: string; ifMissing: string; substitute: string }[];
  };
  const m = JSON.parse(made) as {
    draw: string;
    commitment: string;
    secret: string;
    values: readonly Value[];
    selected: readonly { number: string; car: string }[];
  };
  const commitment = sha256(announced);
  demand(m.commitment === commitment.toString('hex') && m.draw === a.draw, 'of another draw');
  const secret = hexOf(m.secret);
  const secretHash = sha256('tagwire/draw-secret/1\0', secret).toString('hex');
  demand(secretHash === a.secretHash, 'another secret');
  demand(m.values.length === a.values.length, 'other values');
  for (const [i, value] of m.values.entries()) {
    const plan = a.values[i];
    const missing = value.source === 'missing';
    demand(plan?.name === value.name, 'other values');
    demand(missing === (value.numbers.length === 0), 'a value is empty');
    demand(!missing || plan?.ifMissing === 'left-out', 'a value may not be left out');
    demand(
      ['announced', 'missing'].includes(value.source) ||
        (value.source === 'substitute' && plan?.ifMissing === 'substitute'),
      'a substitute was not announced',
    );
  }
  const byNumber = (x: string, y: string) => Number(BigInt(x) - BigInt(y));
  const values = m.values
    .map(
      ({ numbers }) =>
        `${[...numbers]
          .sort(byNumber)
          .map((n) => `${BigInt(n)}.`)
          .join('')}/`,
    )
    .join('');
  const seed = sha256('tagwire/draw-seed/1\0', commitment, secret, values);
  const left = [...a.pool];
  const drawn = [];
  for (let round = 0; round < Number(a.select); round++) {
    const counter = Uint8Array.of(round >> 8, round & 255);
    const digest = BigInt(`0x${sha256(counter, seed, counter).toString('hex')}`);
    drawn.push(...left.splice(Number(digest % BigInt(left.length)), 1));
  }
  demand(
    JSON.stringify(drawn.map(({ car }) => car)) ===
      JSON.stringify(m.selected.map(({ car }) => car)),
    'other cars',
  );
  return drawn.map(({ car }) => car);
};
