import * as z from 'zod/mini';
import { assessInspection, type InspectionAssessment } from '@/domain/inspection/assess-inspection';
import type { GaugeRecord } from '@/domain/inspection/capture/gauge-record';
import { declaredFacts } from '@/domain/paperwork/declared-facts';
import { readPaperworkDocument } from '../paperwork/document';
import { boreLayout } from '../paperwork/layout';
import { readRulesDocument } from '../rulebook/rules-document';
import type { RawRows } from './batch-rows';

const withId = z.looseObject({ id: z.string(), code: z.string(), kind: z.string() });

/** What of a signed report goes into the arithmetic; the rest of it stands unread. */
const reportShape = z.looseObject({
  document: z.literal('tagwire/report'),
  version: z.literal('1'),
  inspectionId: z.string(),
  carNumber: z.string(),
  rulesHash: z.string(),
  chainHead: z.string(),
  domainVersion: z.string(),
  zone: z.string(),
  layout: boreLayout,
  gauges: z.array(withId),
  paperwork: z.optional(z.unknown()),
  revision: z.looseObject({ number: z.string() }),
});

export type ReportRecord = z.infer<typeof reportShape>;

/** Throws on a text that is no report of this version. */
export const readReportRecord = (document: string): ReportRecord =>
  reportShape.parse(JSON.parse(document));

/** The same arithmetic as in the bay, from raw rows. Throws when rules or paperwork cannot be read. */
export const assessAnew = (
  report: ReportRecord,
  rulesText: string,
  rows: RawRows,
): InspectionAssessment => {
  const rules = readRulesDocument(JSON.parse(rulesText));
  if (!rules.ok) throw new Error(`The rules document cannot be read. ${rules.failure.detail}`);
  const paperwork =
    report.paperwork === undefined ? undefined : readPaperworkDocument(report.paperwork);
  if (paperwork?.ok === false)
    throw new Error(`The paperwork cannot be read. ${paperwork.failure.detail}`);
  return assessInspection({
    rules: rules.value,
    bearer: {
      carNumber: report.carNumber,
      ...(paperwork === undefined ? {} : { engineId: paperwork.value.engine.id }),
    },
    layout: report.layout,
    zone: report.zone,
    ...rows,
    // The shape of a gauge is the register's own; the report holds it as it was at the signing.
    gauges: report.gauges as readonly unknown[] as readonly GaugeRecord[],
    paperwork: paperwork === undefined ? undefined : declaredFacts(paperwork.value),
  });
};
