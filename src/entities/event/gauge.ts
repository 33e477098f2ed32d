import { defineEntity, type InferEntity } from '@mikro-orm/core';

export const GaugeRow = defineEntity({
  name: 'GaugeRow',
  tableName: 'gauge',
  properties: (p) => ({
    seriesId: p.uuid().primary(),
    id: p.uuid().primary(),
    code: p.text(),
    description: p.json<Record<string, unknown>>(),
    status: p.text().$type<'in-use' | 'withdrawn'>(),
    version: p.integer().version(),
  }),
});

export type GaugeRow = InferEntity<typeof GaugeRow>;
