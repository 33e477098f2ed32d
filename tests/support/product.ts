import { readFileSync } from 'node:fs';
import type { CaughtMail } from '../../scripts/local/mail.mjs';
import { eventually } from './wait';

export interface DemoPerson {
  readonly subject: string;
  readonly name: string;
  readonly email: string;
  readonly part: string;
}

/** A started product, as `npm test` (or `npm start`) left word of it. */
export interface StartedProduct {
  readonly publicUrl: string;
  readonly mailboxUrl: string;
  readonly superuserUrl: string;
  readonly ownerUrl: string;
  readonly appUrl: string;
  readonly home: string;
  readonly people: readonly DemoPerson[];
  /** The environment of its server: object store, mail, identity. */
  readonly env: Readonly<Record<string, string>>;
}

/** @throws Error when no product was started for the tests */
export function readProduct(): StartedProduct {
  const file = process.env['TEST_PRODUCT'];
  if (file === undefined || file === '') {
    throw new Error(
      'Browser tests look at a started product. Run them with: npm test -- browser [file]. ' +
        'Or, against the one that `npm start` runs: TEST_PRODUCT=storage/product.json npx vitest run --project browser',
    );
  }
  return JSON.parse(readFileSync(file, 'utf8')) as StartedProduct;
}

/** Every message that the product has sent to an address, oldest first. */
export async function mailsTo(address: string): Promise<readonly CaughtMail[]> {
  const { mailboxUrl } = readProduct();
  const response = await fetch(`${mailboxUrl}/messages.json?to=${encodeURIComponent(address)}`);
  return (await response.json()) as CaughtMail[];
}

/** The newest message to an address whose subject matches, waited for. */
export const mailTo = (address: string, subject: RegExp): Promise<CaughtMail> =>
  eventually(`a mail to ${address} about ${subject}`, async () =>
    (await mailsTo(address)).findLast((mail) => subject.test(mail.subject)),
  );

/** The bytes of a message's attachment. */
export async function attachmentOf(mail: CaughtMail, at = 0): Promise<Buffer> {
  const { mailboxUrl } = readProduct();
  const response = await fetch(`${mailboxUrl}/messages/${mail.id}/attachments/${at}`);
  if (!response.ok) throw new Error(`The mail "${mail.subject}" has no attachment ${at}.`);
  return Buffer.from(await response.arrayBuffer());
}
