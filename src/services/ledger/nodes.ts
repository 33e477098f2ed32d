import type { EntityManager } from '@mikro-orm/postgresql';
import { fillPlan, type ProofPlan, planRoot } from '@/domain/ledger/proof';
import { foldSubtrees, type NodeAt } from '@/domain/ledger/tree';

/** Reads the wanted subtrees of a series' ledger in one query. Throws when one is missing. */
const readNodes = async (em: EntityManager, seriesId: string, wanted: readonly NodeAt[]) => {
  const rows = await em.execute<{ level: number; index: string; hash: Buffer }[]>(
    `select n.level, n.index, n.hash from record.ledger_node n
     join unnest(?::smallint[], ?::bigint[]) as w (level, index)
       on w.level = n.level and w.index = n.index
     where n.series_id = ?`,
    [
      `{${wanted.map(({ level }) => level).join()}}`,
      `{${wanted.map(({ index }) => index).join()}}`,
      seriesId,
    ],
  );
  const found = new Map(rows.map((row) => [`${row.level}/${row.index}`, new Uint8Array(row.hash)]));
  return ({ level, index }: NodeAt): Uint8Array => {
    const hash = found.get(`${level}/${index}`);
    if (hash === undefined) throw new Error(`Node ${level}/${index} of ${seriesId} is missing.`);
    return hash;
  };
};

/** The root over the first `size` lines, folded from the kept subtrees: O(log size) rows. */
export const readRoot = async (
  em: EntityManager,
  seriesId: string,
  size: number,
): Promise<Uint8Array> => {
  const plan = planRoot(size);
  return foldSubtrees(plan.map(await readNodes(em, seriesId, plan)));
};

/** The hashes of a proof. */
export const readPlan = async (
  em: EntityManager,
  seriesId: string,
  plan: ProofPlan,
): Promise<readonly Uint8Array[]> =>
  plan.length === 0 ? [] : fillPlan(plan, await readNodes(em, seriesId, plan.flat()));

/** How many lines the ledger has; nothing for a series without one. */
export const findSize = async (
  em: EntityManager,
  seriesId: string,
): Promise<number | undefined> => {
  const [row] = await em.execute<{ size: string }[]>(
    'select size from record.ledger_head where series_id = ?',
    [seriesId],
  );
  return row === undefined ? undefined : Number(row.size);
};
