import { Migration } from '@mikro-orm/migrations';
import { appendFunction } from './sql';

/** What every row captured in the bay carries. */
const CAPTURED = `
  series_id uuid not null,
  id uuid not null,
  inspection_id uuid not null,
  batch integer not null,
  taken_by uuid not null references public.person (id),
  occurred_at timestamptz not null,
  clock_offset_ms integer not null default 0,
  standing text not null default 'accepted' check (standing in ('accepted', 'received')),
  standing_reason text,
  received_at timestamptz not null default clock_timestamp(),
  act_id uuid not null`;

const CAPTURED_COLUMNS = [
  'series_id',
  'id',
  'inspection_id',
  'batch',
  'taken_by',
  'occurred_at',
  'clock_offset_ms',
  'standing',
  'standing_reason',
  'act_id',
] as const;

const CAPTURED_KEYS = `
  primary key (series_id, id),
  foreign key (series_id, inspection_id, batch)
    references record.capture_batch (series_id, inspection_id, number)`;

/** A place on the engine; absent parts are empty texts. */
const PLACE = `
  bank text not null default '',
  cylinder text not null default '',
  valve text not null default '' check (valve in ('', 'intake', 'exhaust')),
  place_index integer check (place_index > 0)`;

const PLACE_COLUMNS = ['bank', 'cylinder', 'valve', 'place_index'] as const;

/** Events, entries, the cars picked, gauges, and everything recorded in the bay. */
export class EventsAndInspections extends Migration {
  override up(): void {
    this.addSql(`
create table public.event (
  series_id uuid not null,
  id uuid not null,
  season_id uuid not null,
  number integer not null check (number > 0),
  slug text not null check (slug ~ '^[a-z0-9]+(-[a-z0-9]+)*$'),
  name text not null,
  track text not null,
  zone text not null,
  starts_at timestamptz not null,
  ends_at timestamptz not null check (ends_at >= starts_at),
  protest_minutes integer not null check (protest_minutes between 1 and 43200),
  results_state text not null default 'none' check (results_state in ('none', 'unofficial', 'official')),
  version integer not null default 1,
  primary key (series_id, id),
  unique (series_id, slug),
  unique (series_id, season_id, number),
  foreign key (series_id, season_id) references public.season (series_id, id)
)`);
    this.addSql(`
create table public.entry (
  series_id uuid not null,
  id uuid not null,
  event_id uuid not null,
  class_id uuid not null,
  car_number text not null check (car_number ~ '^[0-9A-Z]{1,6}$'),
  competitor_id uuid references public.person (id),
  competitor_name text not null check (length(competitor_name) between 1 and 120),
  engine_reference text not null default '',
  paperwork_id uuid,
  position integer check (position > 0),
  state text not null default 'entered' check (state in ('entered', 'withdrawn')),
  version integer not null default 1,
  primary key (series_id, id),
  unique (series_id, event_id, class_id, car_number),
  foreign key (series_id, event_id) references public.event (series_id, id),
  foreign key (series_id, class_id) references public.class (series_id, id),
  foreign key (series_id, paperwork_id) references public.paperwork (series_id, id)
)`);
    this.addSql(`
create table public.gauge (
  series_id uuid not null references public.series (id),
  id uuid not null,
  code text not null check (length(code) between 1 and 24),
  description jsonb not null,
  status text not null default 'in-use' check (status in ('in-use', 'withdrawn')),
  version integer not null default 1,
  primary key (series_id, id),
  unique (series_id, code)
)`);
    this.addSql(`
create table public.inspection (
  series_id uuid not null,
  id uuid not null,
  event_id uuid not null,
  entry_id uuid not null,
  paperwork_id uuid,
  paperwork_number integer,
  picked_because text not null,
  picked_words text not null default '',
  picked_by uuid not null references public.person (id),
  picked_at timestamptz not null,
  rules_hash bytea not null,
  layout jsonb not null,
  state text not null default 'to-do',
  state_reason text not null default '',
  -- Not empty while a closed report is open for correction.
  correction_reason text not null default '',
  bay text not null default '',
  inspector_id uuid references public.person (id),
  opened_at timestamptz,
  closed_at timestamptz,
  version integer not null default 1,
  primary key (series_id, id),
  unique (series_id, entry_id),
  foreign key (series_id, event_id) references public.event (series_id, id),
  foreign key (series_id, entry_id) references public.entry (series_id, id),
  foreign key (series_id, rules_hash) references record.rules (series_id, hash),
  foreign key (series_id, paperwork_id, paperwork_number)
    references record.paperwork_version (series_id, paperwork_id, number)
)`);
    this.addSql(
      'create index inspection_by_inspector on public.inspection (series_id, inspector_id, state)',
    );
    this.addSql(
      'alter table public.file add foreign key (series_id, inspection_id) references public.inspection (series_id, id)',
    );

    // What happened to an inspection reads as its lines of the ledger.
    this.addSql(`
create index ledger_line_by_inspection on record.ledger_line (series_id, (line::jsonb #>> '{refs,inspection}'))
where kind in ('inspection-opened', 'inspection-changed', 'report-signed', 'report-revised')`);

    // One accepted sending from a tablet. The heads form the inspection's hash chain.
    this.addSql(`
create table record.capture_batch (
  series_id uuid not null,
  inspection_id uuid not null,
  number integer not null check (number > 0),
  previous bytea not null check (length(previous) = 32),
  document text not null,
  head bytea not null check (length(head) = 32),
  act_id uuid not null,
  received_at timestamptz not null default clock_timestamp(),
  primary key (series_id, inspection_id, number),
  foreign key (series_id, inspection_id) references public.inspection (series_id, id)
)`);
    this.addSql(
      appendFunction('capture_batch', [
        'series_id',
        'inspection_id',
        'number',
        'previous',
        'document',
        'head',
        'act_id',
      ]),
    );

    this.addSql(`
create table record.zero (${CAPTURED},
  run_id uuid not null,
  kind text not null check (kind in ('opening', 'closing')),
  gauge_id uuid not null,
  zeroed_on text not null check (zeroed_on in ('lifter', 'ring')),
  ring_id uuid,
  size_text text,
  size_unit text,
  size_exact bigint,
  reading_text text not null,
  reading_unit text not null,
  reading_exact bigint not null,
  temperatures jsonb not null default '{}'::jsonb,
${CAPTURED_KEYS},
  foreign key (series_id, gauge_id) references public.gauge (series_id, id),
  foreign key (series_id, ring_id) references public.gauge (series_id, id)
)`);
    this.addSql('create index zero_by_inspection on record.zero (series_id, inspection_id)');
    this.addSql(
      appendFunction('zero', [
        ...CAPTURED_COLUMNS,
        'run_id',
        'kind',
        'gauge_id',
        'zeroed_on',
        'ring_id',
        'size_text',
        'size_unit',
        'size_exact',
        'reading_text',
        'reading_unit',
        'reading_exact',
        'temperatures',
      ]),
    );

    this.addSql(`
create table record.reading (${CAPTURED},
  quantity text not null,
${PLACE},
  depth text not null default '',
  axis text not null default '',
  repeat integer not null default 1 check (repeat > 0),
  set_number integer not null default 1 check (set_number > 0),
  method text not null check (method in ('absolute', 'comparative')),
  gauge_id uuid not null,
  zero_run_id uuid,
  value_text text not null,
  value_unit text not null,
  value_exact numeric not null,
  temperatures jsonb not null default '{}'::jsonb,
${CAPTURED_KEYS},
  foreign key (series_id, gauge_id) references public.gauge (series_id, id)
)`);
    this.addSql('create index reading_by_inspection on record.reading (series_id, inspection_id)');
    this.addSql('create index reading_by_gauge on record.reading (series_id, gauge_id)');
    this.addSql(
      appendFunction('reading', [
        ...CAPTURED_COLUMNS,
        'quantity',
        ...PLACE_COLUMNS,
        'depth',
        'axis',
        'repeat',
        'set_number',
        'method',
        'gauge_id',
        'zero_run_id',
        'value_text',
        'value_unit',
        'value_exact',
        'temperatures',
      ]),
    );

    // A strike or a move points back at the reading it concerns; "could not be reached" and "check"
    // rows stand for themselves.
    this.addSql(`
create table record.remark (${CAPTURED},
  kind text not null check (kind in ('strike', 'move', 'not-reached', 'check', 'witness', 'photograph', 'temperature')),
  reading_id uuid,
${PLACE},
  subject text not null default '',
  answer jsonb not null default '{}'::jsonb,
  reason text not null default '',
${CAPTURED_KEYS},
  foreign key (series_id, reading_id) references record.reading (series_id, id),
  check ((kind in ('strike', 'move')) = (reading_id is not null))
)`);
    this.addSql('create index remark_by_inspection on record.remark (series_id, inspection_id)');
    this.addSql(
      appendFunction('remark', [
        ...CAPTURED_COLUMNS,
        'kind',
        'reading_id',
        ...PLACE_COLUMNS,
        'subject',
        'answer',
        'reason',
      ]),
    );

    this.addSql(`
create table record.report (
  series_id uuid not null,
  inspection_id uuid not null,
  revision integer not null check (revision > 0),
  document text not null,
  hash bytea not null check (length(hash) = 32),
  chain_head bytea not null check (length(chain_head) = 32),
  rules_hash bytea not null,
  reason text not null default '',
  signed_by uuid not null references public.person (id),
  signature jsonb not null,
  signed_at timestamptz not null,
  act_id uuid not null,
  received_at timestamptz not null default clock_timestamp(),
  primary key (series_id, inspection_id, revision),
  foreign key (series_id, inspection_id) references public.inspection (series_id, id),
  foreign key (series_id, rules_hash) references record.rules (series_id, hash),
  check (revision = 1 or length(reason) > 0)
)`);
    this.addSql(
      appendFunction('report', [
        'series_id',
        'inspection_id',
        'revision',
        'document',
        'hash',
        'chain_head',
        'rules_hash',
        'reason',
        'signed_by',
        'signature',
        'signed_at',
        'act_id',
      ]),
    );
  }
}
