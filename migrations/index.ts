import type { MigrationObject } from '@mikro-orm/core';
import { SchemasAndRoles } from './0001-schemas-and-roles';
import { PeopleAndSeries } from './0002-people-and-series';
import { TheRecord } from './0003-the-record';
import { Rulebooks } from './0004-rulebooks';
import { EnginePaperwork } from './0005-engine-paperwork';
import { EventsAndInspections } from './0006-events-and-inspections';
import { Verdicts } from './0007-verdicts';
import { RulesQuestions } from './0008-rules-questions';
import { Draws } from './0009-draws';
import { RowsByAct } from './0010-rows-by-act';
import { Erasure } from './0011-erasure';
import { StrokesAndRetention } from './0012-strokes-and-retention';
import { BulletinsRead } from './0013-bulletins-read';
import { EnginesBetweenPeople } from './0014-engines-between-people';
import { RememberedColumns } from './0015-remembered-columns';
import { MailAndUploads } from './0016-mail-and-uploads';
import { SetsAndRacks } from './0017-sets-and-racks';
import { EventDay } from './0018-event-day';
import { GaugesAndCustody } from './0019-gauges-and-custody';
import { OwnReadings } from './0022-own-readings';
import { DaysAfterASwap } from './0024-days-after-a-swap';

/** In order of application. A new migration is added here by hand. */
export const migrationsList: MigrationObject[] = [
  { name: '0001-schemas-and-roles', class: SchemasAndRoles },
  { name: '0002-people-and-series', class: PeopleAndSeries },
  { name: '0003-the-record', class: TheRecord },
  { name: '0004-rulebooks', class: Rulebooks },
  { name: '0005-engine-paperwork', class: EnginePaperwork },
  { name: '0006-events-and-inspections', class: EventsAndInspections },
  { name: '0007-verdicts', class: Verdicts },
  { name: '0008-rules-questions', class: RulesQuestions },
  { name: '0009-draws', class: Draws },
  { name: '0010-rows-by-act', class: RowsByAct },
  { name: '0011-erasure', class: Erasure },
  { name: '0012-strokes-and-retention', class: StrokesAndRetention },
  { name: '0013-bulletins-read', class: BulletinsRead },
  { name: '0014-engines-between-people', class: EnginesBetweenPeople },
  { name: '0015-remembered-columns', class: RememberedColumns },
  { name: '0016-mail-and-uploads', class: MailAndUploads },
  { name: '0017-sets-and-racks', class: SetsAndRacks },
  { name: '0018-event-day', class: EventDay },
  { name: '0019-gauges-and-custody', class: GaugesAndCustody },
  { name: '0022-own-readings', class: OwnReadings },
  { name: '0024-days-after-a-swap', class: DaysAfterASwap },
];
