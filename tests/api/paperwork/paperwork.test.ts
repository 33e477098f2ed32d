import type { APIContext, APIRoute } from 'astro';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import type { Actor } from '@/domain/access/permission';
import { POST as columns } from '@/pages/api/files/[file]/columns';
import { POST as confirm } from '@/pages/api/files/[file]/confirm';
import { GET as original } from '@/pages/api/files/[file]/original';
import { GET as preview } from '@/pages/api/files/[file]/preview/[width]';
import { POST as remove } from '@/pages/api/files/[file]/remove';
import { POST as sheet } from '@/pages/api/files/[file]/sheet';
import { GET as check } from '@/pages/api/paperwork/[paperwork]/check';
import { POST as decision } from '@/pages/api/paperwork/[paperwork]/decision';
import { POST as draft } from '@/pages/api/paperwork/[paperwork]/draft';
import { POST as files } from '@/pages/api/paperwork/[paperwork]/files';
import { POST as handInRoute } from '@/pages/api/paperwork/[paperwork]/hand-in';
import { GET as template } from '@/pages/api/paperwork/[paperwork]/template/[sheet]';
import { GET as corrections } from '@/pages/api/sheets/[file]/corrections';
import { makePreviews } from '@/services/file/make-previews';
import {
  fullDraft,
  keepPhotograph,
  openPaddock,
  type Paddock,
  picture,
  start,
} from '../../support/paperwork';
import { openWorld, type World } from '../../support/world';

let world: World;
let paddock: Paddock;
let paperworkId: string;
let fileId: string;

beforeAll(async () => {
  world = await openWorld();
  paddock = await openPaddock(world);
  paperworkId = await start(paddock);
  fileId = (await keepPhotograph(paddock, paperworkId, await picture())).fileId;
  await makePreviews(paddock.ports(), { seriesId: paddock.seriesId, fileId });
});
afterAll(() => world.close());

interface Asked {
  readonly actor?: Actor | null;
  readonly body?: unknown;
  readonly params?: Readonly<Record<string, string>>;
  readonly query?: string;
}

const call = async (route: APIRoute, asked: Asked = {}): Promise<Response> => {
  const { actor = paddock.competitor, body, params = {}, query = '' } = asked;
  const url = new URL(`http://127.0.0.1/api/x${query}`);
  const request =
    body === undefined
      ? new Request(url)
      : new Request(url, {
          method: 'POST',
          headers: { 'content-type': 'application/json' },
          body: JSON.stringify(body),
        });
  const context = { request, url, params, locals: { ports: paddock.ports(), actor } };
  return (await route(context as unknown as APIContext)) as Response;
};

const problemOf = async (response: Response) => {
  expect(response.headers.get('content-type')).toBe('application/problem+json');
  const { type, errors } = (await response.json()) as {
    type: string;
    errors?: { pointer: string; detail: string }[];
  };
  return { status: response.status, type, pointers: errors?.map(({ pointer }) => pointer) };
};

const routes = (): readonly (readonly [string, APIRoute, Asked])[] => {
  const act = paddock.uuid();
  const paper = { paperwork: paperworkId };
  const file = { file: fileId };
  return [
    ['draft', draft, { params: paper, body: { act, version: 1, draft: fullDraft() } }],
    ['hand-in', handInRoute, { params: paper, body: { act, version: 1 } }],
    ['check', check, { params: paper }],
    ['template', template, { params: { ...paper, sheet: 'lifter-sheet' } }],
    [
      'files',
      files,
      {
        params: paper,
        body: {
          act,
          fileId: paddock.uuid(),
          purpose: 'photograph',
          item: 'lifters-racked',
          name: 'a.jpg',
          type: 'image/jpeg',
          bytes: 5,
        },
      },
    ],
    ['confirm', confirm, { params: file, body: { act } }],
    ['remove', remove, { params: file, body: { act } }],
    ['sheet', sheet, { params: file, body: { subject: 'lifter-sheet' } }],
    ['columns', columns, { params: file, body: { act, subject: 'lifter-sheet', mapping: {} } }],
    ['corrections', corrections, { params: file }],
    ['preview', preview, { params: { ...file, width: '160' } }],
    ['original', original, { params: file }],
    [
      'decision',
      decision,
      { params: paper, body: { act, number: 1, decision: 'accepted', remarks: [] } },
    ],
  ];
};

describe('every route of paperwork and its files', () => {
  it('asks a visitor to sign in first', async () => {
    for (const [name, route, asked] of routes()) {
      const response = await call(route, { ...asked, actor: null });
      expect([name, response.status]).toEqual([name, 401]);
    }
  });

  it('answers a rival, a competitor of no series and an official as if the draft did not exist', async () => {
    const nobody: Actor = { ...paddock.rival, standings: [] };
    for (const actor of [paddock.rival, nobody, paddock.official]) {
      for (const [name, route, asked] of routes()) {
        const response = await call(route, { ...asked, actor });
        expect([name, response.status]).toEqual([name, 404]);
      }
    }
  });

  it('says the same of ids that are none', async () => {
    for (const id of ['00000000-0000-7000-8000-000000000000', 'not-an-id', "' or 1=1 --"]) {
      for (const [name, route, asked] of routes()) {
        const params = { ...asked.params, paperwork: id, file: id };
        const response = await call(route, { ...asked, params });
        expect([name, response.status]).toEqual([name, 404]);
      }
    }
  });
});

describe('what is refused is named by its place', () => {
  it('fields of a draft', async () => {
    const params = { paperwork: paperworkId };
    const cells = [{ ...fullDraft().sheets[0]!.cells[0], quantity: 'shoe-size' }];
    const body = {
      act: 'x',
      version: 0,
      draft: { ...fullDraft(), sheets: [{ subject: 'lifter-sheet', cells }], colour: 'red' },
    };
    expect(await problemOf(await call(draft, { params, body }))).toEqual({
      status: 422,
      type: '/problems/invalid',
      pointers: ['/act', '/version', '/draft/sheets/0/cells/0/quantity', '/draft/colour'],
    });
  });

  it('what is missing when it is handed in', async () => {
    const params = { paperwork: paperworkId };
    const refused = await call(handInRoute, { params, body: { act: paddock.uuid(), version: 1 } });
    expect(await problemOf(refused)).toEqual({
      status: 422,
      type: '/problems/invalid',
      pointers: [
        '/answers/displacement',
        '/answers/tappet-type',
        '/answers/bore-bushed',
        '/sheets/lifter-sheet',
      ],
    });
  });

  it('a file too large, before a byte is sent', async () => {
    const body = {
      act: paddock.uuid(),
      fileId: paddock.uuid(),
      purpose: 'sheet',
      item: 'lifter-sheet',
      name: 'a.csv',
      type: 'text/csv',
      bytes: 2_000_001,
    };
    const refused = await call(files, { params: { paperwork: paperworkId }, body });
    expect(await problemOf(refused)).toEqual({
      status: 413,
      type: '/problems/too-large',
      pointers: ['/bytes'],
    });
  });

  it('an older draft', async () => {
    const params = { paperwork: paperworkId };
    const send = (version: number) =>
      call(draft, { params, body: { act: paddock.uuid(), version, draft: fullDraft() } });
    expect((await send(1)).status).toBe(200);
    expect(await problemOf(await send(1))).toMatchObject({ status: 412, type: '/problems/stale' });
  });
});

describe('bytes', () => {
  it('a preview and an original carry headers that keep them private and inert', async () => {
    const small = await call(preview, { params: { file: fileId, width: '160' } });
    expect(Object.fromEntries(small.headers)).toMatchObject({
      'content-type': 'image/jpeg',
      'x-content-type-options': 'nosniff',
      'content-disposition': expect.stringMatching(/^inline;/),
      'cache-control': expect.stringMatching(/^private/),
      'content-security-policy': "default-src 'none'; sandbox",
    });
    const whole = await call(original, { params: { file: fileId } });
    expect(whole.headers.get('content-disposition')).toMatch(/^attachment; filename="lifters.jpg"/);
  });

  it('a width that is not made is not there', async () => {
    for (const width of ['161', '0', 'x'])
      expect((await call(preview, { params: { file: fileId, width } })).status).toBe(404);
  });

  it('a template is a CSV for this engine, in the person’s units', async () => {
    const params = { paperwork: paperworkId, sheet: 'lifter-sheet' };
    const metric = await call(template, { params, query: '?units=metric' });
    expect(metric.headers.get('content-disposition')).toMatch(
      /^attachment; filename="lifters-12J-metric.csv"/,
    );
    const text = await metric.text();
    expect(text).toContain('Lifter body diameter (mm)');
    const workbook = await call(template, { params, query: '?as=xlsx' });
    expect(workbook.headers.get('content-type')).toContain('spreadsheetml');
    expect(
      Buffer.from(await workbook.arrayBuffer())
        .subarray(0, 2)
        .toString(),
    ).toBe('PK');
  });
});
