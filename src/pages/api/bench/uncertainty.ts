import { uncertaintyRequest } from '@/contracts/bench/uncertainty';
import { combineUncertainty } from '@/services/bench/combine-uncertainty';
import { bench } from './_endpoint';

export const prerender = false;

export const POST = bench(uncertaintyRequest, combineUncertainty);
