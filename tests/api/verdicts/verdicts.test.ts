import type { APIContext, APIRoute } from 'astro';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { noticePrinter } from '@/adapters/pdf/notice-printer';
import type { Actor } from '@/domain/access/permission';
import { sha256, toHex } from '@/domain/ledger/bytes';
import { GET as notice } from '@/pages/api/verdicts/[series]/[number]';
import { POST as draft } from '@/pages/api/verdicts/[series]/draft';
import { POST as publish } from '@/pages/api/verdicts/[series]/publish';
import { GET as feed } from '@/pages/series/[slug]/feed.xml';
import { GET as pdf } from '@/pages/series/[slug]/verdicts/[number].pdf';
import { renderNotice } from '@/services/notice/render-notice';
import { BIG_FEET, BREACH } from '../../support/verdict-case';
import { FakeObjects, openVerdictWorld, type VerdictWorld } from '../../support/verdict-world';
import { openWorld, type World } from '../../support/world';

let world: World;
let v: VerdictWorld;
let inspectionId: string;

beforeAll(async () => {
  world = await openWorld({ notices: noticePrinter, objects: new FakeObjects() });
  v = await openVerdictWorld(world);
  world.clock.set('2026-07-12T14:20:00.000Z');
  inspectionId = await v.addInspection('12J');
  await v.sign(inspectionId, BIG_FEET);
});
afterAll(() => world.close());

interface Asked {
  readonly actor?: Actor | null;
  readonly body?: unknown;
  readonly params?: Readonly<Record<string, string>>;
  readonly headers?: Readonly<Record<string, string>>;
  readonly objects?: FakeObjects;
}

const call = async (route: APIRoute, asked: Asked = {}): Promise<Response> => {
  const { actor = null, body, params = { series: v.seriesId }, headers = {} } = asked;
  const ports = world.ports(asked.objects === undefined ? {} : { objects: asked.objects });
  const request = new Request('http://127.0.0.1/api/x', {
    method: body === undefined ? 'GET' : 'POST',
    headers: { 'content-type': 'application/json', ...headers },
    ...(body === undefined ? {} : { body: JSON.stringify(body) }),
  });
  const context = { request, params, locals: { ports, actor } };
  return (await route(context as unknown as APIContext)) as Response;
};

const uuid = () => world.ports().random.uuid();
const saving = (content: unknown) => ({ act: uuid(), inspectionId, version: null, content });

describe('verdicts over the API', () => {
  it('are for officials; a stranger, the competitor and the inspector are turned away', async () => {
    const body = saving(BREACH);
    expect((await call(draft, { body })).status).toBe(401);
    expect((await call(draft, { body, actor: v.competitor })).status).toBe(404);
    expect((await call(draft, { body, actor: v.inspector })).status).toBe(404);
    const asked = { act: uuid(), inspectionId, version: 1 };
    expect((await call(publish, { body: asked })).status).toBe(401);
    expect((await call(publish, { body: asked, actor: v.competitor })).status).toBe(404);
  });

  it('name each field at fault by its pointer, of the shape and of the decision', async () => {
    const bad = await call(draft, {
      actor: v.official,
      body: saving({ ...BREACH, decision: 'maybe', clauses: ['four'], extra: 1 }),
    });
    expect(bad.status).toBe(422);
    expect(bad.headers.get('content-type')).toBe('application/problem+json');
    const { errors } = (await bad.json()) as { errors: { pointer: string }[] };
    expect(errors.map(({ pointer }) => pointer).sort()).toEqual([
      '/content/clauses/0',
      '/content/decision',
      '/content/extra',
    ]);
    const saved = await call(draft, {
      actor: v.official,
      body: saving({ ...BREACH, reasons: '', penalty: null }),
    });
    expect([saved.status, await saved.json()]).toEqual([200, { version: 1 }]);
    const early = await call(publish, {
      actor: v.official,
      body: { act: uuid(), inspectionId, version: 1 },
    });
    expect(early.status).toBe(422);
    const problem = (await early.json()) as { errors: { pointer: string }[] };
    expect(problem.errors.map(({ pointer }) => pointer)).toEqual(['/penalty', '/reasons']);
  });

  it('are published, printed, fed and served to a stranger with what proves them', async () => {
    const body = { ...saving(BREACH), version: 1 };
    expect((await call(draft, { actor: v.official, body })).status).toBe(200);
    const done = await call(publish, {
      actor: v.official,
      body: { act: uuid(), inspectionId, version: 2 },
    });
    const { verdictId, number } = (await done.json()) as { verdictId: string; number: string };
    expect([done.status, number]).toEqual([200, '2026-001']);
    const series = 'corran-valley';
    expect((await call(pdf, { params: { slug: series, number } })).status).toBe(404);
    await renderNotice(world.ports(), { seriesId: v.seriesId, verdictId });

    const served = await call(notice, { params: { series, number } });
    const answer = (await served.json()) as { document: string; pdf: { sha256: string } };
    expect(JSON.parse(answer.document)).toMatchObject({ number, car: '12J', decision: 'breach' });
    const printed = await call(pdf, { params: { slug: series, number } });
    expect(printed.headers.get('content-type')).toBe('application/pdf');
    const bytes = new Uint8Array(await printed.arrayBuffer());
    expect(toHex(sha256(bytes))).toBe(answer.pdf.sha256);
    const away = new FakeObjects();
    away.read = () => Promise.reject(new Error('connect ECONNREFUSED'));
    const down = await call(pdf, { params: { slug: series, number }, objects: away });
    expect([down.status, down.headers.get('content-type')]).toEqual([
      503,
      'application/problem+json',
    ]);
    expect(down.headers.get('retry-after')).toBe('60');
    expect(await down.json()).toMatchObject({ type: '/problems/unavailable' });
    const etag = printed.headers.get('etag') ?? '';
    const again = await call(pdf, {
      params: { slug: series, number },
      headers: { 'if-none-match': etag },
    });
    expect([again.status, etag]).toEqual([304, `"${answer.pdf.sha256}"`]);

    const atom = await (await call(feed, { params: { slug: series } })).text();
    expect(atom).toContain(`<title>Notice ${number}: car 12J, breach</title>`);
    expect((await call(notice, { params: { series, number: '2026-999' } })).status).toBe(404);
    expect((await call(notice, { params: { series: 'elsewhere', number } })).status).toBe(404);
    expect((await call(feed, { params: { slug: 'elsewhere' } })).status).toBe(404);
  });

  it('published once more are answered with the notice that stands', async () => {
    const again = await call(publish, {
      actor: v.official,
      body: { act: uuid(), inspectionId, version: 3 },
    });
    expect(again.status).toBe(409);
    expect(await again.json()).toMatchObject({
      detail: 'Notice 2026-001 has been published on this report.',
    });
  });
});
