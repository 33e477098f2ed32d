import { Migration } from '@mikro-orm/migrations';
import { appendFunction } from './sql';

/** Cars and engines belong to people; paperwork belongs to a series, and what is handed in stays. */
export class EnginePaperwork extends Migration {
  override up(): void {
    this.addSql(`
create table public.car (
  id uuid primary key,
  owner_id uuid not null references public.person (id),
  name text not null,
  created_at timestamptz not null
)`);
    this.addSql(`
create table public.engine (
  id uuid primary key,
  owner_id uuid not null references public.person (id),
  reference text not null check (length(reference) between 1 and 40),
  layout jsonb not null,
  block_casting text not null default '',
  head_castings text not null default '',
  serial text not null default '',
  version integer not null default 1,
  created_at timestamptz not null,
  unique (owner_id, reference)
)`);
    this.addSql(`
create table public.paperwork (
  series_id uuid not null,
  id uuid not null,
  class_id uuid not null,
  competitor_id uuid not null references public.person (id),
  engine_id uuid not null references public.engine (id),
  car_number text not null check (car_number ~ '^[0-9A-Z]{1,6}$'),
  state text not null default 'draft'
    check (state in ('draft', 'handed-in', 'accepted', 'returned', 'withdrawn')),
  draft jsonb not null,
  versions integer not null default 0,
  version integer not null default 1,
  updated_by uuid not null references public.person (id),
  updated_at timestamptz not null,
  primary key (series_id, id),
  foreign key (series_id, class_id) references public.class (series_id, id)
)`);
    this.addSql('create index paperwork_by_competitor on public.paperwork (competitor_id)');
    this.addSql('create index paperwork_by_state on public.paperwork (series_id, state)');
    this.addSql(`
create table public.file (
  series_id uuid not null references public.series (id),
  id uuid not null,
  paperwork_id uuid,
  inspection_id uuid,
  purpose text not null check (purpose in ('photograph', 'sheet', 'finding', 'certificate')),
  item text not null default '',
  name text not null,
  declared_type text not null,
  declared_bytes bigint not null check (declared_bytes > 0),
  upload_key text not null,
  state text not null default 'expected' check (state in ('expected', 'kept', 'refused')),
  object_key text,
  media_type text,
  bytes bigint,
  sha256 bytea check (length(sha256) = 32),
  width integer,
  height integer,
  previews jsonb,
  refused_because text,
  created_by uuid not null references public.person (id),
  created_at timestamptz not null,
  kept_at timestamptz,
  removed_at timestamptz,
  primary key (series_id, id),
  foreign key (series_id, paperwork_id) references public.paperwork (series_id, id),
  check (state <> 'kept' or (object_key is not null and sha256 is not null and bytes is not null))
)`);
    this.addSql('create index file_by_paperwork on public.file (series_id, paperwork_id)');
    this.addSql('create index file_by_inspection on public.file (series_id, inspection_id)');
    this.addSql('create index file_by_hash on public.file (series_id, sha256)');
    this.addSql(`
create table record.paperwork_version (
  series_id uuid not null,
  paperwork_id uuid not null,
  number integer not null check (number > 0),
  document text not null,
  hash bytea not null check (length(hash) = 32),
  rules_hash bytea not null,
  handed_in_by uuid not null references public.person (id),
  occurred_at timestamptz not null,
  received_at timestamptz not null default clock_timestamp(),
  act_id uuid not null,
  primary key (series_id, paperwork_id, number),
  foreign key (series_id, paperwork_id) references public.paperwork (series_id, id),
  foreign key (series_id, rules_hash) references record.rules (series_id, hash)
)`);
    this.addSql(
      appendFunction('paperwork_version', [
        'series_id',
        'paperwork_id',
        'number',
        'document',
        'hash',
        'rules_hash',
        'handed_in_by',
        'occurred_at',
        'act_id',
      ]),
    );
    this.addSql(`
create table record.paperwork_decision (
  series_id uuid not null,
  id uuid not null,
  paperwork_id uuid not null,
  number integer not null,
  decision text not null check (decision in ('accepted', 'returned')),
  remarks jsonb not null,
  decided_by uuid not null references public.person (id),
  received_at timestamptz not null default clock_timestamp(),
  act_id uuid not null,
  primary key (series_id, id),
  unique (series_id, paperwork_id, number),
  foreign key (series_id, paperwork_id, number)
    references record.paperwork_version (series_id, paperwork_id, number)
)`);
    this.addSql(
      appendFunction('paperwork_decision', [
        'series_id',
        'id',
        'paperwork_id',
        'number',
        'decision',
        'remarks',
        'decided_by',
        'act_id',
      ]),
    );
  }
}
