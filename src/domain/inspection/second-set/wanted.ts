import type { InspectionAssessment } from '../assess-inspection';

/**
 * Bores where an independent second set is wanted, the first hidden: a mandatory number that is too
 * close to call, and one set only. In the order of the sheet.
 */
export const secondSetsWanted = (
  assessment: Pick<InspectionAssessment, 'bores' | 'findings'>,
): readonly string[] => {
  const near = new Set(
    assessment.findings
      .filter((finding) => !finding.advisory)
      .flatMap((finding) => finding.perPosition)
      .filter((result) => result.state === 'too-close')
      .map((result) => result.position),
  );
  return assessment.bores
    .filter(({ key, sets }) => near.has(key) && sets.length === 1)
    .map(({ key }) => key);
};
