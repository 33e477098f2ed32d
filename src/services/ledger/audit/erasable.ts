import type { EntityManager } from '@mikro-orm/postgresql';
import { type AuditFault, faultIn } from './fault';

/**
 * Columns whose content can be erased. No digest covers them; the line of the row's act commits to the
 * same content under a role of its own. Migration 0012 has the same list.
 */
const ERASABLE = [
  { table: 'paperwork_version', role: 'paperwork', kept: 't.document', said: 'c.content' },
  {
    table: 'paperwork_decision',
    role: 'decision',
    kept: "nullif(t.remarks, '[]')",
    said: "nullif(append.json_of(c.content) -> 'remarks', '[]')",
  },
  { table: 'signature_strokes', role: 'strokes', kept: 't.strokes', said: 'c.content' },
] as const;

/** Each such column against what its line committed to; empty where the ledger says it was erased. */
export const erasableFaults = async (
  em: EntityManager,
  seriesId: string,
  erased: ReadonlySet<string>,
): Promise<readonly AuditFault[]> => {
  const faults: AuditFault[] = [];
  for (const { table, role, kept, said } of ERASABLE) {
    const rows = await em.execute<
      { act: string; line: string | null; empty: boolean; same: boolean }[]
    >(
      `select t.act_id as act, l.index as line, ${kept} is null as empty,
              c.content is not null and ${kept} is not distinct from ${said} as same
       from record.${table} t
       left join record.ledger_line l on l.series_id = t.series_id and l.act_id = t.act_id
       left join record.ledger_content c on c.series_id = l.series_id and c.line_index = l.index
         and c.role = ?
       where t.series_id = ?`,
      [role, seriesId],
    );
    for (const { act, line, empty, same } of rows) {
      const gone = erased.has(`line ${line ?? ''}, ${role}`);
      const what = `act ${act}, line ${line ?? 'none'}`;
      if (gone && !empty)
        faults.push(faultIn(`record.${table}`)(what, 'The ledger says it was erased; it is here.'));
      if (!gone && !same)
        faults.push(faultIn(`record.${table}`)(what, 'Its content is not what its line says.'));
    }
  }
  return faults;
};
