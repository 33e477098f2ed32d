import { Migration } from '@mikro-orm/migrations';
import { appendFunction } from './sql';

/**
 * How long after an engine was changed at the track the rest of its paperwork may take, class by class;
 * and what the owner of an engine put right of it.
 */
export class DaysAfterASwap extends Migration {
  override up(): void {
    // Each swap keeps the day that was set when it was made: a change holds for swaps to come.
    this.addSql(`
alter table public.class
  add column swap_due_days integer not null default 3 check (swap_due_days between 1 and 30)`);
    this.addSql(`
create table record.engine_correction (
  id uuid primary key,
  engine_id uuid not null references public.engine (id),
  block_casting_before text not null,
  head_castings_before text not null,
  serial_before text not null,
  block_casting text not null,
  head_castings text not null,
  serial text not null,
  corrected_by uuid not null references public.person (id),
  act_id uuid not null,
  received_at timestamptz not null default clock_timestamp()
)`);
    this.addSql('create index engine_correction_by_engine on record.engine_correction (engine_id)');
    this.addSql('create index engine_correction_by_act on record.engine_correction (act_id)');
    this.addSql(
      appendFunction('engine_correction', [
        'id',
        'engine_id',
        'block_casting_before',
        'head_castings_before',
        'serial_before',
        'block_casting',
        'head_castings',
        'serial',
        'corrected_by',
        'act_id',
      ]),
    );
  }
}
