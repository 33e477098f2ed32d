import type { ServerResponse } from 'node:http';

/** Headers of every answer. Pages replace the policy by their own, which names their scripts' hashes. */
export const secureHeaders = (response: ServerResponse): void => {
  response.setHeader('x-content-type-options', 'nosniff');
  response.setHeader('referrer-policy', 'same-origin');
  response.setHeader('x-frame-options', 'DENY');
  response.setHeader('cross-origin-opener-policy', 'same-origin');
  response.setHeader('cross-origin-resource-policy', 'same-origin');
  response.setHeader(
    'permissions-policy',
    'geolocation=(), microphone=(), camera=(self), payment=(), usb=()',
  );
  response.setHeader(
    'content-security-policy',
    "default-src 'none'; frame-ancestors 'none'; base-uri 'none'",
  );
};
