import type { Operation } from '../operation';

export const operations: readonly Operation[] = [
  {
    method: 'get',
    path: '/api/inspections/{id}/case-file',
    summary:
      'One inspection’s whole file: lines with proofs, what they commit to, all readings, the rules.',
    access: 'signed-in',
    answerType: 'application/json',
  },
];
