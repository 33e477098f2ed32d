// Verifies one draw from public data alone: node verify-draw.mjs <site> <series> <draw id>
// Written from docs/record-format.md; it shares no code with the product.
import { createHash, createPublicKey, verify } from 'node:crypto';

const [site, series, draw] = process.argv.slice(2);
const sha256 = (...parts) => {
  const hash = createHash('sha256');
  for (const part of parts) hash.update(part);
  return hash.digest();
};
const hex = (text) => {
  const bytes = Buffer.from(text, 'hex');
  if (bytes.toString('hex') !== text) throw new Error(`"${text}" is not spelled as hex`);
  return bytes;
};
const demand = (holds, what) => {
  if (!holds) throw new Error(`not so: ${what}`);
  console.log(`holds: ${what}`);
};
const ask = async (path) => {
  const answer = await fetch(`${site}/api/ledger/${series}/${path}`);
  if (!answer.ok) throw new Error(`${path}: ${answer.status}`);
  return answer.json();
};

const splitAt = (size) => {
  let k = 1;
  while (k * 2 < size) k *= 2;
  return k;
};
const rootOf = (leaf, index, size, path) => {
  if (size === 1) {
    if (path.length > 0) throw new Error('the path is too long');
    return leaf;
  }
  const last = path.at(-1);
  if (last === undefined) throw new Error('the path is too short');
  const k = splitAt(size);
  const rest = path.slice(0, -1);
  return index < k
    ? sha256(Buffer.from([1]), rootOf(leaf, index, k, rest), hex(last))
    : sha256(Buffer.from([1]), hex(last), rootOf(leaf, index - k, size - k, rest));
};

const readNote = (note, verifierKey) => {
  const [name, id, coded] = /^(.+)\+([0-9a-f]{8})\+(.+)$/.exec(verifierKey)?.slice(1) ?? [];
  const typed = Buffer.from(coded, 'base64');
  if (typed[0] !== 1 || typed.length !== 33) throw new Error('this is no Ed25519 key');
  if (sha256(name, '\n', typed).subarray(0, 4).toString('hex') !== id)
    throw new Error('the key has another id');
  const end = note.indexOf('\n\n') + 1;
  const [text, signatures] = [note.slice(0, end), note.slice(end + 1)];
  const [origin, size, root] = text.split('\n');
  const key = createPublicKey({
    key: Buffer.concat([hex('302a300506032b6570032100'), typed.subarray(1)]),
    format: 'der',
    type: 'spki',
  });
  const mine = signatures
    .split('\n')
    .filter((line) => line.startsWith(`— ${name} `))
    .map((line) => Buffer.from(line.split(' ')[2], 'base64'))
    .filter((bytes) => bytes.subarray(0, 4).toString('hex') === id);
  if (mine.length === 0 || origin !== name) throw new Error('the head is not signed by this key');
  for (const bytes of mine)
    if (!verify(null, Buffer.from(text), key, bytes.subarray(4)))
      throw new Error('the head’s signature is wrong');
  return { origin, size: Number(size), root: Buffer.from(root, 'base64') };
};

const lines = [];
for (;;) {
  const { lines: more } = await ask(`lines?from=${lines.length}&count=500`);
  lines.push(...more);
  if (more.length < 500) break;
}
const ofKind = (kinds) =>
  lines.flatMap(({ line, open }) => {
    const read = JSON.parse(line);
    if (!kinds.includes(read.kind)) return [];
    const content = open.find(({ role }) => role === 'draw');
    return content === undefined ? [] : [{ line, read, content }];
  });
const commits = ({ read, content }) => {
  const commitment = sha256(
    'tagwire/commitment/1\0',
    hex(content.salt),
    sha256(content.content),
  ).toString('hex');
  return read.commitments.some((one) => one.role === 'draw' && one.commitment === commitment);
};
const about = ({ content }) => JSON.parse(content.content).draw === draw;

const announcements = ofKind(['draw-committed']).filter(about);
const ends = ofKind(['draw-made', 'draw-void']).filter(about);
demand(announcements.length === 1, 'the draw was announced once');
demand(ends.length === 1 && ends[0].read.kind === 'draw-made', 'it has one end, and was made');
const [first] = announcements;
const [end] = ends;
demand(commits(first) && commits(end), 'announcement and result are what their lines commit to');

const { current } = await ask('keys');
const { checkpoint } = await ask(`inclusion?index=${end.read.index}`);
const head = readNote(checkpoint, current);
demand(head.origin.split('/').at(-1) === first.read.series, 'the signed head is of this series');
for (const { line, read } of [first, end]) {
  const { path } = await ask(`inclusion?index=${read.index}&size=${head.size}`);
  const root = rootOf(sha256(Buffer.from([0]), line), Number(read.index), head.size, path);
  demand(root.equals(head.root), `line ${read.index} stands under the signed head of ${head.size}`);
}

const announced = JSON.parse(first.content.content);
const made = JSON.parse(end.content.content);
demand(
  Number(first.read.index) < Number(end.read.index) && first.read.at < announced.sessionAt,
  'it was logged before the session',
);
demand(end.read.at >= announced.sessionAt, 'it was made after the session began');
const places = announced.pool.map(({ number }) => number);
demand(
  places.every((place, at) => place === String(at + 1)) &&
    new Set(announced.pool.map(({ car }) => car)).size === places.length,
  `the pool is numbered from 1 to ${places.length}, no car twice`,
);
if (announced.follows !== '')
  demand(
    ofKind(['draw-void']).some(
      (one) =>
        commits(one) &&
        sha256(one.content.content).toString('hex') === announced.follows &&
        Number(one.read.index) < Number(first.read.index),
    ),
    'the draw it follows was declared void before',
  );
const commitment = sha256(first.content.content);
demand(made.commitment === commitment.toString('hex'), 'the result names this announcement');
const secret = hex(made.secret);
demand(
  secret.length === 32 &&
    sha256('tagwire/draw-secret/1\0', secret).toString('hex') === announced.secretHash,
  'the secret is the one that was locked away',
);
demand(
  announced.values.map(({ name }) => name).join('\n') ===
    made.values.map(({ name }) => name).join('\n') &&
    made.values.every(({ source }, at) => {
      const { ifMissing } = announced.values[at];
      return (
        source === 'announced' ||
        (source === 'substitute' && ifMissing === 'substitute') ||
        (source === 'missing' && ifMissing === 'left-out')
      );
    }),
  'the values are those announced, and what is missing was dealt with as announced',
);
const valuesText = made.values
  .map(({ numbers }) =>
    [...numbers.map(BigInt)]
      .sort((a, b) => (a < b ? -1 : a > b ? 1 : 0))
      .map((n) => `${n}.`)
      .concat('/')
      .join(''),
  )
  .join('');
const seed = sha256('tagwire/draw-seed/1\0', commitment, secret, valuesText);
const left = [...announced.pool];
const drawn = [];
for (let round = 0; round < Number(announced.select); round += 1) {
  const counter = Buffer.from([round >> 8, round & 255]);
  const digest = BigInt(`0x${sha256(counter, seed, counter).toString('hex')}`);
  drawn.push(...left.splice(Number(digest % BigInt(left.length)), 1));
}
demand(
  made.selected.map(({ car, number }) => `${number} ${car}`).join() ===
    drawn.map(({ car, number }) => `${number} ${car}`).join(),
  'the same cars come out',
);
console.log(`verified: ${drawn.map(({ car }) => car).join(', ')}`);
