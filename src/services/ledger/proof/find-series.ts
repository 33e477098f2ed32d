import type { Ports } from '../../ports';

export interface LedgerSeries {
  readonly id: string;
  readonly slug: string;
  readonly name: string;
  /** IANA name of its time zone. */
  readonly zone: string;
}

const UUID = /^[0-9a-f]{8}(-[0-9a-f]{4}){3}-[0-9a-f]{12}$/;

/** A series that has a ledger, by its address or by its id. */
export const findLedgerSeries = async (
  deps: Pick<Ports, 'db'>,
  named: string,
): Promise<LedgerSeries | undefined> => {
  const by = UUID.test(named) ? 's.id = ?' : 's.slug = ?';
  const [row] = await deps.db.execute<LedgerSeries[]>(
    `select s.id, s.slug, s.name, s.zone from public.series s
     join record.ledger_head h on h.series_id = s.id where ${by}`,
    [named],
  );
  return row;
};
