import type { Operation } from '../operation';
import { swapRequest, swapResponse } from './swap';

export const operations: readonly Operation[] = [
  {
    method: 'post',
    path: '/api/swaps',
    summary: 'Put another engine into an entered car at the track; officials see it at once',
    access: 'signed-in',
    body: swapRequest,
    answer: swapResponse,
  },
];
