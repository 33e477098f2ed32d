/** What the server refused, in its own words; `problem` is the last part of the problem's type. */
export class Refusal extends Error {
  constructor(
    readonly problem: string,
    readonly detail: string,
    readonly status: number,
  ) {
    super(detail);
  }
}

interface Problem {
  readonly type?: string;
  readonly detail?: string;
}

/** Sends JSON and gives the answer; throws a `Refusal`, or a `TypeError` where nothing was reached. */
export const post = async <T>(path: string, body: unknown): Promise<T> => {
  const response = await fetch(path, {
    method: 'POST',
    headers: { 'content-type': 'application/json' },
    body: JSON.stringify(body),
  });
  const answer: unknown = await response.json().catch(() => ({}));
  if (response.ok) return answer as T;
  const { type = '', detail = 'The server could not do this. Try again.' } = answer as Problem;
  throw new Refusal(type.split('/').at(-1) ?? '', detail, response.status);
};

/** Reads JSON; throws like `post`. */
export const get = async <T>(path: string): Promise<T> => {
  const response = await fetch(path, { headers: { accept: 'application/json' } });
  const answer: unknown = await response.json().catch(() => ({}));
  if (response.ok) return answer as T;
  const { type = '', detail = 'The server could not do this. Try again.' } = answer as Problem;
  throw new Refusal(type.split('/').at(-1) ?? '', detail, response.status);
};

/** UUID version 7 (RFC 9562), so that acts sort by time. */
export const newId = (): string => {
  const bytes = crypto.getRandomValues(new Uint8Array(16));
  const now = Date.now();
  for (let i = 0; i < 6; i += 1) bytes[i] = Math.floor(now / 2 ** (8 * (5 - i))) % 256;
  bytes[6] = ((bytes[6] ?? 0) & 0x0f) | 0x70;
  bytes[8] = ((bytes[8] ?? 0) & 0x3f) | 0x80;
  const hex = [...bytes].map((byte) => byte.toString(16).padStart(2, '0')).join('');
  return hex.replace(/^(.{8})(.{4})(.{4})(.{4})/, '$1-$2-$3-$4-');
};

/** `20:41` by the device's clock. */
export const clockTime = (at: Date | string): string => {
  const date = new Date(at);
  return `${String(date.getHours()).padStart(2, '0')}:${String(date.getMinutes()).padStart(2, '0')}`;
};

export const deviceWord = (): string => {
  if (!matchMedia('(pointer: coarse)').matches) return 'computer';
  return Math.min(innerWidth, innerHeight) < 600 ? 'phone' : 'tablet';
};
