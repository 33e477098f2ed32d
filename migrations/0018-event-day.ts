import { Migration } from '@mikro-orm/migrations';
import { appendFunction } from './sql';

/**
 * The event day: what an entry says beside its number, changes with their reason, checks without
 * teardown, results that become official by an act, interests that were declared, and what the
 * barn's tablets are told.
 */
export class EventDay extends Migration {
  override up(): void {
    this.addSql(`
alter table public.entry
  add column driver text not null default '' check (length(driver) <= 120),
  -- Lap times as they were written, in order.
  add column laps jsonb not null default '[]'::jsonb`);
    this.addSql(`
create table public.column_choice (
  series_id uuid not null references public.series (id),
  purpose text not null check (purpose in ('entries')),
  -- Which column of a file a field was found under, by the column's name in small letters.
  columns jsonb not null,
  updated_by uuid not null references public.person (id),
  updated_at timestamptz not null,
  primary key (series_id, purpose)
)`);
    this.addSql(`
create table record.entry_change (
  series_id uuid not null,
  id uuid not null,
  event_id uuid not null,
  entry_id uuid not null,
  kind text not null check (kind in ('late-entry', 'scratched', 'restored', 'class', 'engine', 'driver')),
  was text not null default '',
  becomes text not null default '',
  reason text not null check (length(reason) > 0),
  changed_by uuid not null references public.person (id),
  act_id uuid not null,
  received_at timestamptz not null default clock_timestamp(),
  primary key (series_id, id),
  foreign key (series_id, entry_id) references public.entry (series_id, id)
)`);
    this.addSql(
      'create index entry_change_by_event on record.entry_change (series_id, event_id, received_at)',
    );
    this.addSql('create index entry_change_by_act on record.entry_change (act_id)');
    this.addSql(
      appendFunction('entry_change', [
        'series_id',
        'id',
        'event_id',
        'entry_id',
        'kind',
        'was',
        'becomes',
        'reason',
        'changed_by',
        'act_id',
      ]),
    );

    // The last statement of a class at an event says whether its results are official.
    this.addSql(`
create table record.result_statement (
  series_id uuid not null,
  event_id uuid not null,
  class_id uuid not null,
  number integer not null check (number > 0),
  kind text not null check (kind in ('official', 'taken-back')),
  document text not null,
  hash bytea not null check (length(hash) = 32),
  stated_by uuid not null references public.person (id),
  stated_at timestamptz not null,
  act_id uuid not null,
  received_at timestamptz not null default clock_timestamp(),
  primary key (series_id, event_id, class_id, number),
  foreign key (series_id, event_id) references public.event (series_id, id),
  foreign key (series_id, class_id) references public.class (series_id, id)
)`);
    this.addSql('create index result_statement_by_act on record.result_statement (act_id)');
    this.addSql(
      appendFunction('result_statement', [
        'series_id',
        'event_id',
        'class_id',
        'number',
        'kind',
        'document',
        'hash',
        'stated_by',
        'stated_at',
        'act_id',
      ]),
    );

    // A check at the scales or the line, without teardown. The last one of a car and clause counts;
    // one that is taken back is a row without an answer.
    this.addSql(`
create table record.event_check (
  series_id uuid not null,
  id uuid not null,
  event_id uuid not null,
  entry_id uuid not null,
  clause text not null check (length(clause) > 0),
  rules_hash bytea not null,
  answer text not null default '',
  value_text text,
  value_unit text,
  value_exact numeric,
  gauge_id uuid,
  state text not null check (state in ('within', 'outside', 'no-statement', 'taken-back')),
  sentence text not null default '',
  reason text not null default '',
  taken_by uuid not null references public.person (id),
  taken_at timestamptz not null,
  act_id uuid not null,
  received_at timestamptz not null default clock_timestamp(),
  primary key (series_id, id),
  foreign key (series_id, event_id) references public.event (series_id, id),
  foreign key (series_id, entry_id) references public.entry (series_id, id),
  foreign key (series_id, gauge_id) references public.gauge (series_id, id),
  foreign key (series_id, rules_hash) references record.rules (series_id, hash),
  check ((value_text is null) = (value_unit is null) and (value_text is null) = (value_exact is null)),
  check (state <> 'taken-back' or length(reason) > 0)
)`);
    this.addSql(
      'create index event_check_by_event on record.event_check (series_id, event_id, entry_id, clause)',
    );
    this.addSql('create index event_check_by_gauge on record.event_check (series_id, gauge_id)');
    this.addSql('create index event_check_by_act on record.event_check (act_id)');
    this.addSql(
      appendFunction('event_check', [
        'series_id',
        'id',
        'event_id',
        'entry_id',
        'clause',
        'rules_hash',
        'answer',
        'value_text',
        'value_unit',
        'value_exact',
        'gauge_id',
        'state',
        'sentence',
        'reason',
        'taken_by',
        'taken_at',
        'act_id',
      ]),
    );
    this.addSql(`
create table record.event_clearance (
  series_id uuid not null,
  event_id uuid not null,
  number integer not null check (number > 0),
  document text not null,
  hash bytea not null check (length(hash) = 32),
  signed_by uuid not null references public.person (id),
  signature jsonb not null,
  signed_at timestamptz not null,
  act_id uuid not null,
  received_at timestamptz not null default clock_timestamp(),
  primary key (series_id, event_id, number),
  foreign key (series_id, event_id) references public.event (series_id, id)
)`);
    this.addSql('create index event_clearance_by_act on record.event_clearance (act_id)');
    this.addSql(
      appendFunction('event_clearance', [
        'series_id',
        'event_id',
        'number',
        'document',
        'hash',
        'signed_by',
        'signature',
        'signed_at',
        'act_id',
      ]),
    );

    // Who may not inspect whom, beside what the records show by themselves.
    this.addSql(`
create table public.interest (
  series_id uuid not null references public.series (id),
  id uuid not null,
  person_id uuid not null references public.person (id),
  kind text not null check (kind in ('team', 'builder', 'relation', 'other')),
  -- Of a competitor with an account, else of a car by its number.
  competitor_id uuid references public.person (id),
  car_number text check (car_number ~ '^[0-9A-Z]{1,6}$'),
  words text not null default '' check (length(words) <= 300),
  declared_by uuid not null references public.person (id),
  declared_at timestamptz not null,
  ended_at timestamptz,
  primary key (series_id, id),
  check ((competitor_id is null) <> (car_number is null))
)`);
    this.addSql(
      'create index interest_standing on public.interest (series_id, person_id) where ended_at is null',
    );

    this.addSql("alter table public.inspection add column place text not null default ''");
    this.tellBarn();
  }

  /**
   * Who listens on `tagwire_barn` hears of every change of an inspection and of every sending from a
   * tablet when its transaction commits: which one and where it stands, no name and no value.
   */
  private tellBarn(): void {
    this.addSql(`
create function public.tell_barn_inspection() returns trigger
language plpgsql set search_path = pg_catalog, pg_temp as $fn$
begin
  perform pg_notify('tagwire_barn', json_build_object('series', new.series_id, 'kind', 'inspection',
    'inspection', new.id, 'state', new.state, 'version', new.version)::text);
  return null;
end $fn$`);
    this.addSql(`
create trigger tell_barn after insert or update on public.inspection
for each row execute function public.tell_barn_inspection()`);
    this.addSql(`
create function public.tell_barn_readings() returns trigger
language plpgsql set search_path = pg_catalog, pg_temp as $fn$
declare said record;
begin
  for said in
    select f.series_id, f.inspection_id, f.taken_by, max(f.batch) as batch,
           (array_agg(distinct trim(f.cylinder || ' ' || f.valve)))[1:24] as places
    from fresh f group by f.series_id, f.inspection_id, f.taken_by
  loop
    perform pg_notify('tagwire_barn', json_build_object('series', said.series_id, 'kind', 'readings',
      'inspection', said.inspection_id, 'batch', said.batch, 'by', said.taken_by,
      'places', said.places)::text);
  end loop;
  return null;
end $fn$`);
    for (const table of ['reading', 'remark']) {
      this.addSql(`
create trigger tell_barn after insert on record.${table}
referencing new table as fresh for each statement execute function public.tell_barn_readings()`);
    }
    this.addSql(`
create function public.tell_barn_check() returns trigger
language plpgsql set search_path = pg_catalog, pg_temp as $fn$
begin
  perform pg_notify('tagwire_barn', json_build_object('series', new.series_id, 'kind', 'check',
    'event', new.event_id, 'entry', new.entry_id, 'state', new.state)::text);
  return null;
end $fn$`);
    this.addSql(`
create trigger tell_barn after insert on record.event_check
for each row execute function public.tell_barn_check()`);
  }
}
