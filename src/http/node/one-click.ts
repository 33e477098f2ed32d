import type { IncomingMessage } from 'node:http';

/**
 * A mailbox turns messages off by a POST of its own (RFC 8058), without any origin, which is refused
 * for forms. It carries no cookie and its body says nothing that is not known: it passes as no form.
 */
export const passOneClick = ({ method, url = '', headers }: IncomingMessage): void => {
  const isOneClick = method === 'POST' && url.startsWith('/mail/off/');
  if (isOneClick && headers.origin === undefined && headers.cookie === undefined)
    headers['content-type'] = 'application/octet-stream';
};
