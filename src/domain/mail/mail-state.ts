/**
 * Where a message stands. `failed` is tried again; `given-up` was tried as often as it is tried;
 * `refused` was refused for good by the receiving server, `bounced` came back after it was taken;
 * `turned-off` was not sent because the person wants none of this kind.
 */
export type MailState =
  | 'to-send'
  | 'sent'
  | 'failed'
  | 'refused'
  | 'given-up'
  | 'bounced'
  | 'turned-off';

export const MAIL_STATE_WORDS: Readonly<Record<MailState, string>> = {
  'to-send': 'to be sent',
  sent: 'sent',
  failed: 'not sent yet, is tried again',
  refused: 'refused',
  'given-up': 'given up',
  bounced: 'bounced',
  'turned-off': 'not sent: turned off',
};

/** Whether the person did not get it, and will not by itself. */
export const didNotReach = (state: MailState): boolean =>
  state === 'refused' || state === 'given-up' || state === 'bounced';
