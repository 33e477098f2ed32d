import { Migration } from '@mikro-orm/migrations';
import { appendFunction } from './sql';

/** Seasons, classes and their rulebooks: drafts may change, what is published may not. */
export class Rulebooks extends Migration {
  override up(): void {
    this.addSql(`
create table public.season (
  series_id uuid not null references public.series (id),
  id uuid not null,
  slug text not null check (slug ~ '^[a-z0-9]+(-[a-z0-9]+)*$'),
  name text not null,
  starts_on date not null,
  ends_on date not null check (ends_on >= starts_on),
  primary key (series_id, id),
  unique (series_id, slug)
)`);
    this.addSql(`
create table public.class (
  series_id uuid not null,
  id uuid not null,
  season_id uuid not null,
  slug text not null check (slug ~ '^[a-z0-9]+(-[a-z0-9]+)*$'),
  name text not null,
  primary key (series_id, id),
  unique (series_id, season_id, slug),
  foreign key (series_id, season_id) references public.season (series_id, id)
)`);
    this.addSql(`
create table public.rulebook_draft (
  series_id uuid not null,
  id uuid not null,
  class_id uuid not null,
  kind text not null check (kind in ('edition', 'bulletin')),
  title text not null,
  content jsonb not null,
  version integer not null default 1,
  updated_by uuid not null references public.person (id),
  updated_at timestamptz not null,
  published_at timestamptz,
  primary key (series_id, id),
  foreign key (series_id, class_id) references public.class (series_id, id)
)`);
    this.addSql(
      'create index rulebook_draft_by_class on public.rulebook_draft (series_id, class_id) where published_at is null',
    );
    // One row for whatever changes the rules of a class: each numbered in its own kind.
    this.addSql(`
create table record.rule_publication (
  series_id uuid not null,
  id uuid not null,
  class_id uuid not null,
  kind text not null check (kind in ('edition', 'bulletin', 'clarification', 'waiver')),
  number integer not null check (number > 0),
  title text not null,
  document text not null,
  hash bytea not null check (length(hash) = 32),
  in_force_at timestamptz,
  published_at timestamptz not null,
  published_by uuid not null references public.person (id),
  act_id uuid not null,
  received_at timestamptz not null default clock_timestamp(),
  primary key (series_id, id),
  unique (series_id, class_id, kind, number),
  foreign key (series_id, class_id) references public.class (series_id, id)
)`);
    this.addSql(
      appendFunction('rule_publication', [
        'series_id',
        'id',
        'class_id',
        'kind',
        'number',
        'title',
        'document',
        'hash',
        'in_force_at',
        'published_at',
        'published_by',
        'act_id',
      ]),
    );
    // The rules in force, as one canonical document, stored once by its hash. Findings and verdicts
    // point here.
    this.addSql(`
create table record.rules (
  series_id uuid not null references public.series (id),
  hash bytea not null check (length(hash) = 32),
  document text not null,
  first_used_at timestamptz not null default clock_timestamp(),
  primary key (series_id, hash)
)`);
    this.addSql(`
create function append.rules(p_series uuid, p_document text) returns bytea
language plpgsql security definer set search_path = pg_catalog, pg_temp as $fn$
declare v_hash bytea := sha256(convert_to(p_document, 'UTF8'));
begin
  insert into record.rules (series_id, hash, document) values (p_series, v_hash, p_document)
  on conflict do nothing;
  return v_hash;
end $fn$`);
  }
}
