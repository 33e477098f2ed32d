import { expectUploadResponse, fileActRequest, keptFile } from '../file/file';
import type { Operation } from '../operation';
import {
  actAnswer,
  assignRequest,
  reviseRequest,
  signAnswer,
  signRequest,
  stateRequest,
} from './acts';
import { capturesAnswer, capturesRequest } from './captures';
import { expectPhotographRequest } from './photograph';
import { sheetNow } from './sheet';

const signedIn = { method: 'post', access: 'signed-in' } as const;

export const operations: readonly Operation[] = [
  {
    method: 'get',
    access: 'signed-in',
    path: '/api/barn/{series}/live',
    summary:
      'Hear at once what changes in a series’ barn, as server-sent events: `refresh`, `same`, `news`, `beat`.',
    query: [
      { name: 'since', words: 'The last id that was heard, where no Last-Event-ID is sent.' },
    ],
    answerType: 'text/event-stream',
  },
  {
    ...signedIn,
    path: '/api/inspections/{id}/captures',
    summary: 'Record readings, zeros and remarks taken in the bay, exactly once.',
    body: capturesRequest,
    answer: capturesAnswer,
  },
  {
    method: 'get',
    access: 'signed-in',
    path: '/api/inspections/{id}/sheet',
    summary: 'The sheet in the bay as it is now: rows, state and gauges.',
    query: [
      {
        name: 'second',
        words: 'A bore whose earlier sets are left out for an independent one; may be repeated.',
      },
      { name: 'set', words: 'Number of the independent set; 2 where it is left out.' },
    ],
    answer: sheetNow,
  },
  {
    ...signedIn,
    path: '/api/inspections/{id}/photographs',
    summary: 'Announce a photograph of the bay; its bytes go straight to the object store.',
    body: expectPhotographRequest,
    answer: expectUploadResponse,
  },
  {
    ...signedIn,
    path: '/api/inspections/{id}/photographs/{file}',
    summary: 'Have a photograph read back, sized and hashed, so that it counts.',
    body: fileActRequest,
    answer: keptFile,
  },
  {
    ...signedIn,
    path: '/api/inspections/{id}/assignment',
    summary: 'Name the inspector and the bay.',
    body: assignRequest,
    answer: actAnswer,
  },
  {
    ...signedIn,
    path: '/api/inspections/{id}/state',
    summary: 'Open, hold, refuse, stop, defer or take up an inspection.',
    body: stateRequest,
    answer: actAnswer,
  },
  {
    ...signedIn,
    path: '/api/inspections/{id}/report',
    summary: 'Sign the report and close the inspection; needs a fresh sign-in.',
    body: signRequest,
    answer: signAnswer,
  },
  {
    ...signedIn,
    path: '/api/inspections/{id}/correction',
    summary: 'Open a closed report for a correction, with its reason.',
    body: reviseRequest,
    answer: actAnswer,
  },
];
