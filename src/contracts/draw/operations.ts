import type { Operation } from '../operation';
import {
  announcedAnswer,
  announceRequest,
  madeAnswer,
  pickDrawnRequest,
  pickedAnswer,
  publicDrawAnswer,
  valuesRequest,
  voidAnswer,
  voidRequest,
} from './draw';

const signedIn = { method: 'post', access: 'signed-in' } as const;
const open = { method: 'get', access: 'public' } as const;
const one = '/api/draws/{series}/{draw}' as const;

export const operations: readonly Operation[] = [
  {
    ...signedIn,
    path: '/api/draws/{series}',
    summary:
      'Announce a draw before the session: pool, values to come and the hash of a secret that nobody can read.',
    body: announceRequest,
    answer: announcedAnswer,
  },
  {
    ...open,
    path: one,
    summary: 'A draw as published: its documents, their ledger lines and proofs.',
    answer: publicDrawAnswer,
  },
  {
    ...open,
    path: `${one}/documents/{name}`,
    summary: 'commitment.json, made.json or void.json, byte for byte as it was hashed.',
    answerType: 'application/json',
  },
  {
    ...signedIn,
    path: `${one}/values`,
    summary: 'Enter the values and make the draw: secret, values and result are published at once.',
    body: valuesRequest,
    answer: madeAnswer,
  },
  {
    ...signedIn,
    path: `${one}/void`,
    summary: 'Declare a draw void, with a public reason; a draw that was made cannot be.',
    body: voidRequest,
    answer: voidAnswer,
  },
  {
    ...signedIn,
    path: `${one}/picks`,
    summary: 'Open the inspections of the drawn cars that are neither picked nor withdrawn.',
    body: pickDrawnRequest,
    answer: pickedAnswer,
  },
];
