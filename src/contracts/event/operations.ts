import * as z from 'zod/mini';
import type { Operation } from '../operation';
import { checkAnswer, checkRequest, checksShown } from './check';
import { entriesRequest, eventRequest, picksRequest, positionsRequest } from './event';

const signedIn = { method: 'post', access: 'signed-in' } as const;
const count = z.strictObject({ count: z.int() });

export const operations: readonly Operation[] = [
  {
    ...signedIn,
    path: '/api/events/{series}',
    summary: 'Open an event in a season, in its own time zone.',
    body: eventRequest,
    answer: z.strictObject({ id: z.string() }),
  },
  {
    ...signedIn,
    path: '/api/events/{series}/{event}/entries',
    summary: 'Add entries, or change those of the same class and car number.',
    body: entriesRequest,
    answer: count,
  },
  {
    ...signedIn,
    path: '/api/events/{series}/{event}/positions',
    summary: 'Write finishing positions; results are unofficial until tech clears.',
    body: positionsRequest,
    answer: count,
  },
  {
    ...signedIn,
    path: '/api/events/{series}/{event}/picks',
    summary: 'Pick cars for inspection; the rules in force at the event’s start are pinned.',
    body: picksRequest,
    answer: z.strictObject({ inspections: z.array(z.string()) }),
  },
  {
    ...signedIn,
    path: '/api/events/{series}/{event}/checks',
    summary:
      'Keep one check of one car without teardown, judged by the rules in force; a failed one opens an inspection.',
    body: checkRequest,
    answer: checkAnswer,
  },
  {
    method: 'get',
    access: 'signed-in',
    path: '/api/events/{series}/{event}/checks',
    summary: 'The checks of an event without teardown as they stand.',
    answer: checksShown,
  },
];
