/** What a report says about one recipient (RFC 3464, section 2.3). */
export interface BouncedRecipient {
  /** Lower case. */
  readonly address: string;
  readonly action: 'failed' | 'delayed' | 'delivered' | 'relayed' | 'expanded';
  /** `5.1.1` (RFC 3463). */
  readonly status: string;
  /** The other server's own words; empty where it gave none. */
  readonly words: string;
}

export interface DeliveryReport {
  /** Message-IDs that the report names as those it is about, `<…>`. */
  readonly messageIds: readonly string[];
  readonly recipients: readonly BouncedRecipient[];
}

interface Part {
  readonly headers: ReadonlyMap<string, string>;
  readonly body: string;
}

const ACTIONS = ['failed', 'delayed', 'delivered', 'relayed', 'expanded'] as const;
const MOST_PARTS = 20;
const MOST_WORDS = 500;

/** Header fields, folded lines joined (RFC 5322, section 2.2.3); of a repeated one the first counts. */
const fields = (text: string): ReadonlyMap<string, string> => {
  const found = new Map<string, string>();
  for (const line of text.replace(/\r?\n[ \t]+/g, ' ').split(/\r?\n/)) {
    const colon = line.indexOf(':');
    const name = line.slice(0, Math.max(0, colon)).trim().toLowerCase();
    if (/^[!-9;-~]+$/.test(name) && !found.has(name)) found.set(name, line.slice(colon + 1).trim());
  }
  return found;
};

const part = (text: string): Part => {
  const [, head = '', body = ''] = /^([\s\S]*?)(?:\r?\n){2}([\s\S]*)$/.exec(text) ?? ['', text, ''];
  return { headers: fields(head), body };
};

const typeOf = ({ headers }: Part): string =>
  (headers.get('content-type') ?? 'text/plain').split(';')[0]?.trim().toLowerCase() ?? '';

/** The parts of a multipart body, those inside parts too (RFC 2046, section 5.1). */
const partsOf = (whole: Part, depth = 0): readonly Part[] => {
  const type = whole.headers.get('content-type') ?? '';
  const [, quoted, bare] = /boundary=(?:"([^"]+)"|([^\s;]+))/i.exec(type) ?? [];
  const boundary = quoted ?? bare;
  if (!/^multipart\//i.test(type) || boundary === undefined || depth > 3) return [whole];
  return `\n${whole.body}`
    .split(`\n--${boundary}`)
    .slice(1, MOST_PARTS + 1)
    .filter((text) => !text.startsWith('--'))
    .flatMap((text) => partsOf(part(text.replace(/^[ \t]*\r?\n/, '')), depth + 1));
};

/** `rfc822; name@example.org` */
const afterType = (value: string): string => value.replace(/^[^;]*;/, '').trim();

const recipientOf = (text: string): BouncedRecipient | undefined => {
  const found = fields(text);
  const final = found.get('original-recipient') ?? found.get('final-recipient');
  const said = found.get('action')?.toLowerCase();
  const action = ACTIONS.find((one) => one === said);
  if (final === undefined || action === undefined) return undefined;
  return {
    address: afterType(final).replace(/^<|>$/g, '').toLowerCase(),
    action,
    status: /\d\.\d{1,3}\.\d{1,3}/.exec(found.get('status') ?? '')?.[0] ?? '',
    words: afterType(found.get('diagnostic-code') ?? '').slice(0, MOST_WORDS),
  };
};

const RETURNED = new Set(['message/rfc822', 'text/rfc822-headers', 'message/global-headers']);
const STATUS = new Set(['message/delivery-status', 'message/global-delivery-status']);

/**
 * Reads a report of what became of a message (RFC 3464, carried as RFC 6522 says); nothing where the
 * message is none.
 */
export const readDeliveryReport = (message: string): DeliveryReport | undefined => {
  const whole = part(message);
  const parts = partsOf(whole);
  const status = parts.find((one) => STATUS.has(typeOf(one)));
  if (status === undefined) return undefined;
  const recipients = status.body
    .split(/(?:\r?\n[ \t]*){2,}/)
    .map(recipientOf)
    .filter((one) => one !== undefined);
  const returned = parts.filter((one) => RETURNED.has(typeOf(one))).map(({ body }) => fields(body));
  const named = [
    ...returned.map((found) => found.get('message-id')),
    whole.headers.get('in-reply-to'),
    whole.headers.get('references'),
  ];
  const messageIds = [...new Set(named.flatMap((text) => text?.match(/<[^<>\s]+>/g) ?? []))];
  return { messageIds, recipients };
};
