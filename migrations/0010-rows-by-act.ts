import { Migration } from '@mikro-orm/migrations';

/** A line commits to the rows of its act: they are found by the act. */
export class RowsByAct extends Migration {
  override up(): void {
    this.addSql('alter table record.notice_pdf add column act_id uuid');
    // Written by the append function, which takes the columns it was made with.
    this.addSql(`
create or replace function append.notice_pdf(p_rows jsonb) returns integer
language plpgsql security definer set search_path = pg_catalog, pg_temp as $fn$
declare n integer;
begin
  insert into record.notice_pdf (series_id, verdict_id, sha256, bytes, object_key, act_id)
  select r.series_id, r.verdict_id, r.sha256, r.bytes, r.object_key, r.act_id
  from pg_catalog.jsonb_populate_recordset(null::record.notice_pdf, p_rows) as r;
  get diagnostics n = row_count;
  return n;
end $fn$`);
    for (const table of [
      'rule_publication',
      'paperwork_version',
      'paperwork_decision',
      'report',
      'verdict',
      'notice_pdf',
      'draw',
      'draw_end',
    ]) {
      this.addSql(`create index ${table}_by_act on record.${table} (act_id)`);
    }
  }
}
