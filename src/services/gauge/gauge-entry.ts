import { canonicalJson } from '@/domain/ledger/canonical';
import { toDocument } from '@/domain/rulebook/document';
import type { GaugeRow } from '@/entities/event/gauge';

/** A state of the register as it goes on record: canonical text. */
export const gaugeEntryText = (
  { id, code, status, description }: Pick<GaugeRow, 'id' | 'code' | 'status' | 'description'>,
  certificateSha256?: string,
): string =>
  canonicalJson(
    toDocument({
      document: 'tagwire/gauge',
      version: '1',
      gauge: id,
      code,
      status,
      ...description,
      certificateSha256,
    }),
  );
