import { Migration } from '@mikro-orm/migrations';

/**
 * Content that is erased while the ledger stays whole. A row of `record.erasure` says which content
 * of which line went; writing it is what erases. A hold stops it.
 */
export class Erasure extends Migration {
  override up(): void {
    this.addSql(`
create table public.hold (
  series_id uuid not null references public.series (id),
  id uuid not null,
  subject_kind text not null check (subject_kind in ('series', 'paperwork')),
  subject_id uuid not null,
  reason text not null check (length(reason) > 0),
  placed_by uuid not null references public.person (id),
  since timestamptz not null,
  lifted_by uuid references public.person (id),
  lifted_at timestamptz,
  primary key (series_id, id),
  check ((lifted_at is null) = (lifted_by is null))
)`);
    this.addSql(
      'create index hold_standing on public.hold (series_id, subject_id) where lifted_at is null',
    );
    // Objects that nothing names any more; the row stays until the object is gone.
    this.addSql(`
create table public.object_to_remove (
  series_id uuid not null references public.series (id),
  key text not null,
  since timestamptz not null,
  primary key (series_id, key)
)`);
    this.addSql('alter table record.paperwork_version alter column document drop not null');
    this.addSql(`
create table record.erasure (
  series_id uuid not null,
  line_index bigint not null,
  role text not null,
  paperwork_id uuid not null,
  act_id uuid not null,
  primary key (series_id, line_index, role),
  foreign key (series_id, line_index, role)
    references record.ledger_content (series_id, line_index, role)
)`);
    this.addSql('create index erasure_by_act on record.erasure (act_id)');
    this.addSql(`
create function append.erasure(p_rows jsonb) returns integer
language plpgsql security definer set search_path = pg_catalog, pg_temp as $fn$
declare v record.erasure; v_line record.ledger_line; n integer := 0;
begin
  for v in select * from jsonb_populate_recordset(null::record.erasure, p_rows) loop
    if not exists (select from record.act a where a.id = v.act_id and a.series_id = v.series_id
        and a.claimed_in = pg_current_xact_id() and a.answer is null) then
      raise exception 'act % was not claimed in this transaction', v.act_id using errcode = '42501';
    end if;
    -- Whoever places a hold takes the same lock first.
    perform from public.series s where s.id = v.series_id for no key update;
    if exists (select from public.hold h where h.series_id = v.series_id and h.lifted_at is null
        and h.subject_id in (v.series_id, v.paperwork_id)) then
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
    if (v_line.kind, v.role) not in (('paperwork-handed-in', 'paperwork'), ('paperwork-decided', 'decision'))
        or (v_line.line::jsonb #>> '{refs,paperwork}') is distinct from v.paperwork_id::text then
      raise exception 'line %, % cannot be erased', v.line_index, v.role using errcode = '42501';
    end if;
    insert into record.erasure (series_id, line_index, role, paperwork_id, act_id)
    values (v.series_id, v.line_index, v.role, v.paperwork_id, v.act_id);
    update record.ledger_content c set salt = null, content = null
      where c.series_id = v.series_id and c.line_index = v.line_index and c.role = v.role;
    update record.paperwork_version w set document = null
      where w.series_id = v.series_id and w.paperwork_id = v.paperwork_id and w.act_id = v_line.act_id;
    update record.paperwork_decision d set remarks = '[]'
      where d.series_id = v.series_id and d.paperwork_id = v.paperwork_id and d.act_id = v_line.act_id;
    n := n + 1;
  end loop;
  return n;
end $fn$`);
    // The line is the last write of its act: whether it says what was erased is asked at the commit.
    this.addSql(`
create function append.demand_erasure_line() returns trigger
language plpgsql security definer set search_path = pg_catalog, pg_temp as $fn$
begin
  if not exists (
    select from record.ledger_line l
    join record.ledger_content c on c.series_id = l.series_id and c.line_index = l.index
    join record.ledger_line e on e.series_id = l.series_id and e.index = new.line_index
    where l.series_id = new.series_id and l.act_id = new.act_id and l.kind = 'content-erased'
      and c.role = 'erasure'
      and c.content::jsonb -> 'contents' @> jsonb_build_array(jsonb_build_object(
        'line', new.line_index::text, 'leaf', encode(e.leaf_hash, 'hex'), 'role', new.role))
  ) then
    raise exception 'no line of act % says that line %, % was erased', new.act_id, new.line_index, new.role
      using errcode = '42501';
  end if;
  return null;
end $fn$`);
    this.addSql(`
create constraint trigger erasure_has_its_line after insert on record.erasure
deferrable initially deferred for each row execute function append.demand_erasure_line()`);
  }
}
