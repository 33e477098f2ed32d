import type { Operation } from '../operation';
import {
  readSheetRequest,
  readSheetResponse,
  rememberColumnsRequest,
  rememberColumnsResponse,
} from '../paperwork/sheet';
import {
  confirmUploadRequest,
  expectUploadRequest,
  expectUploadResponse,
  fileActRequest,
  keptFile,
} from './file';

export const operations: readonly Operation[] = [
  {
    method: 'post',
    path: '/api/paperwork/{paperwork}/files',
    summary: 'Announce a photograph or a sheet and learn where to put its bytes',
    access: 'signed-in',
    body: expectUploadRequest,
    answer: expectUploadResponse,
  },
  {
    method: 'post',
    path: '/api/files/{file}/confirm',
    summary: 'Have the bytes that arrived read, sized and hashed; only then the file counts',
    access: 'signed-in',
    body: confirmUploadRequest,
    answer: keptFile,
  },
  {
    method: 'post',
    path: '/api/files/{file}/remove',
    summary: 'Take a file out of a draft; versions that were handed in keep it',
    access: 'signed-in',
    body: fileActRequest,
  },
  {
    method: 'post',
    path: '/api/files/{file}/sheet',
    summary: 'Read the numbers of a kept sheet, with every cell and row that cannot be used',
    access: 'signed-in',
    body: readSheetRequest,
    answer: readSheetResponse,
  },
  {
    method: 'post',
    path: '/api/files/{file}/columns',
    summary: 'Keep what the columns of a sheet hold, for the next file with the same headings',
    access: 'signed-in',
    body: rememberColumnsRequest,
    answer: rememberColumnsResponse,
  },
  {
    method: 'get',
    path: '/api/sheets/{file}/corrections',
    summary: 'The sheet as it was sent, with a column that says what to correct in each row',
    access: 'signed-in',
  },
  {
    method: 'get',
    path: '/api/files/{file}/preview/{width}',
    summary: 'A smaller picture of a photograph, without position data',
    access: 'signed-in',
  },
  {
    method: 'get',
    path: '/api/files/{file}/original',
    summary: 'The file byte for byte, as a download',
    access: 'signed-in',
  },
];
