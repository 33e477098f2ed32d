import type { MailState } from './mail-state';

/** A message as officials see it: to whom, about what, and what became of it; never what it says. */
export interface ListedMail {
  readonly id: string;
  readonly address: string;
  readonly person: string | null;
  readonly kind: string;
  readonly subject: string;
  readonly state: MailState;
  readonly attempts: number;
  readonly createdAt: string;
  readonly changedAt: string | null;
  /** The other server's words. */
  readonly answer: string;
  /** It binds or starts a clock, and did not reach; how the person was served instead, if so. */
  readonly mustBeServed: boolean;
  readonly served: { readonly how: string; readonly at: string; readonly by: string } | null;
}
