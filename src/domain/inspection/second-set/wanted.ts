import type { InspectionAssessment } from '../assess-inspection';
import type { SecondAsked } from './asked';

/** An independent set that is wanted at one bore. */
export interface WantedSet {
  readonly bore: string;
  /** Its number: 2 beside a first one, 3 where two differ and their clause wants each to stand by itself. */
  readonly set: number;
}

/**
 * Bores where an independent set is wanted, the earlier ones hidden: a mandatory number too close to
 * call with one set only, a breach that one set alone shows where its clause wants two, or sets that
 * differ. Only those bores, in the order of the sheet.
 */
export const secondSetsWanted = (
  assessment: Pick<InspectionAssessment, 'bores' | 'findings'>,
): readonly WantedSet[] => {
  const results = assessment.findings
    .filter((finding) => !finding.advisory)
    .flatMap((finding) => finding.perPosition);
  return assessment.bores.flatMap(({ key, sets }): readonly WantedSet[] => {
    const here = results.filter(({ position }) => position === key);
    const last = Math.max(1, ...sets.map(({ set }) => set.set));
    if (here.some(({ wants }) => wants === 'new-set')) return [{ bore: key, set: last + 1 }];
    const second =
      here.some(({ wants }) => wants === 'second-set') ||
      (sets.length === 1 && here.some(({ state }) => state === 'too-close'));
    return second ? [{ bore: key, set: 2 }] : [];
  });
};

/** One set that is taken now, and the other bores where the same is wanted: hidden and led through with it. */
export const withOthers = (
  wanted: readonly WantedSet[],
  { bore, set }: WantedSet,
): SecondAsked => ({
  bores: [
    bore,
    ...wanted.filter((one) => one.bore !== bore && one.set === set).map((one) => one.bore),
  ],
  set,
});
