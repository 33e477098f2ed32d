import { Migration } from '@mikro-orm/migrations';
import { appendFunction } from './sql';

/**
 * Draws: announced, then made or void. What is published stands in `record`. The secret stands in a
 * schema that the application cannot read; it comes out once, with the draw's end.
 */
export class Draws extends Migration {
  override up(): void {
    this.addSql(`
create table record.draw (
  series_id uuid not null,
  id uuid not null,
  event_id uuid not null,
  class_id uuid not null,
  -- SHA-256 in hex of the void draw's document that this one follows.
  follows text not null default '' check (follows ~ '^([0-9a-f]{64})?$'),
  document text not null,
  hash bytea not null check (length(hash) = 32),
  session_at timestamptz not null,
  announced_by uuid not null references public.person (id),
  announced_at timestamptz not null check (announced_at < session_at),
  act_id uuid not null,
  received_at timestamptz not null default clock_timestamp(),
  primary key (series_id, id),
  -- One first draw for a class at an event, and one after each void draw.
  unique (series_id, event_id, class_id, follows),
  foreign key (series_id, event_id) references public.event (series_id, id),
  foreign key (series_id, class_id) references public.class (series_id, id)
)`);
    this.addSql(
      appendFunction('draw', [
        'series_id',
        'id',
        'event_id',
        'class_id',
        'follows',
        'document',
        'hash',
        'session_at',
        'announced_by',
        'announced_at',
        'act_id',
      ]),
    );
    // The key allows a draw one end: made or void, once.
    this.addSql(`
create table record.draw_end (
  series_id uuid not null,
  draw_id uuid not null,
  kind text not null check (kind in ('made', 'void')),
  document text not null,
  hash bytea not null check (length(hash) = 32),
  ended_by uuid not null references public.person (id),
  ended_at timestamptz not null,
  act_id uuid not null,
  received_at timestamptz not null default clock_timestamp(),
  primary key (series_id, draw_id),
  foreign key (series_id, draw_id) references record.draw (series_id, id)
)`);
    this.addSql(
      appendFunction('draw_end', [
        'series_id',
        'draw_id',
        'kind',
        'document',
        'hash',
        'ended_by',
        'ended_at',
        'act_id',
      ]),
    );

    this.addSql('create schema sealed');
    this.addSql(`
create table sealed.draw_secret (
  series_id uuid not null,
  draw_id uuid not null,
  secret bytea not null check (length(secret) = 32),
  opened_at timestamptz,
  primary key (series_id, draw_id),
  foreign key (series_id, draw_id) references record.draw (series_id, id)
)`);
    this.addSql(`
create function append.draw_secret(p_rows jsonb) returns integer
language plpgsql security definer set search_path = pg_catalog, pg_temp as $fn$
declare n integer;
begin
  insert into sealed.draw_secret (series_id, draw_id, secret)
  select r.series_id, r.draw_id, r.secret
  from pg_catalog.jsonb_populate_recordset(null::sealed.draw_secret, p_rows) as r
  join record.draw d on d.series_id = r.series_id and d.id = r.draw_id
  where (d.document::jsonb ->> 'secretHash')
        = encode(sha256(convert_to('tagwire/draw-secret/1', 'UTF8') || '\\x00'::bytea || r.secret), 'hex');
  get diagnostics n = row_count;
  if n <> pg_catalog.jsonb_array_length(p_rows) then
    raise exception 'a secret is not the one its draw was announced with' using errcode = '22023';
  end if;
  return n;
end $fn$`);
    // Nothing for a secret that came out before. Whoever asks at the same time waits.
    this.addSql(`
create function append.open_draw_secret(p_series uuid, p_draw uuid) returns bytea
language sql security definer set search_path = pg_catalog, pg_temp as $fn$
  update sealed.draw_secret set opened_at = clock_timestamp()
  where series_id = p_series and draw_id = p_draw and opened_at is null
  returning secret
$fn$`);
    // An opening that is committed without the draw's end would be a look under the cover.
    this.addSql(`
create function sealed.demand_end() returns trigger
language plpgsql security definer set search_path = pg_catalog, pg_temp as $fn$
begin
  if not exists (
    select 1 from record.draw_end e
    where e.series_id = new.series_id and e.draw_id = new.draw_id
      and e.document::jsonb ->> 'secret' = encode(new.secret, 'hex')
  ) then
    raise exception 'draw % was opened without being made or declared void', new.draw_id
      using errcode = '42501';
  end if;
  return null;
end $fn$`);
    this.addSql(`
create constraint trigger opened_with_end after update on sealed.draw_secret
deferrable initially deferred for each row execute function sealed.demand_end()`);
  }
}
