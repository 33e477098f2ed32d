import type { APIContext, APIRoute } from 'astro';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { rulebookPrinter } from '@/adapters/pdf/rulebook-printer';
import type { Actor } from '@/domain/access/permission';
import { sha256, toHex } from '@/domain/ledger/bytes';
import { POST as open } from '@/pages/api/rulebooks/classes/[class]/drafts';
import { GET as read, PUT as save } from '@/pages/api/rulebooks/drafts/[draft]/index';
import { POST as publishDraft } from '@/pages/api/rulebooks/drafts/[draft]/publish';
import { GET as schema } from '@/pages/api/rulebooks/schema.json';
import { GET as csv } from '@/pages/series/[slug]/rulebooks/[class]/clauses.csv';
import { GET as feed } from '@/pages/series/[slug]/rulebooks/[class]/feed.xml';
import { GET as file } from '@/pages/series/[slug]/rulebooks/[class]/rulebook.json';
import { GET as pdf } from '@/pages/series/[slug]/rulebooks/[class]/rulebook.pdf';
import { GET as rules } from '@/pages/series/[slug]/rulebooks/[class]/rules.json';
import {
  bulletinOf,
  clauseOf,
  must,
  type Office,
  openOffice,
  publish,
  putInForce,
  tappetContent,
  writeDraft,
} from '../../services/rulebook/build';
import { openWorld, type World } from '../../support/world';

let world: World;
let office: Office;
let slug: string;
let prints = 0;

beforeAll(async () => {
  world = await openWorld({
    rulebooks: {
      print: (input) => {
        prints += 1;
        return rulebookPrinter.print(input);
      },
    },
  });
  office = await openOffice(world);
  const [row] = await world
    .ports()
    .db.execute<{ slug: string }[]>('select slug from public.series where id = ?', [
      office.seriesId,
    ]);
  slug = row?.slug ?? '';
});
afterAll(() => world.close());

const uuid = () => world.ports().random.uuid();

interface Asked {
  readonly actor?: Actor | null;
  readonly method?: string;
  readonly body?: unknown;
  readonly params?: Readonly<Record<string, string>>;
  readonly headers?: Readonly<Record<string, string>>;
  readonly query?: string;
}

const call = async (route: APIRoute, asked: Asked = {}): Promise<Response> => {
  const { actor = office.official, body, params = {}, query = '', method = 'POST' } = asked;
  const url = new URL(`http://127.0.0.1/api/x${query}`);
  const request = new Request(url, {
    headers: { 'content-type': 'application/json', ...asked.headers },
    ...(body !== undefined && { method, body: JSON.stringify(body) }),
  });
  const context = { request, url, params, locals: { ports: world.ports(), actor } };
  return (await route(context as unknown as APIContext)) as Response;
};

interface Problem {
  readonly type: string;
  readonly detail: string;
  readonly errors?: readonly { readonly pointer: string; readonly detail: string }[];
  readonly newer?: {
    readonly version: number;
    readonly updatedBy: string;
    readonly content: unknown;
  };
}

const problemOf = async (response: Response): Promise<Problem & { readonly status: number }> => {
  expect(response.headers.get('content-type')).toBe('application/problem+json');
  return { status: response.status, ...((await response.json()) as Problem) };
};

describe('two officials on one draft, over the API', () => {
  let draftId: string;
  const content = (words: string) => {
    const { clauses, penalties } = tappetContent();
    return { clauses: clauses.map((one) => ({ ...one, words })), penalties };
  };
  const put = (words: string, version: string | null, actor = office.official) =>
    call(save, {
      actor,
      method: 'PUT',
      params: { draft: draftId },
      headers: version === null ? {} : { 'if-match': version },
      body: { act: uuid(), kind: 'edition', title: 'First', content: content(words) },
    });
  const standing = async () => {
    const response = await call(read, { params: { draft: draftId } });
    return {
      etag: response.headers.get('etag'),
      draft: (await response.json()) as { version: number; content: unknown },
    };
  };

  beforeAll(async () => {
    draftId = await writeDraft(world, office);
  });

  it('each save is answered with the version to go on from', async () => {
    expect((await standing()).etag).toBe('"1"');
    const saved = await put('One.', '"1"');
    expect([saved.status, saved.headers.get('etag')]).toEqual([200, '"2"']);
    expect(await saved.json()).toMatchObject({ version: 2 });
  });

  it('what grew from an older version is refused with 412 and the newer draft', async () => {
    const refused = await put('Two.', '"1"', office.second);
    expect(refused.headers.get('etag')).toBe('"2"');
    const told = await problemOf(refused);
    expect(told.status).toBe(412);
    expect(told.newer).toMatchObject({ version: 2, updatedBy: office.official.name });
    expect(told.newer?.content).toEqual(content('One.'));
    expect((await standing()).draft.content).toEqual(content('One.'));
  });

  it('of two at once one is kept and the other told', async () => {
    const answers = await Promise.all([put('Mine.', '"2"'), put('Theirs.', '"2"', office.second)]);
    expect(answers.map((one) => one.status).sort()).toEqual([200, 412]);
    expect((await standing()).draft.version).toBe(3);
  });

  it.each([
    ['without If-Match', null],
    ['with one that names no version', '"*"'],
    ['with a weak one', 'W/"3"'],
  ])('a save %s is refused and says what is missing', async (_, version) => {
    const told = await problemOf(await put('Unseen.', version));
    expect([told.status, told.detail]).toEqual([422, expect.stringContaining('If-Match')]);
    expect((await standing()).draft.version).toBe(3);
  });

  it('is nothing for a stranger, and asks somebody unknown to sign in', async () => {
    expect((await put('Strange.', '"3"', office.stranger)).status).toBe(404);
    const { status } = await problemOf(
      await call(save, {
        actor: null,
        method: 'PUT',
        params: { draft: draftId },
        headers: { 'if-match': '"3"' },
        body: { act: uuid(), kind: 'edition', title: 'First', content: content('x') },
      }),
    );
    expect(status).toBe(401);
  });
});

describe('an import over the API', () => {
  let other: Office;
  const drafts = async () => {
    const rows = await world
      .ports()
      .db.execute('select id from public.rulebook_draft where class_id = ?', [other.classId]);
    return rows.length;
  };
  const send = (content: unknown) =>
    call(open, {
      actor: other.official,
      params: { class: other.classId },
      body: { act: uuid(), id: uuid(), kind: 'edition', title: 'Imported', content },
    });

  beforeAll(async () => {
    other = await openOffice(world);
  });

  it('names every fault by its place and takes nothing over', async () => {
    const { clauses, penalties } = tappetContent();
    const [first, ...rest] = clauses;
    const response = await send({
      clauses: [
        { ...first, number: '4..1' },
        ...rest.map((one) =>
          one.requirement?.kind === 'limit'
            ? { ...one, requirement: { ...one.requirement, max: { text: 'much', unit: 'in' } } }
            : one,
        ),
        { number: '99', heading: 7, words: '', force: 'sometimes', colour: 'red' },
      ],
      penalties: [{ ...penalties[0], carriesOver: 'perhaps' }],
    });
    const told = await problemOf(response);
    expect(told.status).toBe(422);
    const places = told.errors?.map((one) => one.pointer) ?? [];
    expect(places).toEqual(
      expect.arrayContaining([
        '/content/clauses/0/number',
        `/content/clauses/${clauses.length}/heading`,
        `/content/clauses/${clauses.length}/force`,
        '/content/penalties/0/carriesOver',
      ]),
    );
    for (const { detail } of told.errors ?? []) expect(detail).toMatch(/\S/);
    expect(await drafts()).toBe(0);
  });

  it('that is sound is one draft', async () => {
    expect((await send(tappetContent())).status).toBe(200);
    expect(await drafts()).toBe(1);
  });
});

describe('what is published, over the web', () => {
  const params = () => ({ slug, class: 'street-eight' });
  const get = (route: APIRoute, query = '', headers = {}) =>
    call(route, { actor: null, params: params(), query, headers });

  beforeAll(async () => {
    const [draft] = await world
      .ports()
      .db.execute<{ id: string; version: number }[]>(
        'select id, version from public.rulebook_draft where class_id = ?',
        [office.classId],
      );
    const refused = await call(publishDraft, {
      params: { draft: draft?.id ?? '' },
      body: { act: uuid(), version: 1 },
    });
    expect(refused.status).toBe(412);
    await putInForceAnew();
  });

  /** The draft of the first test is ambiguous by now; a sound one takes its place. */
  const putInForceAnew = async () => {
    await world
      .ports()
      .db.execute('delete from public.rulebook_draft where class_id = ?', [office.classId]);
    await putInForce(world, office);
  };

  it('the hash is that of the bytes that rules.json serves', async () => {
    const response = await get(rules);
    const bytes = new Uint8Array(await response.arrayBuffer());
    expect(response.headers.get('etag')).toBe(`"${toHex(sha256(bytes))}"`);
  });

  it('JSON and CSV come out by the published schema and are the clauses in force', async () => {
    const out = (await (await get(file)).json()) as { format: string; clauses: unknown[] };
    const described = (await (await get(schema)).json()) as { properties: object };
    expect(Object.keys(described.properties)).toEqual(expect.arrayContaining(Object.keys(out)));
    expect(out.clauses).toHaveLength(tappetContent().clauses.length);
    const lines = (await (await get(csv)).text()).split('\r\n');
    expect(lines[0]).toContain('number,heading,words,force');
  });

  it('the PDF is drawn once for as long as the rules stand, whoever asks, and anew after a bulletin', async () => {
    const before = prints;
    const asked = await Promise.all([get(pdf), get(pdf), get(pdf)]);
    const hashes = await Promise.all(
      asked.map(async (one) => toHex(sha256(new Uint8Array(await one.arrayBuffer())))),
    );
    expect(new Set(hashes).size).toBe(1);
    world.clock.advance(86_400_000);
    const later = await get(pdf);
    const tag = later.headers.get('etag') ?? '';
    expect(tag).toBe(asked[0]?.headers.get('etag'));
    expect(prints - before).toBe(1);
    expect((await get(pdf, '', { 'if-none-match': tag })).status).toBe(304);
    const change = bulletinOf(clauseOf('4.4', { words: 'Bores are as cast.' }), { kind: 'safety' });
    must(await publish(world, office, change));
    const after = await get(pdf, '', { 'if-none-match': tag });
    expect([after.status, prints - before]).toEqual([200, 2]);
    expect(after.headers.get('etag')).not.toBe(tag);
    // The day before has its own, which was drawn already.
    const eve = new Date(world.clock.now().getTime() - 3_600_000).toISOString();
    expect((await get(pdf, `?on=${eve}`)).headers.get('etag')).toBe(tag);
    expect(prints - before).toBe(2);
  });

  it('the feed lists each publication once, newest first', async () => {
    const text = await (await get(feed)).text();
    expect(text.match(/<title>[^<]+<\/title>/g)?.slice(1)).toEqual([
      '<title>Bulletin 1: Words</title>',
      '<title>Edition 1: First</title>',
    ]);
  });
});
