import { temperatureRequest } from '@/contracts/bench/temperature';
import { correctTemperature } from '@/services/bench/correct-temperature';
import { bench } from './_endpoint';

export const prerender = false;

export const POST = bench(temperatureRequest, correctTemperature);
