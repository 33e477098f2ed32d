import { Migration } from '@mikro-orm/migrations';
import { appendFunction } from './sql';

/**
 * Lifters out, in again and signed for, which of two sets stands, and readings of reference parts.
 */
export class SetsAndRacks extends Migration {
  override up(): void {
    this.addSql('alter table record.remark drop constraint remark_kind_check');
    this.addSql(`
alter table record.remark add constraint remark_kind_check check (kind in (
  'strike', 'move', 'not-reached', 'check', 'witness', 'photograph', 'temperature',
  'second-set', 'lifter-out', 'lifter-in', 'lifters-returned'))`);
    // Named for a part of the reference set; null for the engine that is inspected.
    this.addSql(`
alter table record.reading add column reference_part text check (reference_part <> '')`);
    this.addSql(
      appendFunction('reading', [
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
        'quantity',
        'bank',
        'cylinder',
        'valve',
        'place_index',
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
        'reference_part',
      ]).replace('create function', 'create or replace function'),
    );
  }
}
