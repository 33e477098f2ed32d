import type { EntityManager } from '@mikro-orm/postgresql';
import type { InspectionAssessment } from '@/domain/inspection/assess-inspection';
import type { Inspection } from '@/entities/event/inspection';

/** What the last tablet made of its rows, beside what the server makes of them. */
export interface TabletComparison {
  readonly tabletVersion: string;
  readonly serverVersion: string;
  readonly differences: readonly {
    readonly clause: string;
    readonly tablet: string;
    readonly server: string;
  }[];
}

/** Nothing where the last batch came without an assessment: no tablet has seen all that is here. */
export const compareWithTablet = async (
  em: EntityManager,
  { seriesId, id }: Pick<Inspection, 'seriesId' | 'id'>,
  assessment: InspectionAssessment,
): Promise<TabletComparison | undefined> => {
  const [row] = await em.execute<
    { tablet: { domainVersion: string; states: Record<string, string> } | null }[]
  >(
    `select document::jsonb -> 'tablet' as tablet from record.capture_batch
     where series_id = ? and inspection_id = ?
     order by number desc limit 1`,
    [seriesId, id],
  );
  if (row === undefined || row.tablet === null) return undefined;
  const { domainVersion, states } = row.tablet;
  return {
    tabletVersion: domainVersion,
    serverVersion: assessment.domainVersion,
    differences: assessment.findings.flatMap(({ clause, state }) => {
      const tablet = states[clause];
      return tablet === undefined || tablet === state ? [] : [{ clause, tablet, server: state }];
    }),
  };
};
