import { benchInBrowser } from './rulebook/in-browser';
import { benchSteps } from './rulebook/steps';

/**
 * A 300-clause rulebook, written and read. First the single steps, then what a person feels of them in a
 * browser, where a product is running (`npm start`, or the one that TEST_PRODUCT names). It prints figures
 * and judges nothing.
 */
benchSteps();
await benchInBrowser();
