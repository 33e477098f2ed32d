import { engineRequest } from '@/contracts/bench/engine';
import { workOutEngine } from '@/services/bench/work-out-engine';
import { bench } from './_endpoint';

export const prerender = false;

export const POST = bench(engineRequest, workOutEngine);
