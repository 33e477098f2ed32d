import { Migration } from '@mikro-orm/migrations';

/**
 * The acts (what makes a repeat harmless) and the ledger. The application reads both and writes
 * neither: it calls the functions below, which check what they can.
 */
export class TheRecord extends Migration {
  override up(): void {
    this.addSql(`
create table record.act (
  id uuid primary key,
  series_id uuid,
  actor_id uuid,
  kind text not null,
  request_hash bytea not null check (length(request_hash) = 32),
  claimed_at timestamptz not null default clock_timestamp(),
  claimed_in xid8 not null default pg_current_xact_id(),
  answer jsonb
)`);
    // An act of another transaction that is not finished yet makes the insert wait; afterwards its
    // answer is there to be read.
    this.addSql(`
create function append.claim_act(
  p_id uuid, p_series uuid, p_actor uuid, p_kind text, p_request_hash bytea,
  out fresh boolean, out same boolean, out answer jsonb
) language plpgsql security definer set search_path = pg_catalog, pg_temp as $fn$
begin
  insert into record.act (id, series_id, actor_id, kind, request_hash)
  values (p_id, p_series, p_actor, p_kind, p_request_hash)
  on conflict (id) do nothing;
  if found then
    fresh := true; same := true; answer := null;
  else
    fresh := false;
    select a.kind = p_kind and a.request_hash = p_request_hash
           and a.actor_id is not distinct from p_actor and a.series_id is not distinct from p_series,
           a.answer
      into same, answer from record.act a where a.id = p_id;
  end if;
end $fn$`);
    this.addSql(`
create function append.answer_act(p_id uuid, p_answer jsonb) returns void
language plpgsql security definer set search_path = pg_catalog, pg_temp as $fn$
begin
  update record.act set answer = p_answer
  where id = p_id and answer is null and claimed_in = pg_catalog.pg_current_xact_id();
  if not found then
    raise exception 'act % was not claimed in this transaction', p_id using errcode = '42501';
  end if;
end $fn$`);

    // How an act's rows stand: a digest over the named columns of the rows it appended, its own row
    // included. The line of the act commits to it, so that no column of such a row can be changed
    // unseen. Columns are named, so that a later one does not change an old digest.
    this.addSql(`
create function append.act_digest(p_act uuid, p_tables text[], p_columns jsonb) returns jsonb
language plpgsql stable
set search_path = pg_catalog, pg_temp set timezone = 'UTC' set bytea_output = 'hex' as $fn$
declare
  v_table text; v_names jsonb; v_list text; v_rows text; v_columns jsonb := '{}'; v_all text := '';
begin
  for v_table in select t from unnest(p_tables) t where to_regclass(format('record.%I', t)) is not null
    group by t order by t collate "C" loop
    v_names := p_columns -> v_table;
    if v_names is null then
      select jsonb_agg(a.attname order by a.attnum) into strict v_names from pg_attribute a
      where a.attrelid = format('record.%I', v_table)::regclass and a.attnum > 0 and not a.attisdropped;
    end if;
    select string_agg(format('t.%I', n), ', ') into strict v_list
    from jsonb_array_elements_text(v_names) n;
    execute format(
      $q$select coalesce(string_agg(r, chr(10) order by r collate "C"), '')
         from (select jsonb_build_array(%s)::text r from record.%I t where t.%I = $1) x$q$,
      v_list, v_table, case v_table when 'act' then 'id' else 'act_id' end
    ) into v_rows using p_act;
    v_columns := v_columns || jsonb_build_object(v_table, v_names);
    v_all := v_all || v_table || chr(10) || v_rows || chr(10);
  end loop;
  return jsonb_build_object(
    'columns', v_columns, 'digest', encode(sha256(convert_to(v_all, 'UTF8')), 'hex'));
end $fn$`);

    this.addSql(`
create table record.ledger_head (
  series_id uuid primary key references public.series (id),
  size bigint not null default 0 check (size >= 0)
)`);
    this.addSql(`
create table record.ledger_line (
  series_id uuid not null references record.ledger_head (series_id),
  index bigint not null,
  kind text not null,
  line text not null,
  leaf_hash bytea not null check (length(leaf_hash) = 32),
  act_id uuid,
  appended_at timestamptz not null default clock_timestamp(),
  primary key (series_id, index)
)`);
    this.addSql('create index ledger_line_by_act on record.ledger_line (series_id, act_id)');
    this.addSql(`
create index ledger_line_key_or_restore on record.ledger_line (series_id, kind, index)
where kind in ('key-published', 'restore-recorded', 'content-erased')`);
    // Hashes of the complete subtrees: level 0 holds the leaves, a node at level k covers 2^k of
    // them. Kept on append so that a proof reads O(log n) rows.
    this.addSql(`
create table record.ledger_node (
  series_id uuid not null references record.ledger_head (series_id),
  level smallint not null,
  index bigint not null,
  hash bytea not null check (length(hash) = 32),
  primary key (series_id, level, index)
)`);
    this.addSql(`
create table record.ledger_content (
  series_id uuid not null,
  line_index bigint not null,
  role text not null,
  open boolean not null,
  salt bytea check (length(salt) = 32),
  content text,
  primary key (series_id, line_index, role),
  foreign key (series_id, line_index) references record.ledger_line (series_id, index)
)`);
    this.addSql(`
create table record.checkpoint (
  series_id uuid not null references record.ledger_head (series_id),
  size bigint not null,
  root bytea not null check (length(root) = 32),
  note text not null,
  signed_at timestamptz not null default clock_timestamp(),
  primary key (series_id, size)
)`);
    this.addSql(`
create function append.open_ledger(p_series uuid) returns void
language sql security definer set search_path = pg_catalog, pg_temp as $fn$
  insert into record.ledger_head (series_id) values (p_series) on conflict do nothing
$fn$`);
    // A line names its own number, so the number is asked for first. The row lock on the head orders
    // the lines; being taken by the last writes of a transaction, it is held through the commit only.
    this.addSql(`
create function append.next_line(p_series uuid) returns bigint
language plpgsql security definer set search_path = pg_catalog, pg_temp as $fn$
declare v_size bigint;
begin
  select size into v_size from record.ledger_head where series_id = p_series for update;
  if v_size is null then
    raise exception 'series % has no ledger', p_series using errcode = '23503';
  end if;
  return v_size;
end $fn$`);
    // RFC 9162 section 2.1: leaf = SHA-256(0x00 || data), node = SHA-256(0x01 || left || right).
    this.addSql(`
create function append.ledger_line(
  p_series uuid, p_index bigint, p_kind text, p_line text, p_act uuid, p_contents jsonb
) returns bytea
language plpgsql security definer set search_path = pg_catalog, pg_temp as $fn$
declare
  v_leaf bytea := sha256('\\x00'::bytea || convert_to(p_line, 'UTF8'));
  v_hash bytea := v_leaf; v_left bytea; v_at bigint := p_index; v_level smallint := 0;
begin
  if (p_line::jsonb ->> 'series') is distinct from p_series::text
     or (p_line::jsonb ->> 'index') is distinct from p_index::text
     or (p_line::jsonb ->> 'kind') is distinct from p_kind then
    raise exception 'the line does not say series %, index %, kind %', p_series, p_index, p_kind
      using errcode = '22023';
  end if;
  update record.ledger_head set size = size + 1 where series_id = p_series and size = p_index;
  if not found then
    raise exception 'line % of series % is not the next one', p_index, p_series using errcode = '40001';
  end if;
  insert into record.ledger_line (series_id, index, kind, line, leaf_hash, act_id)
  values (p_series, p_index, p_kind, p_line, v_leaf, p_act);
  insert into record.ledger_node values (p_series, 0, p_index, v_leaf);
  while v_at % 2 = 1 loop
    select hash into strict v_left from record.ledger_node
    where series_id = p_series and level = v_level and index = v_at - 1;
    v_hash := sha256('\\x01'::bytea || v_left || v_hash);
    v_level := v_level + 1;
    v_at := v_at / 2;
    insert into record.ledger_node values (p_series, v_level, v_at, v_hash);
  end loop;
  insert into record.ledger_content (series_id, line_index, role, open, salt, content)
  select p_series, p_index, c.role, c.open, c.salt, c.content
  from jsonb_populate_recordset(null::record.ledger_content, p_contents) c;
  return v_leaf;
end $fn$`);
    // Stores a signed head only if it is true: the root is folded anew from the kept subtrees, those
    // that the size's binary digits name, and the note must say it. A head stored before is kept.
    this.addSql(`
create function append.checkpoint(p_series uuid, p_size bigint, p_note text) returns boolean
language plpgsql security definer set search_path = pg_catalog, pg_temp as $fn$
declare v_head bigint; v_root bytea; v_hash bytea; v_level integer;
begin
  select size into v_head from record.ledger_head where series_id = p_series;
  if v_head is null or p_size < 1 or p_size > v_head then
    raise exception 'series % has no ledger of % lines', p_series, p_size using errcode = '22023';
  end if;
  for v_level in 0..62 loop
    if (p_size >> v_level) & 1 = 1 then
      select hash into strict v_hash from record.ledger_node
      where series_id = p_series and level = v_level
        and index = ((p_size >> v_level) - 1);
      v_root := case when v_root is null then v_hash else sha256('\\x01'::bytea || v_hash || v_root) end;
    end if;
  end loop;
  if split_part(split_part(p_note, E'\\n', 1), '/', -1) <> p_series::text
     or split_part(p_note, E'\\n', 2) <> p_size::text
     or split_part(p_note, E'\\n', 3) <> encode(v_root, 'base64') then
    raise exception 'the note is not of series % at % lines', p_series, p_size using errcode = '22023';
  end if;
  insert into record.checkpoint (series_id, size, root, note)
  values (p_series, p_size, v_root, p_note)
  on conflict (series_id, size) do nothing;
  return found;
end $fn$`);
  }
}
