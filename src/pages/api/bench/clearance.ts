import { clearanceRequest } from '@/contracts/bench/clearance';
import { checkClearance } from '@/services/bench/check-clearance';
import { bench } from './_endpoint';

export const prerender = false;

export const POST = bench(clearanceRequest, checkClearance);
