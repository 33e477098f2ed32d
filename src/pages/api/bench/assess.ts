import { assessRequest } from '@/contracts/bench/assess';
import { assessValue } from '@/services/bench/assess-value';
import { bench } from './_endpoint';

export const prerender = false;

export const POST = bench(assessRequest, assessValue);
