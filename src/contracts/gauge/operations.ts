import type { Operation } from '../operation';
import { gaugeAnswer, gaugeRequest } from './gauge';

export const operations: readonly Operation[] = [
  {
    method: 'post',
    path: '/api/gauges/{series}',
    summary: 'Enter a gauge in the register, or change its figures.',
    access: 'signed-in',
    body: gaugeRequest,
    answer: gaugeAnswer,
  },
];
