import type { Operation } from '../operation';
import { assessRequest, assessResponse } from './assess';
import { clearanceRequest, clearanceResponse } from './clearance';
import { engineRequest, engineResponse } from './engine';
import { studyRequest, studyResponse } from './study';
import { temperatureRequest, temperatureResponse } from './temperature';
import { uncertaintyRequest, uncertaintyResponse } from './uncertainty';

const open = { method: 'post', access: 'public' } as const;

/** The calculators: open to all, limited by client address, nothing is kept. */
export const operations: readonly Operation[] = [
  {
    ...open,
    path: '/api/bench/clearance',
    summary: 'Lifter-bore clearance, form and uncertainty from readings.',
    body: clearanceRequest,
    answer: clearanceResponse,
  },
  {
    ...open,
    path: '/api/bench/uncertainty',
    summary: 'An uncertainty budget added up.',
    body: uncertaintyRequest,
    answer: uncertaintyResponse,
  },
  {
    ...open,
    path: '/api/bench/assess',
    summary: 'A measured value against a requirement, by its decision rule.',
    body: assessRequest,
    answer: assessResponse,
  },
  {
    ...open,
    path: '/api/bench/engine',
    summary: 'An engine quantity from its inputs, with the working.',
    body: engineRequest,
    answer: engineResponse,
  },
  {
    ...open,
    path: '/api/bench/study',
    summary: 'A study of repeatability or agreement.',
    body: studyRequest,
    answer: studyResponse,
  },
  {
    ...open,
    path: '/api/bench/temperature',
    summary: 'A length brought to 20 °C.',
    body: temperatureRequest,
    answer: temperatureResponse,
  },
];
