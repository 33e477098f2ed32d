import { defineEntity, type InferEntity } from '@mikro-orm/core';
import type { InterestKind } from '@/domain/access/interest-kind';

/** An interest that was declared: this person inspects neither this competitor nor this car. */
export const Interest = defineEntity({
  name: 'Interest',
  tableName: 'interest',
  properties: (p) => ({
    seriesId: p.uuid().primary(),
    id: p.uuid().primary(),
    personId: p.uuid(),
    kind: p.text().$type<InterestKind>(),
    competitorId: p.uuid().nullable(),
    carNumber: p.text().nullable(),
    words: p.text(),
    declaredBy: p.uuid(),
    declaredAt: p.datetime(),
    endedAt: p.datetime().nullable(),
  }),
});

export type Interest = InferEntity<typeof Interest>;
