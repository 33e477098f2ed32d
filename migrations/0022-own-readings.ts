import { Migration } from '@mikro-orm/migrations';

/** A competitor's own reading is a remark of its own kind: kept beside the sheet, never part of it. */
export class OwnReadings extends Migration {
  override up(): void {
    this.addSql(`
do $do$
declare v_said text;
begin
  select pg_get_constraintdef(c.oid) into strict v_said from pg_constraint c
  where c.conrelid = 'record.remark'::regclass and c.conname = 'remark_kind_check';
  execute 'alter table record.remark drop constraint remark_kind_check';
  execute 'alter table record.remark add constraint remark_kind_check '
    || replace(v_said, 'ARRAY[', 'ARRAY[''own-reading''::text, ');
end $do$`);
  }
}
