/** Grants and default privileges name the application's role; the migrator puts it here first. */
export const APP_ROLE_SETTING = 'tagwire.app_role';

/** Runs a statement with `%I` standing for the application's role. */
export const asAppRole = (statement: string): string =>
  `do $do$ begin execute format($fmt$${statement}$fmt$, current_setting('${APP_ROLE_SETTING}')); end $do$;`;

/**
 * An append function for one table of the record: it takes a JSON array of rows, writes the named
 * columns and nothing else, and leaves the server's own columns (`received_at`) to their defaults.
 * Security definer with a closed search path: the only way in for the application's role.
 */
export const appendFunction = (table: string, columns: readonly string[]): string => `
create function append.${table}(p_rows jsonb) returns integer
language plpgsql security definer set search_path = pg_catalog, pg_temp as $fn$
declare n integer;
begin
  insert into record.${table} (${columns.join(', ')})
  select ${columns.map((column) => `r.${column}`).join(', ')}
  from pg_catalog.jsonb_populate_recordset(null::record.${table}, p_rows) as r;
  get diagnostics n = row_count;
  return n;
end $fn$;`;
