import { defineEntity, type InferEntity } from '@mikro-orm/core';
import type { GaugeRecord } from '@/domain/inspection/capture/gauge-record';
import type { Written } from '@/domain/quantity/dimension';

/** What the register keeps of a gauge beside its code; a setting ring also has its size. */
export interface GaugeFigures extends Omit<GaugeRecord, 'id' | 'code' | 'ringChecks' | 'faults'> {
  readonly name: string;
  readonly size?: Written | undefined;
  /** The kept file of its certificate. */
  readonly certificateFile?: string | undefined;
}

export const GaugeRow = defineEntity({
  name: 'GaugeRow',
  tableName: 'gauge',
  properties: (p) => ({
    seriesId: p.uuid().primary(),
    id: p.uuid().primary(),
    code: p.text(),
    description: p.json<GaugeFigures>(),
    status: p.text().$type<'in-use' | 'withdrawn'>(),
    version: p.integer().version(),
  }),
});

export type GaugeRow = InferEntity<typeof GaugeRow>;
