import type { Failure, FailureName } from '@/domain/failure';

const STATUS: { readonly [N in FailureName]: number } = {
  absent: 404,
  'sign-in-required': 401,
  'fresh-sign-in-required': 403,
  invalid: 422,
  stale: 412,
  'same-id-other-content': 409,
  'not-in-this-state': 409,
  'conflict-of-interest': 409,
  'too-large': 413,
  'unsupported-file': 415,
  'damaged-file': 422,
  'link-spent': 410,
  'too-many-requests': 429,
  'read-only': 503,
  unavailable: 503,
};

const TITLE: { readonly [N in FailureName]: string } = {
  absent: 'Not found',
  'sign-in-required': 'Sign in first',
  'fresh-sign-in-required': 'Sign in once more',
  invalid: 'Entries need correcting',
  stale: 'Changed by someone else',
  'same-id-other-content': 'Already sent with other content',
  'not-in-this-state': 'Not possible now',
  'conflict-of-interest': 'Conflict of interest',
  'too-large': 'Too large',
  'unsupported-file': 'Kind of file not taken',
  'damaged-file': 'Damaged file',
  'link-spent': 'Link already used or too old',
  'too-many-requests': 'Too many requests',
  'read-only': 'Reading only',
  unavailable: 'Not reachable',
};

export const statusOf = (failure: Failure): number => STATUS[failure.name];
export const titleOf = (failure: Failure): string => TITLE[failure.name];

/** RFC 9457 problem details; `errors` names each field at fault by JSON Pointer (RFC 6901). */
export const problem = (failure: Failure, status = statusOf(failure)): Response =>
  new Response(
    JSON.stringify({
      type: `/problems/${failure.name}`,
      title: titleOf(failure),
      status,
      detail: failure.detail,
      ...(failure.faults ? { errors: failure.faults } : {}),
    }),
    {
      status,
      headers: { 'content-type': 'application/problem+json', 'cache-control': 'no-store' },
    },
  );
