import { Migration } from '@mikro-orm/migrations';
import { appendFunction } from './sql';

/** A verdict is a person's decision on an entry; computed statement and decision stand apart. */
export class Verdicts extends Migration {
  override up(): void {
    this.addSql(`
create table public.verdict_draft (
  series_id uuid not null,
  id uuid not null,
  inspection_id uuid not null,
  content jsonb not null,
  version integer not null default 1,
  updated_by uuid not null references public.person (id),
  updated_at timestamptz not null,
  published_at timestamptz,
  primary key (series_id, id),
  unique (series_id, inspection_id),
  foreign key (series_id, inspection_id) references public.inspection (series_id, id)
)`);
    this.addSql(`
create table public.notice_counter (
  series_id uuid not null,
  season_id uuid not null,
  last integer not null default 0,
  primary key (series_id, season_id),
  foreign key (series_id, season_id) references public.season (series_id, id)
)`);
    this.addSql(`
create table record.verdict (
  series_id uuid not null,
  id uuid not null,
  number text not null,
  entry_id uuid not null,
  inspection_id uuid not null,
  report_revision integer not null,
  decision text not null check (decision in ('breach', 'no-breach')),
  computed text not null check (computed in ('fail', 'pass', 'none')),
  reasons text not null,
  penalty text not null default '',
  penalty_money_minor bigint,
  against_computed_because text not null default '',
  document text not null,
  hash bytea not null check (length(hash) = 32),
  notice text not null,
  notice_hash bytea not null check (length(notice_hash) = 32),
  rules_hash bytea not null,
  decided_by uuid not null references public.person (id),
  published_at timestamptz not null,
  provisional_until timestamptz not null,
  act_id uuid not null,
  received_at timestamptz not null default clock_timestamp(),
  primary key (series_id, id),
  unique (series_id, number),
  unique (series_id, inspection_id, report_revision),
  foreign key (series_id, entry_id) references public.entry (series_id, id),
  foreign key (series_id, inspection_id, report_revision)
    references record.report (series_id, inspection_id, revision),
  foreign key (series_id, rules_hash) references record.rules (series_id, hash),
  check (decision <> 'breach' or penalty <> ''),
  check ((computed = 'fail') = (decision = 'breach') or against_computed_because <> '')
)`);
    this.addSql(
      appendFunction('verdict', [
        'series_id',
        'id',
        'number',
        'entry_id',
        'inspection_id',
        'report_revision',
        'decision',
        'computed',
        'reasons',
        'penalty',
        'penalty_money_minor',
        'against_computed_because',
        'document',
        'hash',
        'notice',
        'notice_hash',
        'rules_hash',
        'decided_by',
        'published_at',
        'provisional_until',
        'act_id',
      ]),
    );
    this.addSql('create index verdict_by_inspection on record.verdict (series_id, inspection_id)');
    this.addSql('create index verdict_by_time on record.verdict (series_id, published_at desc)');
    this.addSql(`
create table record.notice_pdf (
  series_id uuid not null,
  verdict_id uuid not null,
  sha256 bytea not null check (length(sha256) = 32),
  bytes bigint not null,
  object_key text not null,
  received_at timestamptz not null default clock_timestamp(),
  primary key (series_id, verdict_id),
  foreign key (series_id, verdict_id) references record.verdict (series_id, id)
)`);
    this.addSql(
      appendFunction('notice_pdf', ['series_id', 'verdict_id', 'sha256', 'bytes', 'object_key']),
    );
  }
}
