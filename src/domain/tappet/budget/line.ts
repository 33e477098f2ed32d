import type { UncertaintyComponent } from '../../measurement/uncertainty';

/** A line of a budget in metres; sensitivity 1 and known well unless told otherwise. */
export const line = (
  name: string,
  standardUncertainty: number,
  words: string,
  rest: { readonly sensitivity?: number; readonly degreesOfFreedom?: number } = {},
): UncertaintyComponent => ({
  name,
  standardUncertainty,
  sensitivity: rest.sensitivity ?? 1,
  degreesOfFreedom: rest.degreesOfFreedom ?? null,
  words,
});
