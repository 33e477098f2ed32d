import { Migration } from '@mikro-orm/migrations';
import { appendFunction } from './sql';

/** Columns that an erasure empties: held by their own commitments, so that the digest outlives them. */
const ERASABLE = `('paperwork_version.document', 'paperwork_decision.remarks', 'signature_strokes.strokes')`;

/**
 * Pen strokes beside a signature, and what a series keeps for how long. When a batch of readings was
 * received stands in the batch's own text from here on; what no text held is no longer kept.
 */
export class StrokesAndRetention extends Migration {
  override up(): void {
    this.addSql('alter table record.ledger_line drop column appended_at');
    this.addSql('alter table record.rules drop column first_used_at');
    this.receivedAsTheBatchSays();
    this.strokes();
    this.erasable();
    this.digests();
    this.addSql(`
create table public.retention (
  series_id uuid primary key references public.series (id),
  uninspected_paperwork text not null default 'keep' check (uninspected_paperwork in ('keep', 'season-end')),
  pen_strokes text not null default 'keep' check (pen_strokes in ('keep', 'season-end')),
  version integer not null default 1
)`);
  }

  private receivedAsTheBatchSays(): void {
    this.addSql(`
create function append.batch_received_at() returns trigger
language plpgsql set search_path = pg_catalog, pg_temp as $fn$
begin
  new.received_at := coalesce((new.document::jsonb ->> 'receivedAt')::timestamptz, new.received_at);
  return new;
end $fn$`);
    this.addSql(`
create trigger received_as_the_text_says before insert on record.capture_batch
for each row execute function append.batch_received_at()`);
    this.addSql(`
create function append.row_received_at() returns trigger
language plpgsql set search_path = pg_catalog, pg_temp as $fn$
begin
  select b.received_at into strict new.received_at from record.capture_batch b
  where b.series_id = new.series_id and b.inspection_id = new.inspection_id and b.number = new.batch;
  return new;
end $fn$`);
    for (const table of ['zero', 'reading', 'remark'])
      this.addSql(`
create trigger received_as_the_batch_says before insert on record.${table}
for each row execute function append.row_received_at()`);
  }

  private strokes(): void {
    this.addSql(`
create table record.signature_strokes (
  series_id uuid not null,
  inspection_id uuid not null,
  revision integer not null,
  strokes text,
  act_id uuid not null,
  received_at timestamptz not null default clock_timestamp(),
  primary key (series_id, inspection_id, revision),
  foreign key (series_id, inspection_id, revision)
    references record.report (series_id, inspection_id, revision)
)`);
    this.addSql('create index signature_strokes_by_act on record.signature_strokes (act_id)');
    this.addSql(
      appendFunction('signature_strokes', [
        'series_id',
        'inspection_id',
        'revision',
        'strokes',
        'act_id',
      ]),
    );
  }

  private erasable(): void {
    this.addSql('alter table public.hold drop constraint hold_subject_kind_check');
    this.addSql(
      `alter table public.hold add check (subject_kind in ('series', 'paperwork', 'inspection'))`,
    );
    this.addSql('alter table record.erasure alter column paperwork_id drop not null');
    this.addSql(`
alter table record.erasure add column inspection_id uuid,
  add check (num_nonnulls(paperwork_id, inspection_id) = 1)`);
    this.addSql(`
create or replace function append.erasure(p_rows jsonb) returns integer
language plpgsql security definer set search_path = pg_catalog, pg_temp as $fn$
declare v record.erasure; v_line record.ledger_line; v_ref text; n integer := 0;
begin
  for v in select * from jsonb_populate_recordset(null::record.erasure, p_rows) loop
    if not exists (select from record.act a where a.id = v.act_id and a.series_id = v.series_id
        and a.claimed_in = pg_current_xact_id() and a.answer is null) then
      raise exception 'act % was not claimed in this transaction', v.act_id using errcode = '42501';
    end if;
    -- Whoever places a hold takes the same lock first.
    perform from public.series s where s.id = v.series_id for no key update;
    if exists (select from public.hold h where h.series_id = v.series_id and h.lifted_at is null
        and (h.subject_id in (v.series_id, v.paperwork_id, v.inspection_id)
          or h.subject_id = (select i.paperwork_id from public.inspection i
            where i.series_id = v.series_id and i.id = v.inspection_id))) then
      raise exception 'a hold stands on what is to be erased' using errcode = '42501';
    end if;
    -- A car picked at this moment refers to the version: its transaction ends first.
    perform from record.paperwork_version w
      where w.series_id = v.series_id and w.paperwork_id = v.paperwork_id for update;
    if exists (select from public.inspection i
        where i.series_id = v.series_id and i.paperwork_id = v.paperwork_id) then
      raise exception 'an inspection rests on paperwork %', v.paperwork_id using errcode = '42501';
    end if;
    select l.* into strict v_line from record.ledger_line l
      where l.series_id = v.series_id and l.index = v.line_index;
    v_ref := case when v.inspection_id is null then 'paperwork' else 'inspection' end;
    if (v_ref, v_line.kind, v.role) not in (
        ('paperwork', 'paperwork-handed-in', 'paperwork'),
        ('paperwork', 'paperwork-decided', 'decision'),
        ('inspection', 'report-signed', 'strokes'),
        ('inspection', 'report-revised', 'strokes'))
        or (v_line.line::jsonb #>> array['refs', v_ref])
          is distinct from coalesce(v.paperwork_id, v.inspection_id)::text then
      raise exception 'line %, % cannot be erased', v.line_index, v.role using errcode = '42501';
    end if;
    insert into record.erasure (series_id, line_index, role, paperwork_id, inspection_id, act_id)
    values (v.series_id, v.line_index, v.role, v.paperwork_id, v.inspection_id, v.act_id);
    update record.ledger_content c set salt = null, content = null
      where c.series_id = v.series_id and c.line_index = v.line_index and c.role = v.role;
    update record.paperwork_version w set document = null
      where w.series_id = v.series_id and w.paperwork_id = v.paperwork_id and w.act_id = v_line.act_id;
    update record.paperwork_decision d set remarks = '[]'
      where d.series_id = v.series_id and d.paperwork_id = v.paperwork_id and d.act_id = v_line.act_id;
    update record.signature_strokes s set strokes = null
      where s.series_id = v.series_id and s.inspection_id = v.inspection_id and s.act_id = v_line.act_id;
    n := n + 1;
  end loop;
  return n;
end $fn$`);
  }

  private digests(): void {
    // An audit reads what somebody may have altered into no JSON at all.
    this.addSql(`
create function append.json_of(p_text text) returns jsonb
language plpgsql immutable set search_path = pg_catalog, pg_temp as $fn$
begin
  return p_text::jsonb;
exception when others then
  return null;
end $fn$`);
    // One table's rows of many acts at once, each act's as the digest takes them.
    this.addSql(`
create function append.act_rows(p_table text, p_columns text[], p_acts uuid[])
returns table (act uuid, rows text) language plpgsql stable
set search_path = pg_catalog, pg_temp set timezone = 'UTC' set bytea_output = 'hex' as $fn$
declare v_key text := case p_table when 'act' then 'id' else 'act_id' end; v_list text;
begin
  select string_agg(format('t.%I', c), ', ' order by n) into strict v_list
  from unnest(p_columns) with ordinality u (c, n);
  return query execute format(
    $q$select x.act, string_agg(x.r, chr(10) order by x.r collate "C")
       from (select t.%I as act, jsonb_build_array(%s)::text as r from record.%I t
             where t.%I = any($1)) x group by x.act$q$, v_key, v_list, p_table, v_key) using p_acts;
end $fn$`);
    this.addSql(`
create or replace function append.act_digest(p_act uuid, p_tables text[], p_columns jsonb) returns jsonb
language plpgsql stable set search_path = pg_catalog, pg_temp as $fn$
declare
  v_table text; v_names jsonb; v_rows text; v_columns jsonb := '{}'; v_all text := '';
begin
  for v_table in select t from unnest(p_tables) t where to_regclass(format('record.%I', t)) is not null
    group by t order by t collate "C" loop
    v_names := p_columns -> v_table;
    if v_names is null then
      select jsonb_agg(a.attname order by a.attnum) into strict v_names from pg_attribute a
      where a.attrelid = format('record.%I', v_table)::regclass and a.attnum > 0 and not a.attisdropped
        and v_table || '.' || a.attname not in ${ERASABLE};
    end if;
    select coalesce(string_agg(r.rows, ''), '') into v_rows from append.act_rows(
      v_table, array(select jsonb_array_elements_text(v_names)), array[p_act]) r;
    v_columns := v_columns || jsonb_build_object(v_table, v_names);
    v_all := v_all || v_table || chr(10) || v_rows || chr(10);
  end loop;
  return jsonb_build_object(
    'columns', v_columns, 'digest', encode(sha256(convert_to(v_all, 'UTF8')), 'hex'));
end $fn$`);
  }
}
