/** What must be so before anybody can decide, and whether it is. */
export interface Precondition {
  readonly key: 'signed' | 'not-yours' | 'no-interest' | 'open';
  readonly met: boolean;
  readonly words: string;
}

export interface Deciding {
  readonly actorId: string;
  /** Who signed any revision of the report, and who took any reading in it. */
  readonly signedBy: readonly string[];
  readonly takenBy: readonly string[];
  readonly competitorId: string | null;
  readonly reportRevision: number | null;
  /** Number of the notice already published for this revision. */
  readonly publishedNotice: string | null;
}

/** In the order in which a person would check them. */
export const beforeDeciding = (deciding: Deciding): readonly Precondition[] => {
  const { actorId, signedBy, takenBy, competitorId, reportRevision, publishedNotice } = deciding;
  return [
    {
      key: 'signed',
      met: reportRevision !== null,
      words:
        reportRevision === null
          ? 'The inspector has not signed the report yet.'
          : `The report is signed (revision ${reportRevision}).`,
    },
    {
      key: 'not-yours',
      met: !signedBy.includes(actorId) && !takenBy.includes(actorId),
      words:
        signedBy.includes(actorId) || takenBy.includes(actorId)
          ? 'You took readings or signed findings here. Another official decides.'
          : 'You took no reading and signed no finding here.',
    },
    {
      key: 'no-interest',
      met: competitorId !== actorId,
      words:
        competitorId === actorId
          ? 'This is your own entry. Another official decides.'
          : 'This is not your own entry.',
    },
    {
      key: 'open',
      met: publishedNotice === null,
      words:
        publishedNotice === null
          ? 'No verdict has been published on this report.'
          : `Notice ${publishedNotice} has been published on this report.`,
    },
  ];
};
