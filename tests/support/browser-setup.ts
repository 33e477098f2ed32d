import { readProduct } from './product';

/** Vitest's global set-up of the browser project: says at once when there is nothing to look at. */
export default function setup(): void {
  readProduct();
}
