import type { EntityManager } from '@mikro-orm/postgresql';
import { findHex, sha256, toHex, utf8 } from '@/domain/ledger/bytes';
import { opens } from '@/domain/ledger/commitment';
import { type Line, lineLeaf, parseLine } from '@/domain/ledger/line';
import { appendLeaf, EMPTY, type Frontier, rootOf } from '@/domain/ledger/tree';
import { type AuditFault, faultIn } from './fault';

const BLOCK = 2000;
const inLine = faultIn('record.ledger_line');
const inNode = faultIn('record.ledger_node');

interface LineRow {
  readonly index: string;
  readonly kind: string;
  readonly line: string;
  readonly leaf: string;
  readonly act: string | null;
}

interface ContentRow {
  readonly index: string;
  readonly role: string;
  readonly salt: string | null;
  readonly content: string | null;
}

export interface AuditedLines {
  readonly faults: readonly AuditFault[];
  readonly size: number;
  /** The lines that can be read, by their number. */
  readonly lines: ReadonlyMap<number, Line>;
  /** Root over the first n lines, for each n asked for and reached. */
  readonly roots: ReadonlyMap<number, string>;
}

const lineFaults = (row: LineRow, at: number, seriesId: string): readonly AuditFault[] => {
  const what = `line ${row.index}`;
  const parsed = parseLine(row.line);
  const faults: AuditFault[] = [];
  const when = (wrong: boolean, words: string) => wrong && faults.push(inLine(what, words));
  when(Number(row.index) !== at, `Line ${at} is missing.`);
  if (!parsed.ok) return [...faults, inLine(what, 'The text is no line of the ledger.')];
  const { series, index, kind, act } = parsed.value;
  when(series !== seriesId || index !== row.index, 'The text names another place than its own.');
  when(kind !== row.kind, `The text says ${kind}, the column ${row.kind}.`);
  when(act !== row.act, 'The text names another act than the column.');
  when(toHex(lineLeaf(row.line)) !== row.leaf, 'The text does not give the kept hash.');
  return faults;
};

const nodeFaults = async (
  em: EntityManager,
  seriesId: string,
  nodes: ReadonlyMap<string, string>,
): Promise<readonly AuditFault[]> => {
  const kept = await em.execute<{ at: string; hash: string }[]>(
    `select level || '/' || index as at, encode(hash, 'hex') as hash
     from record.ledger_node where series_id = ?`,
    [seriesId],
  );
  const faults = kept.flatMap(({ at, hash }) =>
    nodes.get(at) === hash
      ? []
      : [inNode(at, 'The subtree’s hash does not follow from the lines.')],
  );
  const known = new Set(kept.map(({ at }) => at));
  for (const at of nodes.keys())
    if (!known.has(at)) faults.push(inNode(at, 'The subtree is missing.'));
  return faults;
};

/** Reads every line in order and grows the tree anew beside the kept one. */
export const auditLines = async (
  em: EntityManager,
  seriesId: string,
  sizes: ReadonlySet<number>,
): Promise<AuditedLines> => {
  const faults: AuditFault[] = [];
  const lines = new Map<number, Line>();
  const roots = new Map<number, string>();
  const nodes = new Map<string, string>();
  let frontier: Frontier = EMPTY;
  for (let next = -1; ; ) {
    const rows = await em.execute<LineRow[]>(
      `select index, kind, line, encode(leaf_hash, 'hex') as leaf, act_id as act
       from record.ledger_line where series_id = ? and index > ? order by index limit ${BLOCK}`,
      [seriesId, next],
    );
    for (const row of rows) {
      faults.push(...lineFaults(row, frontier.size, seriesId));
      const parsed = parseLine(row.line);
      if (parsed.ok) lines.set(Number(row.index), parsed.value);
      const grown = appendLeaf(frontier, lineLeaf(row.line));
      frontier = grown.frontier;
      for (const { level, index, hash } of grown.nodes) nodes.set(`${level}/${index}`, toHex(hash));
      if (sizes.has(frontier.size)) roots.set(frontier.size, toHex(rootOf(frontier)));
      next = Number(row.index);
    }
    if (rows.length < BLOCK) break;
  }
  const [head] = await em.execute<{ size: string }[]>(
    'select size from record.ledger_head where series_id = ?',
    [seriesId],
  );
  if (Number(head?.size) !== frontier.size) {
    const words = `The head says ${head?.size ?? 'nothing'}, there are ${frontier.size} lines.`;
    faults.push(faultIn('record.ledger_head or record.ledger_line')('size', words));
  }
  faults.push(...(await nodeFaults(em, seriesId, nodes)));
  return { faults, size: frontier.size, lines, roots };
};

/** What lines commit to by a hash alone: a notice's PDF, by the line's number; hexadecimal SHA-256. */
const readFileHashes = async (em: EntityManager, seriesId: string) => {
  const rows = await em.execute<{ index: string; sha256: string }[]>(
    `select l.index, encode(p.sha256, 'hex') as sha256 from record.notice_pdf p
     join record.ledger_line l on l.series_id = p.series_id and l.act_id = p.act_id
     where p.series_id = ?`,
    [seriesId],
  );
  return new Map(rows.map(({ index, sha256: hash }) => [index, hash]));
};

/** Each kept content against its line's commitment, and each commitment against what is kept. */
export const auditContents = async (
  em: EntityManager,
  seriesId: string,
  lines: ReadonlyMap<number, Line>,
  erased: ReadonlySet<string>,
): Promise<readonly AuditFault[]> => {
  const inContent = faultIn('record.ledger_content');
  const files = await readFileHashes(em, seriesId);
  const faults: AuditFault[] = [];
  const kept = new Set<string>();
  const wrongIn = (row: ContentRow): string | undefined => {
    const { index, role, salt, content } = row;
    const committed = lines.get(Number(index))?.commitments.find((one) => one.role === role);
    const expected = findHex(committed?.commitment ?? '', 32);
    if (expected === undefined) return 'No line commits to this.';
    if (erased.has(`line ${index}, ${role}`))
      return salt === null && content === null
        ? undefined
        : 'The ledger says that it was erased, and it is still here.';
    if (salt === null) return 'Erased, and no line says so.';
    const file = role === 'pdf' ? findHex(files.get(index) ?? '', 32) : undefined;
    const hash = content === null ? file : sha256(utf8(content));
    if (hash === undefined) return 'Its text is gone, and no line says so.';
    return opens(expected, findHex(salt, 32) ?? new Uint8Array(), hash)
      ? undefined
      : 'The line commits to another text or salt.';
  };
  for (let at: readonly [string, string] = ['-9223372036854775808', '']; ; ) {
    const rows = await em.execute<ContentRow[]>(
      `select line_index as index, role, encode(salt, 'hex') as salt, content
       from record.ledger_content
       where series_id = ? and (line_index, role) > (?::bigint, ?)
       order by line_index, role limit ${BLOCK}`,
      [seriesId, ...at],
    );
    for (const row of rows) {
      at = [row.index, row.role];
      kept.add(`line ${row.index}, ${row.role}`);
      const wrong = wrongIn(row);
      if (wrong !== undefined) faults.push(inContent(`line ${row.index}, ${row.role}`, wrong));
    }
    if (rows.length < BLOCK) break;
  }
  for (const [index, { commitments }] of lines) {
    for (const { role } of commitments) {
      const what = `line ${index}, ${role}`;
      if (!kept.has(what)) faults.push(inContent(what, 'What the line commits to is missing.'));
    }
  }
  return faults;
};
