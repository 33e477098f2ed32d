import { describe, expect, it } from 'vitest';
import { type PostAnswer, type SendDeps, sendUpload } from '@/components/uploads/send-upload';
import { arrivedShare, isStale, renewed, type Upload } from '@/components/uploads/upload';

const upload: Upload = {
  id: 'file-1',
  group: 'paperwork 1',
  name: 'rack.jpg',
  type: 'image/jpeg',
  bytes: 10,
  announce: '/announce',
  fields: { purpose: 'photograph', item: 'rack' },
  confirm: '/files/{id}/confirm',
  announceAct: 'act-1',
  confirmAct: 'act-2',
  keptAt: 0,
  paused: false,
  tags: [],
};

const whole = { status: 200, body: { url: 'store:all', type: 'image/jpeg' } };
const inParts = {
  status: 200,
  body: {
    url: 'store:all',
    type: 'image/jpeg',
    parts: [
      { url: 'store:1', bytes: 4 },
      { url: 'store:2', bytes: 4 },
      { url: 'store:3', bytes: 2 },
    ],
  },
};
const kept = { status: 200, body: { state: 'kept' } };

/** A network that answers as it is told, and the device that keeps what changes. */
const world = (
  answers: Readonly<Record<string, PostAnswer | undefined>>,
  lost: readonly string[] = [],
) => {
  const posted: unknown[] = [];
  const put: string[] = [];
  let device = upload;
  const deps: SendDeps = {
    post: async (path, body) => {
      posted.push({ path, body });
      return answers[path];
    },
    put: async (url, bytes, { onSent }) => {
      onSent(bytes.size);
      put.push(`${url} ${await bytes.text()}`);
      return lost.includes(url) ? undefined : { status: 200, tag: `tag of ${url}` };
    },
    keep: async (change) => {
      device = { ...device, ...change };
    },
    now: () => 1_000,
  };
  const send = (one = device, signal = new AbortController().signal) =>
    sendUpload(one, new Blob(['0123456789']), deps, signal, (share) => shares.push(share));
  const shares: number[] = [];
  return { deps, posted, put, shares, send, device: () => device };
};

describe('a small file', () => {
  it('is announced, sent and confirmed under its own ids', async () => {
    const { send, posted, put } = world({ '/announce': whole, '/files/file-1/confirm': kept });
    expect(await send()).toEqual({ kind: 'answered', answer: { state: 'kept' } });
    expect(put).toEqual(['store:all 0123456789']);
    expect(posted).toEqual([
      {
        path: '/announce',
        body: {
          act: 'act-1',
          fileId: 'file-1',
          name: 'rack.jpg',
          type: 'image/jpeg',
          bytes: 10,
          purpose: 'photograph',
          item: 'rack',
        },
      },
      { path: '/files/file-1/confirm', body: { act: 'act-2' } },
    ]);
  });

  it('whose confirmation was lost is asked about, not sent again', async () => {
    const first = world({ '/announce': whole });
    expect(await first.send()).toEqual({ kind: 'no-signal' });
    const second = world({ '/announce': whole, '/files/file-1/confirm': kept });
    expect(await second.send(first.device())).toMatchObject({ kind: 'answered' });
    expect(second.put).toEqual([]);
  });

  it('that the server does not have after all is sent again, once', async () => {
    const gone = { status: 409, body: { detail: 'Not all has arrived.' } };
    const { send, put, device, deps } = world({
      '/announce': whole,
      '/files/file-1/confirm': gone,
    });
    await deps.keep({ tags: ['arrived before'] });
    expect(await send()).toEqual({ kind: 'no-signal' });
    expect([put, device().tags]).toEqual([[], []]);
    expect(await send()).toEqual({ kind: 'refused', detail: 'Not all has arrived.' });
    expect(put).toEqual(['store:all 0123456789']);
  });
});

describe('a file in parts', () => {
  it('goes on with the part that was cut; what arrived is not sent again', async () => {
    const first = world({ '/announce': inParts }, ['store:2']);
    expect(await first.send()).toEqual({ kind: 'no-signal' });
    expect(first.put).toEqual(['store:1 0123', 'store:2 4567']);
    expect(first.device().tags).toEqual(['tag of store:1', '', '']);

    const second = world({ '/announce': inParts, '/files/file-1/confirm': kept });
    expect(await second.send(first.device())).toMatchObject({ kind: 'answered' });
    expect(second.put).toEqual(['store:2 4567', 'store:3 89']);
    expect(second.shares[0]).toBe(0.4);
    expect(second.posted.at(-1)).toEqual({
      path: '/files/file-1/confirm',
      body: {
        act: 'act-2',
        parts: [1, 2, 3].map((number) => ({ number, tag: `tag of store:${number}` })),
      },
    });
  });
});

describe('what goes wrong', () => {
  it.each([
    ['no answer', undefined, { kind: 'no-signal' }],
    ['a server in trouble', { status: 503, body: {} }, { kind: 'no-signal' }],
    ['too many at once', { status: 429, body: {} }, { kind: 'no-signal' }],
    ['signed out', { status: 401, body: {} }, { kind: 'sign-in' }],
    [
      'refused',
      { status: 413, body: { detail: 'Too large.' } },
      { kind: 'refused', detail: 'Too large.' },
    ],
  ])('%s', async (_, answer, outcome) => {
    const { send, put } = world({ '/announce': answer });
    expect(await send()).toEqual(outcome);
    expect(put).toEqual([]);
  });

  it('stopped by the person, it keeps what arrived', async () => {
    const stop = new AbortController();
    const { deps, device } = world({ '/announce': inParts });
    const stopping: SendDeps = {
      ...deps,
      put: async (url, bytes, options) => {
        if (url === 'store:2') stop.abort();
        return deps.put(url, bytes, options);
      },
    };
    const outcome = await sendUpload(
      upload,
      new Blob(['0123456789']),
      stopping,
      stop.signal,
      () => undefined,
    );
    expect(outcome).toEqual({ kind: 'stopped' });
    expect(device().tags).toEqual(['tag of store:1', '', '']);
  });

  it('says how much of it had arrived, by the parts that did', () => {
    const large = { ...upload, bytes: 12_000_000 };
    expect(arrivedShare(large)).toBe(0);
    expect(arrivedShare({ ...large, tags: ['a', '', ''] })).toBeCloseTo(5_242_880 / 12_000_000);
    expect(arrivedShare({ ...upload, tags: ['a'] })).toBe(1);
  });

  it('announced longer ago than the server waits, it is announced anew under another id', () => {
    const announced = { ...upload, announcedAt: 0, tags: ['a'] };
    expect(isStale(announced, 19 * 3_600_000)).toBe(false);
    expect(isStale(upload, 90 * 3_600_000)).toBe(false);
    expect(isStale(announced, 21 * 3_600_000)).toBe(true);
    let made = 0;
    expect(renewed(announced, () => `new-${++made}`)).toMatchObject({
      id: 'new-1',
      announceAct: 'new-2',
      confirmAct: 'new-3',
      tags: [],
      name: 'rack.jpg',
    });
  });

  it('what the record names by its id is announced anew under that id', () => {
    let made = 0;
    const announced = { ...upload, announcedAt: 0, tags: ['a'], named: true };
    expect(renewed(announced, () => `new-${++made}`)).toMatchObject({
      id: upload.id,
      announceAct: 'new-1',
      confirmAct: 'new-2',
      announcedAt: undefined,
      tags: [],
    });
  });
});
