import type { Operation } from '../operation';
import {
  checkResponse,
  decideRequest,
  decideResponse,
  handInRequest,
  handInResponse,
  openDraftResponse,
  saveDraftRequest,
  saveDraftResponse,
} from './paperwork';

export const operations: readonly Operation[] = [
  {
    method: 'post',
    path: '/api/paperwork/{paperwork}/draft',
    summary: 'Save a draft as it is typed; a newer one on the server is not overwritten',
    access: 'signed-in',
    body: saveDraftRequest,
    answer: saveDraftResponse,
  },
  {
    method: 'get',
    path: '/api/paperwork/{paperwork}/draft',
    summary: 'The draft as the server has it, for a device that was overtaken by another',
    access: 'signed-in',
    answer: openDraftResponse,
  },
  {
    method: 'get',
    path: '/api/paperwork/{paperwork}/check',
    summary: 'The saved draft against every clause of the rules in force',
    access: 'signed-in',
    answer: checkResponse,
  },
  {
    method: 'post',
    path: '/api/paperwork/{paperwork}/hand-in',
    summary: 'Hand in the saved draft as the next version, which is kept for good',
    access: 'signed-in',
    body: handInRequest,
    answer: handInResponse,
  },
  {
    method: 'post',
    path: '/api/paperwork/{paperwork}/decision',
    summary: 'Accept paperwork, or return it with remarks per item',
    access: 'signed-in',
    body: decideRequest,
    answer: decideResponse,
  },
  {
    method: 'get',
    path: '/api/paperwork/{paperwork}/template/{sheet}',
    summary: 'A measurement sheet to fill in, as CSV or XLSX',
    access: 'signed-in',
  },
];
