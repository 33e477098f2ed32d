import { Migration } from '@mikro-orm/migrations';

/** How long after an engine was changed at the track the rest of its paperwork may take, class by class. */
export class DaysAfterASwap extends Migration {
  override up(): void {
    // Each swap keeps the day that was set when it was made: a change holds for swaps to come.
    this.addSql(`
alter table public.class
  add column swap_due_days integer not null default 3 check (swap_due_days between 1 and 30)`);
  }
}
