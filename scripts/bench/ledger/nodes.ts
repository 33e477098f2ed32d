import type { Client } from 'pg';
import type { ProofPlan } from '@/domain/ledger/proof';
import type { NodeAt } from '@/domain/ledger/tree';

/** Reads the hashes that a plan names. @throws where one is missing */
export const readNodes = async (
  client: Client,
  series: string,
  plan: ProofPlan | readonly NodeAt[],
) => {
  const nodes = plan.flat();
  const { rows } = await client.query<{ level: number; index: string; hash: Buffer }>(
    `select n.level, n.index, n.hash from record.ledger_node n
     join unnest($2::smallint[], $3::bigint[]) as wanted (level, index) using (level, index)
     where n.series_id = $1`,
    [series, nodes.map(({ level }) => level), nodes.map(({ index }) => index)],
  );
  const found = new Map(
    rows.map((row) => [`${row.level}/${row.index}`, Uint8Array.from(row.hash)]),
  );
  return ({ level, index }: NodeAt): Uint8Array => {
    const hash = found.get(`${level}/${index}`);
    if (hash === undefined) throw new Error(`Node ${level}/${index} is missing.`);
    return hash;
  };
};
