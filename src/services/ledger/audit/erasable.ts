import type { EntityManager } from '@mikro-orm/postgresql';
import { type AuditFault, faultIn } from './fault';

interface Erasable {
  readonly table: string;
  readonly columns: readonly string[];
  /** Roles of the act's line under which the same content is committed to. */
  readonly roles: readonly string[];
  /** The columns of row `t`. */
  readonly kept: string;
  /** The same of content `c`, by `j`, its JSON. */
  readonly said: string;
  /** Whether nothing is left of them; where not given, that they are null. */
  readonly gone?: string;
}

/** What an erasure leaves of a text, or of a name in a chain; what was empty stays empty. */
const ERASED = "'^(|erased|erased [0-9a-f]{6})$'";

const texts = (
  table: string,
  roles: readonly string[],
  said: Readonly<Record<string, string>>,
): Erasable => {
  const columns = Object.keys(said);
  return {
    table,
    columns,
    roles,
    kept: `array[${columns.map((name) => `t.${name}`).join(', ')}]`,
    said: `array[${Object.values(said).join(', ')}]`,
    gone: columns.map((name) => `t.${name} ~ ${ERASED}`).join(' and '),
  };
};

/** The member of a list in the content that is this row, by its id. */
const inList = (list: string, member: string): string =>
  `(select m ->> '${member}' from jsonb_path_query(j, '$.${list}[*]') m
    where m ->> 'id' = t.id::text limit 1)`;

/**
 * Columns whose content can be erased. No digest covers them; the line of the row's act commits to the
 * same content under a role of its own. Migration 0026 has the same list.
 */
const ERASABLE: readonly Erasable[] = [
  {
    table: 'paperwork_version',
    columns: ['document'],
    roles: ['paperwork'],
    kept: 't.document',
    said: 'c.content',
  },
  {
    table: 'paperwork_decision',
    columns: ['remarks'],
    roles: ['decision'],
    kept: "nullif(t.remarks, '[]')",
    said: "nullif(j -> 'remarks', '[]')",
  },
  {
    table: 'signature_strokes',
    columns: ['strokes'],
    roles: ['strokes'],
    kept: 't.strokes',
    said: 'c.content',
  },
  {
    table: 'guardian_signature',
    columns: ['minor_id', 'guardian_id'],
    roles: ['signature'],
    kept: 'array[t.minor_id::text, t.guardian_id::text]',
    // Contents of before they named the two leave them to the digest.
    said: "array[coalesce(j ->> 'minor', t.minor_id::text), coalesce(j ->> 'guardian', t.guardian_id::text)]",
    gone: 'num_nonnulls(t.minor_id, t.guardian_id) = 0',
  },
  {
    table: 'held_part',
    columns: ['document'],
    roles: ['part'],
    kept: 't.document',
    said: 'c.content',
  },
  texts('paperwork_withdrawal', ['withdrawal'], { reason: "j ->> 'reason'" }),
  texts('engine_swap', ['swap'], {
    from_reference: "j ->> 'from'",
    to_reference: "j ->> 'to'",
    seal: "j ->> 'seal'",
  }),
  texts('entry_change', ['changes'], {
    was: inList('changes', 'was'),
    becomes: inList('changes', 'becomes'),
    reason: inList('changes', 'reason'),
  }),
  texts('bulletin_acknowledgement', ['acknowledgement'], { name: inList('acknowledged', 'name') }),
  texts('custody_act', ['custody', 'part'], {
    giver: "coalesce(j ->> 'giver', j ->> 'takenFrom')",
    receiver: "coalesce(j ->> 'receiver', j ->> 'takenBy', '')",
    witness: "coalesce(j ->> 'witness', '')",
    reason: "coalesce(j ->> 'reason', '')",
  }),
  texts('seal_act', ['seal'], { done_by: "j ->> 'doneBy'", note: "j ->> 'note'" }),
  texts('gauge_check', ['check'], {
    witness: "trim(j ->> 'witness')",
    note: "trim(j ->> 'note')",
  }),
];

/** Whether a digest covers a column that can be erased: it is one of before the column was. */
export const coversErasable = (columns: Readonly<Record<string, readonly string[]>>): boolean =>
  ERASABLE.some(({ table, columns: own }) => own.some((name) => columns[table]?.includes(name)));

/** Each such column against what its line committed to; empty where the ledger says it was erased. */
export const erasableFaults = async (
  em: EntityManager,
  seriesId: string,
  erased: ReadonlySet<string>,
): Promise<readonly AuditFault[]> => {
  const faults: AuditFault[] = [];
  for (const { table, roles, kept, said, gone: left = `${kept} is null` } of ERASABLE) {
    const rows = await em.execute<
      { act: string; line: string | null; role: string; empty: boolean; same: boolean }[]
    >(
      `select t.act_id as act, c.line_index as line, c.role, ${left} as empty,
              c.content is not null and ${kept} is not distinct from ${said} as same
       from record.${table} t
       left join (record.ledger_line l join record.ledger_content c on c.series_id = l.series_id
           and c.line_index = l.index and c.role = any(?::text[]))
         on l.series_id = t.series_id and l.act_id = t.act_id
       left join lateral append.json_of(c.content) j on true
       where t.series_id = ?`,
      [`{${roles.join()}}`, seriesId],
    );
    for (const { act, line, role, empty, same } of rows) {
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
