import { timingSafeEqual } from 'node:crypto';
import type { APIRoute } from 'astro';
import { composition } from '@/composition';
import { absent, failure } from '@/domain/failure';
import { sha256, utf8 } from '@/domain/ledger/bytes';
import { answer } from '@/http/json';
import { problem } from '@/http/problem';
import { takeBounce } from '@/services/mail/take-bounce';

const same = (given: string, key: string): boolean =>
  timingSafeEqual(sha256(utf8(given)), sha256(utf8(key)));

/**
 * What receives the mail of `MAIL_BOUNCES` hands the reports in here, as they came (`message/rfc822`),
 * with `Authorization: Bearer MAIL_BOUNCE_KEY`. Without a key configured there is no such address.
 */
export const POST: APIRoute = async ({ request, locals }) => {
  const { bounceKey } = (await composition()).config.mail;
  if (bounceKey === undefined) return problem(absent());
  const [, given = ''] = /^Bearer (.+)$/.exec(request.headers.get('authorization') ?? '') ?? [];
  if (!same(given, bounceKey))
    return problem(failure('sign-in-required', 'This key does not open this address.'));
  const taken = await takeBounce(locals.ports, { message: await request.text() });
  return taken.ok ? answer(taken.value) : problem(taken.failure);
};
