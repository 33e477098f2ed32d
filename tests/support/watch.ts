import type { BrowserContext, ConsoleMessage, Page, Request } from 'playwright-core';

/** What a test expects to go wrong in the browser: each must happen, and nothing else may. */
export interface Expected {
  /** Of the request at fault. */
  readonly url: RegExp;
  /** Status of the refusal, or `offline` for a request that got no answer. */
  readonly status: number | 'offline';
}

interface Refusal {
  readonly url: string;
  readonly status: number | 'offline';
}

/** Reports breaches of the policy that a console line might not name. */
const reportBreaches = () => {
  document.addEventListener('securitypolicyviolation', (event) => {
    console.error(
      `policy: ${event.violatedDirective} refused ${event.blockedURI} on ${document.URL}`,
    );
  });
};

const isAnswerOf = (message: ConsoleMessage) =>
  message.text().startsWith('Failed to load resource');

/** Listens to everything that goes wrong in a browser's pages. */
export function watch(context: BrowserContext): {
  readonly expectRefusal: (expected: Expected) => void;
  /** What went wrong so far without being expected, and what was expected and did not happen. */
  readonly problems: () => readonly string[];
} {
  const errors: string[] = [];
  const refusals: Refusal[] = [];
  const expectations: Expected[] = [];

  const failed = (request: Request) => {
    const reason = request.failure()?.errorText ?? '';
    // A page that is left drops what it was still loading; a download ends its own navigation.
    const passive = ['image', 'font', 'stylesheet', 'script', 'other', 'eventsource'].includes(
      request.resourceType(),
    );
    // Nothing is lost by a reading that a page gives up as it is left.
    const reads = request.resourceType() === 'fetch' && request.method() === 'GET';
    if (reason === 'net::ERR_ABORTED' && (request.isNavigationRequest() || passive || reads))
      return;
    // Where the walk has cut the line, a picture or a letter form that was not there yet stays away.
    const cut = reason === 'net::ERR_INTERNET_DISCONNECTED';
    if (cut && ['image', 'font'].includes(request.resourceType())) return;
    refusals.push({ url: request.url(), status: 'offline' });
  };
  const listen = (page: Page) => {
    page.on('console', (message) => {
      if (message.type() === 'error' && !isAnswerOf(message))
        errors.push(`console: ${message.text()}`);
    });
    page.on('pageerror', (error) => errors.push(`page: ${error.message}`));
    page.on('requestfailed', failed);
    page.on('response', (response) => {
      if (response.status() >= 400) {
        refusals.push({ url: response.url(), status: response.status() });
      }
    });
  };
  for (const page of context.pages()) listen(page);
  context.on('page', listen);
  void context.addInitScript(reportBreaches);

  const meets = (refusal: Refusal, expected: Expected) =>
    refusal.status === expected.status && expected.url.test(refusal.url);
  return {
    expectRefusal: (expected) => {
      expectations.push(expected);
    },
    problems: () => [
      ...errors,
      ...refusals
        .filter((refusal) => !expectations.some((expected) => meets(refusal, expected)))
        .map(({ url, status }) => `request: ${status} for ${url}`),
      ...expectations
        .filter((expected) => !refusals.some((refusal) => meets(refusal, expected)))
        .map(({ url, status }) => `expected but did not happen: ${status} for ${url}`),
    ],
  };
}
