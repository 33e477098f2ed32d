import { Migration } from '@mikro-orm/migrations';
import { appendFunction } from './sql';

/**
 * What becomes of a bulletin after it is published: the accepted engines that it makes illegal, who
 * was told, and who says to have read it. A clarification can be withdrawn by a publication of its own.
 */
export class BulletinsRead extends Migration {
  override up(): void {
    this.addSql(`
alter table record.rule_publication
  drop constraint rule_publication_kind_check,
  add constraint rule_publication_kind_check
    check (kind in ('edition', 'bulletin', 'clarification', 'waiver', 'withdrawal'))`);
    this.addSql(`
create table record.bulletin_engine (
  series_id uuid not null,
  bulletin_id uuid not null,
  paperwork_id uuid not null,
  engine_id uuid not null,
  car_number text not null,
  name text not null,
  -- JSON: clause, heading and sentence of each requirement that it would no longer meet.
  results text not null,
  act_id uuid not null,
  received_at timestamptz not null default clock_timestamp(),
  primary key (series_id, bulletin_id, paperwork_id),
  foreign key (series_id, bulletin_id) references record.rule_publication (series_id, id),
  foreign key (series_id, paperwork_id) references public.paperwork (series_id, id)
)`);
    this.addSql(
      appendFunction('bulletin_engine', [
        'series_id',
        'bulletin_id',
        'paperwork_id',
        'engine_id',
        'car_number',
        'name',
        'results',
        'act_id',
      ]),
    );
    this.addSql('create index bulletin_engine_by_act on record.bulletin_engine (act_id)');
    // By the person alone, or by an official at sign-on, who names the one standing there.
    this.addSql(`
create table record.bulletin_acknowledgement (
  series_id uuid not null,
  id uuid not null,
  bulletin_id uuid not null,
  -- Of the document that was read.
  hash bytea not null check (length(hash) = 32),
  way text not null check (way in ('own', 'in-person')),
  person_id uuid references public.person (id),
  entry_id uuid,
  name text not null check (length(name) between 1 and 120),
  recorded_by uuid not null references public.person (id),
  acknowledged_at timestamptz not null,
  act_id uuid not null,
  received_at timestamptz not null default clock_timestamp(),
  primary key (series_id, id),
  foreign key (series_id, bulletin_id) references record.rule_publication (series_id, id),
  foreign key (series_id, entry_id) references public.entry (series_id, id),
  check ((way = 'in-person') = (entry_id is not null)),
  check (way = 'in-person' or person_id is not null)
)`);
    this.addSql(
      appendFunction('bulletin_acknowledgement', [
        'series_id',
        'id',
        'bulletin_id',
        'hash',
        'way',
        'person_id',
        'entry_id',
        'name',
        'recorded_by',
        'acknowledged_at',
        'act_id',
      ]),
    );
    this.addSql(
      'create index bulletin_acknowledgement_by_act on record.bulletin_acknowledgement (act_id)',
    );
    this.addSql(`
create index bulletin_acknowledgement_by_bulletin
  on record.bulletin_acknowledgement (series_id, bulletin_id)`);
    // Which message told whom; without paperwork it tells of the bulletin alone.
    this.addSql(`
create table public.bulletin_mail (
  series_id uuid not null,
  bulletin_id uuid not null,
  mail_id uuid not null references public.mail (id) deferrable initially deferred,
  person_id uuid not null references public.person (id),
  paperwork_id uuid,
  primary key (series_id, bulletin_id, mail_id)
)`);
  }
}
