import { Migration } from '@mikro-orm/migrations';

/**
 * What no ledger held: when a head was signed, which the signed note says from here on, and engines
 * that change hands, each of which stands in a ledger. Acts are closed, and lines appended, with fewer
 * questions to the database.
 */
export class HeldByALedger extends Migration {
  override up(): void {
    this.closeAct();
    this.appendLine();
    this.signedAt();
    this.transfers();
    this.holdOldTransfers();
  }

  /** The last three questions before an act's first line, in their order, as one. */
  private closeAct(): void {
    this.addSql(`
create function append.close_act(
  p_id uuid, p_answer jsonb, p_tables text[], p_series uuid, out rows jsonb, out index bigint
) language plpgsql set search_path = pg_catalog, pg_temp as $fn$
begin
  perform append.answer_act(p_id, p_answer);
  rows := append.act_digest(p_id, p_tables, null);
  index := append.next_line(p_series);
end $fn$`);
  }

  /** The same line and subtrees as before: the text is read once, the subtrees are written at once. */
  private appendLine(): void {
    // Whoever writes a subtree has just raised the size in that row.
    this.addSql('alter table record.ledger_node drop constraint ledger_node_series_id_fkey');
    this.addSql(`
create or replace function append.ledger_line(
  p_series uuid, p_index bigint, p_kind text, p_line text, p_act uuid, p_contents jsonb
) returns bytea
language plpgsql security definer set search_path = pg_catalog, pg_temp as $fn$
declare
  v_leaf bytea := sha256('\\x00'::bytea || convert_to(p_line, 'UTF8'));
  v_said jsonb := p_line::jsonb;
  v_hash bytea := v_leaf; v_left bytea; v_at bigint := p_index; v_level smallint := 0;
  v_indices bigint[] := array[p_index]; v_hashes bytea[] := array[v_leaf];
begin
  if (v_said ->> 'series') is distinct from p_series::text
     or (v_said ->> 'index') is distinct from p_index::text
     or (v_said ->> 'kind') is distinct from p_kind then
    raise exception 'the line does not say series %, index %, kind %', p_series, p_index, p_kind
      using errcode = '22023';
  end if;
  update record.ledger_head set size = size + 1 where series_id = p_series and size = p_index;
  if not found then
    raise exception 'line % of series % is not the next one', p_index, p_series using errcode = '40001';
  end if;
  insert into record.ledger_line (series_id, index, kind, line, leaf_hash, act_id)
  values (p_series, p_index, p_kind, p_line, v_leaf, p_act);
  while v_at % 2 = 1 loop
    select hash into strict v_left from record.ledger_node
    where series_id = p_series and level = v_level and index = v_at - 1;
    v_hash := sha256('\\x01'::bytea || v_left || v_hash);
    v_level := v_level + 1;
    v_at := v_at / 2;
    v_indices := v_indices || v_at;
    v_hashes := array_append(v_hashes, v_hash);
  end loop;
  insert into record.ledger_node (series_id, level, index, hash)
  select p_series, (n.level - 1)::smallint, n.index, n.hash
  from unnest(v_indices, v_hashes) with ordinality n (index, hash, level);
  insert into record.ledger_content (series_id, line_index, role, open, salt, content)
  select p_series, p_index, c.role, c.open, c.salt, c.content
  from jsonb_populate_recordset(null::record.ledger_content, p_contents) c;
  return v_leaf;
end $fn$`);
  }

  private signedAt(): void {
    // As before, but for the time: the note's own where it says one.
    this.addSql(`
create or replace function append.checkpoint(p_series uuid, p_size bigint, p_note text) returns boolean
language plpgsql security definer set search_path = pg_catalog, pg_temp as $fn$
declare v_head bigint; v_root bytea; v_hash bytea; v_level integer; v_said text;
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
  v_said := substring(split_part(p_note, E'\\n', 4)
    from '^tagwire/signed-at (\\d{4}-\\d\\d-\\d\\dT\\d\\d:\\d\\d:\\d\\d\\.\\d{3}Z)$');
  insert into record.checkpoint (series_id, size, root, note, signed_at)
  values (p_series, p_size, v_root, p_note, coalesce(v_said::timestamptz, clock_timestamp()))
  on conflict (series_id, size) do nothing;
  return found;
end $fn$`);
  }

  private transfers(): void {
    this.addSql(`
create index ledger_line_of_engine on record.ledger_line ((line::jsonb #>> '{refs,engine}'))
where kind = 'engine-transferred'`);
    // A series knows an engine by its paperwork, a seal, a swap, or an earlier change of hands.
    this.addSql(`
create function append.series_of_engine(p_engine uuid, p_from uuid, p_to uuid) returns setof uuid
language sql stable set search_path = pg_catalog, pg_temp as $fn$
  with known as (
    select w.series_id from public.paperwork w where w.engine_id = p_engine and w.versions > 0
    union select a.series_id from record.seal_act a where a.engine = p_engine::text
    union select s.series_id from record.engine_swap s where s.to_engine_id = p_engine
    union select l.series_id from record.ledger_line l
      where l.kind = 'engine-transferred' and l.line::jsonb #>> '{refs,engine}' = p_engine::text
  ), raced as (
    select m.series_id from public.membership m
    where m.person_id in (p_from, p_to) and not exists (select from known)
  )
  select series_id from known union select series_id from raced
  union select f.id from (select s.id from public.series s order by s.created_at, s.id limit 1) f
    where not exists (select from known) and not exists (select from raced)
$fn$`);
  }

  /** Changes of hands that no line knows get theirs now, each under the act that made it. */
  private holdOldTransfers(): void {
    this.addSql(`
do $do$
declare
  t record.engine_transfer; v_series uuid; v_index bigint; v_digest jsonb; v_rows text; v_said text;
  v_salts bytea[]; v_texts text[]; v_held text[]; v_line text;
begin
  for t in select r.* from record.engine_transfer r where not exists (
      select from record.ledger_line l where l.act_id = r.act_id) order by r.received_at, r.id loop
    v_digest := append.act_digest(t.act_id, array['act', 'engine_transfer'], null);
    select '{"columns":{' || string_agg(format('"%s":[%s]', c.key,
             (select string_agg(format('"%s"', n), ',' order by i)
              from jsonb_array_elements_text(c.value) with ordinality x (n, i))), ',' order by c.key)
           || '},"digest":"' || (v_digest ->> 'digest')
           || '","document":"tagwire/act-rows","open":[],"version":"1"}'
      into strict v_rows from jsonb_each(v_digest -> 'columns') c;
    v_said := format('{"from":"%s","kind":"%s","to":"%s"%s}', t.from_id, t.kind, t.to_id,
      coalesce(format(',"until":"%s"',
        to_char(t.until_at at time zone 'UTC', 'YYYY-MM-DD"T"HH24:MI:SS.MS"Z"')), ''));
    v_texts := array[v_rows, v_said];
    for v_series in select s from append.series_of_engine(t.engine_id, t.from_id, t.to_id) s
        join record.ledger_head h on h.series_id = s order by s loop
      v_index := append.next_line(v_series);
      v_salts := array(select sha256(uuid_send(gen_random_uuid()) || uuid_send(gen_random_uuid())
        || uuid_send(gen_random_uuid())) from generate_series(1, 2));
      v_held := array(select encode(sha256('tagwire/commitment/1'::bytea || '\\x00'::bytea
        || v_salts[i] || sha256(convert_to(v_texts[i], 'UTF8'))), 'hex') from generate_series(1, 2) i);
      v_line := format('{"act":"%s","at":"%s","commitments":[{"commitment":"%s","role":"rows"},'
        || '{"commitment":"%s","role":"transfer"}],"index":"%s","kind":"engine-transferred",'
        || '"refs":{"engine":"%s","transfer":"%s"},"series":"%s","type":"tagwire/line","v":"1"}',
        t.act_id, to_char(clock_timestamp() at time zone 'UTC', 'YYYY-MM-DD"T"HH24:MI:SS.MS"Z"'),
        v_held[1], v_held[2], v_index, t.engine_id, t.id, v_series);
      perform append.ledger_line(v_series, v_index, 'engine-transferred', v_line, t.act_id,
        jsonb_build_array(
          jsonb_build_object('role', 'rows', 'open', false, 'salt', v_salts[1], 'content', v_texts[1]),
          jsonb_build_object('role', 'transfer', 'open', false, 'salt', v_salts[2], 'content', v_texts[2])));
    end loop;
  end loop;
end $do$`);
  }
}
