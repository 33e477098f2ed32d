import { assessInspection, type InspectionAssessment } from '@/domain/inspection/assess-inspection';
import { declaredFacts } from '@/domain/paperwork/declared-facts';
import type { InspectionFile } from './inspection-file';

/** The same assessment as on the tablet, on the rows as the server has them. */
export const assessFile = (file: InspectionFile): InspectionAssessment =>
  assessInspection({
    rules: file.rules,
    bearer: {
      carNumber: file.entry.carNumber,
      ...(file.paperwork === null ? {} : { engineId: file.paperwork.engine.id }),
    },
    layout: file.inspection.layout,
    zone: file.event.zone,
    readings: file.rows.readings,
    zeros: file.rows.zeros,
    remarks: file.rows.remarks,
    gauges: file.gauges,
    paperwork: file.paperwork === null ? undefined : declaredFacts(file.paperwork),
  });
