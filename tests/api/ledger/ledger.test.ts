import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import {
  checkCommitment,
  checkConsistency,
  checkLine,
  checkNotice,
  checkPdf,
  type Proof,
  readHead,
} from '../../domain/ledger/stranger/verifier';
import { get } from '../../support/bay';
import { openRecordWorld, type RecordWorld, writeLine } from '../../support/record';
import {
  startServer,
  startServices,
  type TestServer,
  type TestServices,
} from '../../support/servers';
import { BIG_FEET, BREACH } from '../../support/verdict-case';
import { openVerdictWorld, type VerdictWorld } from '../../support/verdict-world';
import { eventually } from '../../support/wait';

const SLUG = 'corran-valley';

let world: RecordWorld;
let v: VerdictWorld;
let services: TestServices;
let server: TestServer;
let key: string;
let number: string;
/** The first head that the server signed. */
let older: string;

const ask = (path: string) => fetch(`${server.url}/api/ledger/${path}`);
const text = async (path: string): Promise<string> => {
  const answer = await ask(path);
  if (!answer.ok) throw new Error(`${path}: ${answer.status} ${await answer.text()}`);
  return answer.text();
};
const json = async <T>(path: string): Promise<T> => JSON.parse(await text(path)) as T;

const newestAbove = (size: number): Promise<string> =>
  eventually('a signed head', async () => {
    const answer = await ask(`${SLUG}/checkpoint`);
    if (!answer.ok) return undefined;
    const note = await answer.text();
    return Number(note.split('\n')[1]) > size ? note : undefined;
  });

const sizeOf = (note: string): number => Number(note.split('\n')[1]);

beforeAll(async () => {
  world = await openRecordWorld();
  v = await openVerdictWorld(world);
  services = await startServices();
  server = await startServer({ database: world.database, services });
  world.clock.set('2026-07-12T14:20:00.000Z');
  for (let i = 0; i < 3; i++) get(await writeLine(world.ports(), v.seriesId, `car ${i}`));
  older = await newestAbove(2);
  const inspection = await v.addInspection('12J');
  await v.sign(inspection, BIG_FEET);
  ({ number } = get(await v.decide(inspection, BREACH)));
  await eventually('the notice’s PDF', async () => {
    const answer = await ask(`${SLUG}/notices/${number}/pdf`);
    return answer.ok || undefined;
  });
  key = (await json<{ current: string }>(`${SLUG}/keys`)).current;
});
afterAll(async () => {
  await server?.stop();
  await services?.stop();
  await world?.close();
});

describe('the ledger over HTTP, checked with the verifier of a stranger', () => {
  it('gives signed heads byte for byte, the newest or one of a size, under slug and id alike', async () => {
    const newest = await text(`${SLUG}/checkpoint`);
    expect(readHead(newest, key).size).toBeGreaterThan(readHead(older, key).size);
    expect(await text(`${v.seriesId}/checkpoint`)).toBe(newest);
    expect(await text(`${SLUG}/checkpoint?size=${sizeOf(older)}`)).toBe(older);
    const answer = await ask(`${SLUG}/checkpoint`);
    expect(answer.headers.get('content-type')).toBe('text/plain; charset=utf-8');
    expect(answer.headers.get('access-control-allow-origin')).toBe('*');
    expect((await ask(`${SLUG}/checkpoint?size=1`)).status).toBe(404);
  });

  it('proves that the newer ledger holds the older one unchanged', async () => {
    const { path, checkpoint } = await json<{ path: string[]; checkpoint: string }>(
      `${SLUG}/consistency?from=${sizeOf(older)}`,
    );
    checkConsistency(readHead(older, key), readHead(checkpoint, key), path);
    const exact = `${SLUG}/consistency?from=${sizeOf(older)}&to=${sizeOf(checkpoint)}`;
    expect(await json(exact)).toEqual({ path, checkpoint });
    const wrong = [...path.slice(1), '00'.repeat(32)];
    expect(() =>
      checkConsistency(readHead(older, key), readHead(checkpoint, key), wrong),
    ).toThrow();
  });

  it('proves each line under the newest head and under the one of a size', async () => {
    const size = sizeOf(await text(`${SLUG}/checkpoint`));
    for (let index = 0; index < size; index++) {
      const proof = await json<Proof>(`${SLUG}/inclusion?index=${index}`);
      expect(checkLine(proof, key).index).toBe(String(index));
    }
    const first = await json<Proof>(`${SLUG}/inclusion?index=0&size=${sizeOf(older)}`);
    expect(first.checkpoint).toBe(older);
    expect(checkLine(first, key).kind).toBe('cars-selected');
  });

  it('serves lines in order with what everybody may see, and nothing else of what they commit to', async () => {
    const { lines } = await json<{
      lines: { line: string; open: { role: string; salt: string; content: string | null }[] }[];
    }>(`${SLUG}/lines?from=0&count=500`);
    expect(lines.map(({ line }) => (JSON.parse(line) as { index: string }).index)).toEqual(
      lines.map((_, at) => String(at)),
    );
    let opened = 0;
    for (const [at, { open }] of lines.entries()) {
      const line = checkLine(await json<Proof>(`${SLUG}/inclusion?index=${at}`), key);
      for (const { role, salt, content } of open) {
        expect(['rows', 'reasons', 'report']).not.toContain(role);
        if (content === null) continue;
        checkCommitment(line, role, salt, Buffer.from(content));
        opened += 1;
      }
    }
    expect(opened).toBeGreaterThan(3);
    const some = await json<{ lines: { line: string }[] }>(`${SLUG}/lines?from=1&count=2`);
    expect(some.lines.map(({ line }) => line)).toEqual(lines.slice(1, 3).map(({ line }) => line));
    expect(await json(`${SLUG}/lines?from=9999`)).toEqual({ lines: [] });
  });

  it('publishes its keys, each under the one before', async () => {
    const { current, published } = await json<{
      current: string;
      published: { document: string; salt: string; proof: Proof }[];
    }>(`${SLUG}/keys`);
    expect(published).toHaveLength(1);
    const [first] = published;
    if (first === undefined) throw new Error('no key');
    const line = checkLine(first.proof, current);
    checkCommitment(line, 'key', first.salt, Buffer.from(first.document));
    expect((JSON.parse(first.document) as { key: string }).key).toBe(current);
  });

  it('gives a notice’s file and the proof of its PDF, which verify the PDF as it is served', async () => {
    const file = await text(`${SLUG}/notices/${number}`);
    const { line, document } = checkNotice(file, key);
    expect(JSON.parse(document)).toMatchObject({ number, car: '12J', decision: 'breach' });
    const pdf = await fetch(`${server.url}/series/${SLUG}/verdicts/${number}.pdf`);
    expect(pdf.headers.get('content-type')).toBe('application/pdf');
    const bytes = Buffer.from(await pdf.arrayBuffer());
    const proof = await text(`${SLUG}/notices/${number}/pdf`);
    checkPdf(bytes, proof, line, key);
    bytes[bytes.length - 2] = (bytes[bytes.length - 2] ?? 0) ^ 1;
    expect(() => checkPdf(bytes, proof, line, key)).toThrow('another pdf');
  });

  it('says 404 of what is not there, for every operation alike', async () => {
    for (const path of [
      'no-such-series/checkpoint',
      '01980000-0000-7000-8000-000000000000/keys',
      'no-such-series/lines?from=0',
      'no-such-series/inclusion?index=0',
      'no-such-series/consistency?from=1',
      `no-such-series/notices/${number}`,
      `${SLUG}/notices/2026-999`,
      `${SLUG}/notices/2026-999/pdf`,
      `${SLUG}/inclusion?index=0&size=9999`,
    ]) {
      const answer = await ask(path);
      expect([path, answer.status]).toEqual([path, 404]);
      expect(answer.headers.get('content-type')).toBe('application/problem+json');
    }
  });

  it('names what is wrong with what was asked', async () => {
    for (const [path, pointer] of [
      ['checkpoint?size=x', '/size'],
      ['checkpoint?size=-1', '/size'],
      ['checkpoint?size=01', '/size'],
      ['lines', '/from'],
      ['lines?from=1.5', '/from'],
      ['lines?from=0&count=many', '/count'],
      ['inclusion', '/index'],
      ['inclusion?index=99999', '/index'],
      ['inclusion?index=9007199254740993', '/index'],
      ['consistency', '/from'],
      ['consistency?from=0', '/from'],
      ['consistency?from=99999', '/from'],
    ] as const) {
      const answer = await ask(`${SLUG}/${path}`);
      expect([path, answer.status]).toEqual([path, 422]);
      const problem = (await answer.json()) as { errors: { pointer: string }[] };
      expect(problem.errors.map((error) => error.pointer)).toEqual([pointer]);
    }
  });
});
