import { Migration } from '@mikro-orm/migrations';
import { appendFunction } from './sql';

const RECORDED = `
  recorded_by uuid not null references public.person (id),
  act_id uuid not null,
  received_at timestamptz not null default clock_timestamp(),
  primary key (series_id, id)`;

const table = (name: string, columns: readonly string[]): readonly string[] => [
  `create index ${name}_by_act on record.${name} (act_id)`,
  appendFunction(name, ['series_id', 'id', ...columns, 'recorded_by', 'act_id']),
];

/**
 * What a gauge's record says over time, checks and faults of gauges with the reviews that follow, and
 * custody: held parts under their tags, every act on them, and seals.
 */
export class GaugesAndCustody extends Migration {
  override up(): void {
    this.gauges();
    this.reviews();
    this.custody();
  }

  private gauges(): void {
    this.addSql('alter table public.file add column gauge_id uuid');
    this.addSql(
      'alter table public.file add foreign key (series_id, gauge_id) references public.gauge (series_id, id)',
    );
    this.addSql(
      'create index file_by_gauge on public.file (series_id, gauge_id) where gauge_id is not null',
    );
    // Every state of the register, so that a certificate that was replaced can still be read.
    this.addSql(`
create table record.gauge_entry (
  series_id uuid not null,
  id uuid not null,
  gauge_id uuid not null,
  document text not null,${RECORDED},
  foreign key (series_id, gauge_id) references public.gauge (series_id, id)
)`);
    this.addSql(
      'create index gauge_entry_by_gauge on record.gauge_entry (series_id, gauge_id, received_at)',
    );
    this.addSql(`
create table record.gauge_check (
  series_id uuid not null,
  id uuid not null,
  gauge_id uuid not null,
  kind text not null check (kind in ('ring', 'zero')),
  ring_id uuid,
  event_id uuid,
  inspection_id uuid,
  -- As read, in order: text and unit.
  readings jsonb not null check (jsonb_array_length(readings) between 1 and 9),
  expected_text text not null,
  expected_unit text not null,
  -- The largest difference in size, read less expected, and what was allowed.
  difference_text text not null,
  difference_unit text not null,
  allowed_text text not null,
  allowed_unit text not null,
  good boolean not null,
  witness text not null default '' check (length(witness) <= 120),
  note text not null default '' check (length(note) <= 500),
  checked_at timestamptz not null,${RECORDED},
  foreign key (series_id, gauge_id) references public.gauge (series_id, id),
  foreign key (series_id, ring_id) references public.gauge (series_id, id),
  foreign key (series_id, event_id) references public.event (series_id, id),
  foreign key (series_id, inspection_id) references public.inspection (series_id, id),
  check ((kind = 'ring') = (ring_id is not null))
)`);
    this.addSql(
      'create index gauge_check_by_gauge on record.gauge_check (series_id, gauge_id, checked_at)',
    );
    this.addSql('create index gauge_check_by_event on record.gauge_check (series_id, event_id)');
    this.addSql(`
create table record.gauge_fault (
  series_id uuid not null,
  id uuid not null,
  gauge_id uuid not null,
  found_at timestamptz not null,
  -- Its last good check or its calibration; null where there is neither.
  good_until timestamptz,
  good_because text not null,
  off_text text,
  off_unit text,
  reason text not null check (length(reason) > 0),${RECORDED},
  foreign key (series_id, gauge_id) references public.gauge (series_id, id),
  check ((off_text is null) = (off_unit is null)),
  check (good_until is null or good_until <= found_at)
)`);
    this.addSql('create index gauge_fault_by_gauge on record.gauge_fault (series_id, gauge_id)');
    // The look-back asks by ring as well as by gauge.
    this.addSql(
      'create index zero_by_ring on record.zero (series_id, ring_id) where ring_id is not null',
    );
    for (const sql of [
      ...table('gauge_entry', ['gauge_id', 'document']),
      ...table('gauge_check', [
        'gauge_id',
        'kind',
        'ring_id',
        'event_id',
        'inspection_id',
        'readings',
        'expected_text',
        'expected_unit',
        'difference_text',
        'difference_unit',
        'allowed_text',
        'allowed_unit',
        'good',
        'witness',
        'note',
        'checked_at',
      ]),
      ...table('gauge_fault', [
        'gauge_id',
        'found_at',
        'good_until',
        'good_because',
        'off_text',
        'off_unit',
        'reason',
      ]),
    ])
      this.addSql(sql);
  }

  private reviews(): void {
    // A review is its acts: opened by a gauge's fault, perhaps made public, ended once.
    this.addSql(`
create table record.review_act (
  series_id uuid not null,
  id uuid not null,
  review_id uuid not null,
  fault_id uuid not null,
  verdict_id uuid not null,
  kind text not null check (kind in ('opened', 'made-public', 'stands', 'decide-again')),
  reason text not null default '' check (length(reason) <= 2000),
  acted_at timestamptz not null,${RECORDED},
  foreign key (series_id, fault_id) references record.gauge_fault (series_id, id),
  foreign key (series_id, verdict_id) references record.verdict (series_id, id),
  check (kind not in ('stands', 'decide-again') or length(reason) > 0)
)`);
    this.addSql(`
create unique index review_opened_once on record.review_act (series_id, fault_id, verdict_id)
where kind = 'opened'`);
    this.addSql(`
create unique index review_public_once on record.review_act (series_id, review_id)
where kind = 'made-public'`);
    this.addSql(`
create unique index review_ended_once on record.review_act (series_id, review_id)
where kind in ('stands', 'decide-again')`);
    this.addSql('create index review_by_verdict on record.review_act (series_id, verdict_id)');
    for (const sql of table('review_act', [
      'review_id',
      'fault_id',
      'verdict_id',
      'kind',
      'reason',
      'acted_at',
    ]))
      this.addSql(sql);
  }

  private custody(): void {
    this.addSql(`
create table public.tag_counter (
  series_id uuid primary key references public.series (id),
  last integer not null default 0
)`);
    this.addSql(`
create table record.held_part (
  series_id uuid not null,
  id uuid not null,
  tag text not null,
  kind text not null check (kind in ('held', 'sample', 'reference')),
  event_id uuid,
  inspection_id uuid,
  car_number text not null default '',
  words text not null check (length(words) between 1 and 200),
  place_on_engine text not null default '' check (length(place_on_engine) <= 120),
  clause text not null default '' check (length(clause) <= 40),
  bag text not null default '' check (length(bag) <= 40),
  hold_until timestamptz,
  taken_at timestamptz not null,
  document text not null,
  hash bytea not null check (length(hash) = 32),${RECORDED},
  unique (series_id, tag),
  foreign key (series_id, event_id) references public.event (series_id, id),
  foreign key (series_id, inspection_id) references public.inspection (series_id, id)
)`);
    this.addSql(
      'create index held_part_by_inspection on record.held_part (series_id, inspection_id)',
    );
    this.addSql(`
create table record.custody_act (
  series_id uuid not null,
  id uuid not null,
  part_id uuid not null,
  kind text not null check (kind in ('taken', 'hand-over', 'bag-opened', 'bag-closed', 'returned')),
  -- Who gave it, or who opened or closed its bag.
  giver text not null check (length(giver) between 1 and 120),
  receiver text not null default '' check (length(receiver) <= 120),
  witness text not null default '' check (length(witness) <= 120),
  bag text not null default '' check (length(bag) <= 40),
  place text not null default '' check (length(place) <= 120),
  reason text not null default '' check (length(reason) <= 500),
  occurred_at timestamptz not null,${RECORDED},
  foreign key (series_id, part_id) references record.held_part (series_id, id)
)`);
    this.addSql('create index custody_act_by_part on record.custody_act (series_id, part_id)');
    this.addSql(`
create table record.seal_act (
  series_id uuid not null,
  id uuid not null,
  -- The engine's id where it is declared, else what the entry calls it.
  engine text not null check (length(engine) between 1 and 120),
  inspection_id uuid,
  kind text not null check (kind in ('applied', 'found', 'removed')),
  number text not null check (length(number) <= 40),
  place text not null check (length(place) between 1 and 120),
  state text check (state in ('intact', 'broken', 'missing', 'other-number')),
  done_by text not null check (length(done_by) between 1 and 120),
  note text not null default '' check (length(note) <= 500),
  occurred_at timestamptz not null,${RECORDED},
  foreign key (series_id, inspection_id) references public.inspection (series_id, id),
  check ((kind = 'found') = (state is not null))
)`);
    this.addSql('create index seal_act_by_engine on record.seal_act (series_id, engine)');
    this.addSql(
      'create index seal_act_by_inspection on record.seal_act (series_id, inspection_id)',
    );
    this.addSql(`
create index ledger_line_on_custody on record.ledger_line (series_id, (line::jsonb #>> '{refs,inspection}'))
where kind in ('part-tagged', 'custody-recorded', 'seal-recorded', 'gauge-checked', 'verdict-review')`);
    for (const sql of [
      ...table('held_part', [
        'tag',
        'kind',
        'event_id',
        'inspection_id',
        'car_number',
        'words',
        'place_on_engine',
        'clause',
        'bag',
        'hold_until',
        'taken_at',
        'document',
        'hash',
      ]),
      ...table('custody_act', [
        'part_id',
        'kind',
        'giver',
        'receiver',
        'witness',
        'bag',
        'place',
        'reason',
        'occurred_at',
      ]),
      ...table('seal_act', [
        'engine',
        'inspection_id',
        'kind',
        'number',
        'place',
        'state',
        'done_by',
        'note',
        'occurred_at',
      ]),
    ])
      this.addSql(sql);
  }
}
