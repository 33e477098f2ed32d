import { defineEntity, type InferEntity } from '@mikro-orm/core';

export const RulesQuestion = defineEntity({
  name: 'RulesQuestion',
  tableName: 'rules_question',
  properties: (p) => ({
    seriesId: p.uuid().primary(),
    id: p.uuid().primary(),
    classId: p.uuid(),
    clause: p.text(),
    question: p.text(),
    askedBy: p.uuid(),
    askedAt: p.datetime(),
    state: p.text().$type<'open' | 'answered' | 'clarified'>(),
    answer: p.text(),
    answeredBy: p.uuid().nullable(),
    answeredAt: p.datetime().nullable(),
    clarificationId: p.uuid().nullable(),
    version: p.integer().version(),
  }),
});

export type RulesQuestion = InferEntity<typeof RulesQuestion>;
