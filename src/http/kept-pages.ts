import { sha256, toHex, utf8 } from '@/domain/ledger/bytes';
import { Kept } from '@/services/rulebook/kept';

interface KeptPage {
  readonly body: string;
  readonly headers: Readonly<Record<string, string>>;
}

const MOST_CHARACTERS = 40_000_000;

const pages = new Kept<KeptPage>(400, MOST_CHARACTERS);

/** The name of a page by everything that it is made from: another input, another name. */
export const pageTag = (madeFrom: unknown): string =>
  toHex(sha256(utf8(JSON.stringify(madeFrom)))).slice(0, 32);

/** Whether the asker has this version already. */
export const alreadyHas = (request: Request, tag: string): boolean =>
  (request.headers.get('if-none-match') ?? '')
    .split(',')
    .some((one) => one.trim().replace(/^W\//, '') === `"${tag}"`);

/** Ask again each time; what is the same is not sent again. */
const FRESH = 'public, max-age=0, must-revalidate';

const tagged = (tag: string): Record<string, string> => ({
  etag: `W/"${tag}"`,
  'cache-control': FRESH,
});

export const notModified = (tag: string): Response =>
  new Response(null, { status: 304, headers: tagged(tag) });

/** A public page that was rendered before from the same things; nothing if none was, or it went. */
export const findKeptPage = (request: Request, tag: string): Response | undefined => {
  const page = pages.find(tag);
  if (page === undefined) return undefined;
  return alreadyHas(request, tag)
    ? notModified(tag)
    : new Response(page.body, { headers: page.headers });
};

/** Keeps a rendered page under its tag and answers with it. Only pages that are the same for everybody. */
export const keepPage = async (tag: string, response: Response): Promise<Response> => {
  if (response.status !== 200 || response.headers.has('set-cookie')) return response;
  const body = await response.text();
  const headers = new Headers(response.headers);
  for (const [name, value] of Object.entries(tagged(tag))) headers.set(name, value);
  pages.keep(tag, { body, headers: Object.fromEntries(headers) }, body.length);
  return new Response(body, { headers });
};
