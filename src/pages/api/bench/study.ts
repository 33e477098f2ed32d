import { studyRequest } from '@/contracts/bench/study';
import { evaluateStudy } from '@/services/bench/evaluate-study';
import { bench } from './_endpoint';

export const prerender = false;

export const POST = bench(studyRequest, evaluateStudy);
