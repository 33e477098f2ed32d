import type { Operation } from '../operation';
import { consistencyAnswer, inclusionAnswer, keysAnswer, linesAnswer } from './answers';

const open = { method: 'get', access: 'public' } as const;
const at = '/api/ledger/{series}' as const;
const sizeWords = (name: string) => `${name}; the newest signed head unless given.`;

export const operations: readonly Operation[] = [
  {
    ...open,
    path: `${at}/checkpoint`,
    summary: 'A signed head of the series’ ledger, byte for byte.',
    query: [{ name: 'size', words: sizeWords('Number of lines of a signed head') }],
    answerType: 'text/plain',
  },
  {
    ...open,
    path: `${at}/keys`,
    summary: 'The keys that sign for the series, each with the line that published it.',
    answer: keysAnswer,
  },
  {
    ...open,
    path: `${at}/lines`,
    summary: 'Lines of the ledger in order, at most 500, with the salts of their public content.',
    query: [
      { name: 'from', words: 'Number of the first line, from 0.', required: true },
      { name: 'count', words: 'How many; 100 unless given.' },
    ],
    answer: linesAnswer,
  },
  {
    ...open,
    path: `${at}/inclusion`,
    summary: 'A line, its inclusion path, and the signed head that the path leads to.',
    query: [
      { name: 'index', words: 'Number of the line, from 0.', required: true },
      { name: 'size', words: sizeWords('Number of lines of a signed head') },
    ],
    answer: inclusionAnswer,
  },
  {
    ...open,
    path: `${at}/consistency`,
    summary: 'The path that shows a signed head to contain an older one unchanged.',
    query: [
      { name: 'from', words: 'Number of lines of the older head.', required: true },
      { name: 'to', words: sizeWords('Number of lines of the newer, signed head') },
    ],
    answer: consistencyAnswer,
  },
  {
    ...open,
    path: `${at}/notices/{number}`,
    summary: 'A notice with its proof: what its PDF carries as an attached file.',
    answerType: 'application/json',
  },
  {
    ...open,
    path: `${at}/notices/{number}/pdf`,
    summary: 'The proof of the line that holds the SHA-256 of the notice’s PDF.',
    answerType: 'application/json',
  },
];
