import { Migration } from '@mikro-orm/migrations';

/** Columns that an erasure empties: held by their own commitments, so that the digest outlives them. */
const ERASABLE = [
  'paperwork_version.document',
  'paperwork_decision.remarks',
  'signature_strokes.strokes',
  'paperwork_withdrawal.reason',
  'engine_swap.from_reference',
  'engine_swap.to_reference',
  'engine_swap.seal',
  'guardian_signature.minor_id',
  'guardian_signature.guardian_id',
  'entry_change.was',
  'entry_change.becomes',
  'entry_change.reason',
  'bulletin_acknowledgement.name',
  'held_part.document',
  'custody_act.giver',
  'custody_act.receiver',
  'custody_act.witness',
  'custody_act.reason',
  'seal_act.done_by',
  'seal_act.note',
  'gauge_check.witness',
  'gauge_check.note',
];

/** What was written stays readable as having been there; what was empty stays empty. */
const erased = (...columns: readonly string[]): string =>
  columns.map((name) => `${name} = case when ${name} = '' then '' else 'erased' end`).join(', ');

/** Equal names stay equal, so that a chain still shows where it breaks; whose they were, nobody can tell. */
const unnamed = (...columns: readonly string[]): string =>
  columns
    .map(
      (name) => `${name} = case when ${name} = '' then '' else 'erased ' || left(encode(sha256(
          convert_to(v_secret::text || ${name}, 'UTF8')), 'hex'), 6) end`,
    )
    .join(', ');

/**
 * Names and reasons beside paperwork, and those given on an event's day, can be erased: each is
 * committed to by the line of its act under a role of its own.
 */
export class WordsThatCanGo extends Migration {
  override up(): void {
    this.addSql(`
alter table public.retention add column day_words text not null default 'keep'
  check (day_words in ('keep', 'season-end'))`);
    this.addSql(`
alter table record.guardian_signature
  alter column minor_id drop not null, alter column guardian_id drop not null`);
    this.addSql('alter table record.held_part alter column document drop not null');
    this.addSql(`
do $do$
declare v_name text;
begin
  select c.conname into strict v_name from pg_constraint c
  where c.conrelid = 'record.erasure'::regclass and c.contype = 'c'
    and pg_get_constraintdef(c.oid) like '%num_nonnulls%';
  execute format('alter table record.erasure drop constraint %I', v_name);
end $do$`);
    this.addSql(`
alter table record.erasure add column event_id uuid,
  add check (num_nonnulls(paperwork_id, inspection_id, event_id) = 1)`);
    this.eventOfLine();
    this.erasure();
    this.digest();
  }

  private eventOfLine(): void {
    this.addSql(`
create function append.event_of_line(p_line record.ledger_line) returns uuid
language sql stable set search_path = pg_catalog, pg_temp as $fn$
  select case p_line.kind
    when 'entries-changed' then (p_line.line::jsonb #>> '{refs,event}')::uuid
    when 'bulletin-acknowledged' then (
      select n.event_id from record.bulletin_acknowledgement b
      join public.entry n on n.series_id = b.series_id and n.id = b.entry_id
      where b.series_id = p_line.series_id and b.act_id = p_line.act_id limit 1)
    when 'gauge-checked' then (
      select g.event_id from record.gauge_check g
      where g.series_id = p_line.series_id and g.act_id = p_line.act_id limit 1)
    when 'seal-recorded' then (
      select i.event_id from public.inspection i where i.series_id = p_line.series_id
        and i.id = (p_line.line::jsonb #>> '{refs,inspection}')::uuid)
    else (
      select h.event_id from record.held_part h where h.series_id = p_line.series_id
        and h.id = (p_line.line::jsonb #>> '{refs,part}')::uuid)
  end
$fn$`);
  }

  private erasure(): void {
    this.addSql(`
create or replace function append.erasure(p_rows jsonb) returns integer
language plpgsql security definer set search_path = pg_catalog, pg_temp as $fn$
declare
  v record.erasure; v_line record.ledger_line; v_ref text; v_of uuid; n integer := 0;
  -- Kept nowhere.
  v_secret uuid := gen_random_uuid();
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
            where i.series_id = v.series_id and i.id = v.inspection_id)
          or exists (select from public.inspection i where i.series_id = v.series_id
            and i.event_id = v.event_id and h.subject_id in (i.id, i.paperwork_id)))) then
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
    v_ref := case when v.paperwork_id is not null then 'paperwork'
      when v.inspection_id is not null then 'inspection' else 'event' end;
    v_of := case v_ref when 'event' then append.event_of_line(v_line)
      else (v_line.line::jsonb #>> array['refs', v_ref])::uuid end;
    if (v_ref, v_line.kind, v.role) not in (
        ('paperwork', 'paperwork-handed-in', 'paperwork'),
        ('paperwork', 'paperwork-handed-in', 'signature'),
        ('paperwork', 'paperwork-decided', 'decision'),
        ('paperwork', 'paperwork-withdrawn', 'withdrawal'),
        ('paperwork', 'engine-swapped', 'swap'),
        ('inspection', 'report-signed', 'strokes'),
        ('inspection', 'report-revised', 'strokes'),
        ('event', 'entries-changed', 'changes'),
        ('event', 'bulletin-acknowledged', 'acknowledgement'),
        ('event', 'part-tagged', 'part'),
        ('event', 'custody-recorded', 'custody'),
        ('event', 'seal-recorded', 'seal'),
        ('event', 'gauge-checked', 'check'))
        or v_of is distinct from coalesce(v.paperwork_id, v.inspection_id, v.event_id) then
      raise exception 'line %, % cannot be erased', v.line_index, v.role using errcode = '42501';
    end if;
    insert into record.erasure (series_id, line_index, role, paperwork_id, inspection_id, event_id, act_id)
    values (v.series_id, v.line_index, v.role, v.paperwork_id, v.inspection_id, v.event_id, v.act_id);
    update record.ledger_content c set salt = null, content = null
      where c.series_id = v.series_id and c.line_index = v.line_index and c.role = v.role;
    case v.role
      when 'paperwork' then
        update record.paperwork_version set document = null
          where series_id = v.series_id and act_id = v_line.act_id;
      when 'signature' then
        update record.guardian_signature set minor_id = null, guardian_id = null
          where series_id = v.series_id and act_id = v_line.act_id;
      when 'decision' then
        update record.paperwork_decision set remarks = '[]'
          where series_id = v.series_id and act_id = v_line.act_id;
      when 'withdrawal' then
        update record.paperwork_withdrawal set ${erased('reason')}
          where series_id = v.series_id and act_id = v_line.act_id;
      when 'swap' then
        update record.engine_swap set ${erased('from_reference', 'to_reference', 'seal')}
          where series_id = v.series_id and act_id = v_line.act_id;
      when 'strokes' then
        update record.signature_strokes set strokes = null
          where series_id = v.series_id and act_id = v_line.act_id;
      when 'changes' then
        update record.entry_change set ${erased('was', 'becomes', 'reason')}
          where series_id = v.series_id and act_id = v_line.act_id;
        -- Answers of before repeated what was written.
        update record.act set answer = '{"value": null}'
          where id = v_line.act_id and jsonb_exists(answer -> 'value', 'becomes');
      when 'acknowledgement' then
        update record.bulletin_acknowledgement set ${erased('name')}
          where series_id = v.series_id and act_id = v_line.act_id;
      when 'seal' then
        update record.seal_act set ${erased('done_by', 'note')}
          where series_id = v.series_id and act_id = v_line.act_id;
      when 'check' then
        update record.gauge_check set ${erased('witness', 'note')}
          where series_id = v.series_id and act_id = v_line.act_id;
      else
        update record.held_part set document = null
          where series_id = v.series_id and act_id = v_line.act_id;
        update record.custody_act set ${unnamed('giver', 'receiver', 'witness')}, ${erased('reason')}
          where series_id = v.series_id and act_id = v_line.act_id;
    end case;
    n := n + 1;
  end loop;
  return n;
end $fn$`);
  }

  /**
   * As before, but for the columns above; the row that every line's act has is read by a statement
   * whose plan is kept.
   */
  private digest(): void {
    const act = [
      'id',
      'series_id',
      'actor_id',
      'kind',
      'request_hash',
      'claimed_at',
      'claimed_in',
      'answer',
    ];
    this.addSql(`
create or replace function append.act_digest(p_act uuid, p_tables text[], p_columns jsonb) returns jsonb
language plpgsql stable
set search_path = pg_catalog, pg_temp set timezone = 'UTC' set bytea_output = 'hex' as $fn$
declare
  v_table text; v_names jsonb; v_rows text; v_columns jsonb := '{}'; v_all text := '';
begin
  for v_table in select t from unnest(p_tables) t where to_regclass(format('record.%I', t)) is not null
    group by t order by t collate "C" loop
    v_names := p_columns -> v_table;
    if v_names is null and v_table = 'act' then
      v_names := '${JSON.stringify(act)}';
      select jsonb_build_array(${act.map((name) => `t.${name}`).join(', ')})::text
        into strict v_rows from record.act t where t.id = p_act;
    else
      if v_names is null then
        select jsonb_agg(a.attname order by a.attnum) into strict v_names from pg_attribute a
        where a.attrelid = format('record.%I', v_table)::regclass and a.attnum > 0 and not a.attisdropped
          and v_table || '.' || a.attname not in (${ERASABLE.map((name) => `'${name}'`).join(', ')});
      end if;
      select coalesce(string_agg(r.rows, ''), '') into v_rows from append.act_rows(
        v_table, array(select jsonb_array_elements_text(v_names)), array[p_act]) r;
    end if;
    v_columns := v_columns || jsonb_build_object(v_table, v_names);
    v_all := v_all || v_table || chr(10) || v_rows || chr(10);
  end loop;
  return jsonb_build_object(
    'columns', v_columns, 'digest', encode(sha256(convert_to(v_all, 'UTF8')), 'hex'));
end $fn$`);
  }
}
