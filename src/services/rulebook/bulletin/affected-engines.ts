import { canonicalJson } from '@/domain/ledger/canonical';
import type { NewLedgerLine } from '../../act/append';
import type { BulletinChecked } from './check-bulletin';

/**
 * The accepted engines that a bulletin makes illegal, as found when it is published: as rows, and as
 * what its ledger line commits to of them, which is shown to nobody but the officials.
 */
export const affectedEngines = (
  seriesId: string,
  bulletinId: string,
  { affected, trial }: Pick<BulletinChecked, 'affected' | 'trial'>,
): {
  readonly rows: readonly Readonly<Record<string, unknown>>[];
  readonly contents: NewLedgerLine['contents'];
} => {
  const engines = affected.map((engine) => {
    const failed = trial?.failed.find((one) => one.id === engine.id);
    const results = (failed?.results ?? []).map(({ clause, heading, sentence }) => ({
      clause,
      heading,
      sentence,
    }));
    return { engine, results };
  });
  const rows = engines.map(({ engine, results }) => ({
    series_id: seriesId,
    bulletin_id: bulletinId,
    paperwork_id: engine.id,
    engine_id: engine.engineId,
    car_number: engine.carNumber,
    name: engine.name,
    results: canonicalJson(results),
  }));
  const document = {
    document: 'tagwire/bulletin-engines',
    version: '1',
    engines: engines.map(({ engine, results }) => ({ paperwork: engine.id, results })),
  };
  const contents = { engines: { text: canonicalJson(document), open: false } };
  return { rows, contents: rows.length === 0 ? {} : contents };
};
