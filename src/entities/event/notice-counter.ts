import { defineEntity, type InferEntity } from '@mikro-orm/core';

export const NoticeCounter = defineEntity({
  name: 'NoticeCounter',
  tableName: 'notice_counter',
  properties: (p) => ({
    seriesId: p.uuid().primary(),
    seasonId: p.uuid().primary(),
    last: p.integer(),
  }),
});

export type NoticeCounter = InferEntity<typeof NoticeCounter>;
