import type { EntityManager } from '@mikro-orm/postgresql';
import type { Revision } from '@/domain/inspection/finding';
import { reportDocument } from '@/domain/inspection/report';
import { witnessFrom } from '@/domain/inspection/witness/witness-from';
import { toHex } from '@/domain/ledger/bytes';
import { canonicalJson } from '@/domain/ledger/canonical';
import { toDocument } from '@/domain/rulebook/document';
import { assessFile } from '../read/assess-file';
import { compareWithTablet } from '../read/compare-with-tablet';
import type { InspectionFile } from '../read/inspection-file';

/** What a report says of its witness. */
export const witnessOf = witnessFrom;

const photographsOf = async (em: EntityManager, { inspection, rows }: InspectionFile) => {
  const pictures = rows.remarks.filter((row) => row.kind === 'photograph');
  if (pictures.length === 0) return [];
  const files = await em.execute<{ id: string; sha256: Buffer }[]>(
    `select id, sha256 from public.file
     where series_id = ? and inspection_id = ? and state = 'kept'`,
    [inspection.seriesId, inspection.id],
  );
  return pictures.flatMap((row) => {
    const file = files.find((one) => one.id === row.answer.value);
    if (file === undefined) return [];
    const where = [row.place.cylinder, row.place.valve].filter((part) => part !== '').join(' ');
    return [
      {
        id: file.id,
        sha256: toHex(new Uint8Array(file.sha256)),
        words: [where, row.subject, row.reason].filter((part) => part !== '').join(', '),
      },
    ];
  });
};

/** The report's canonical text: everything from which its findings can be worked out anew. */
export const buildReport = async (
  em: EntityManager,
  file: InspectionFile,
  signing: {
    readonly signer: { readonly id: string; readonly name: string };
    readonly revision: Revision;
    readonly signedAt: string;
  },
): Promise<string> => {
  const { inspection, entry, event, rows } = file;
  const assessment = assessFile(file);
  const used = new Set([
    ...rows.readings.map((row) => row.gaugeId),
    ...rows.zeros.flatMap((row) => [row.gaugeId, row.ringId]),
  ]);
  const report = reportDocument(
    {
      inspectionId: inspection.id,
      carNumber: entry.carNumber,
      className: file.className,
      event: event.name,
      pickedBecause: inspection.pickedBecause,
      inspector: signing.signer,
      witness: witnessOf(rows.remarks),
      revision: signing.revision,
      rulesHash: toHex(inspection.rulesHash),
      chainHead: toHex(file.chain.head),
      layout: inspection.layout,
      zeros: rows.zeros,
      remarks: rows.remarks,
      gauges: file.gauges.filter((gauge) => used.has(gauge.id)),
      photographs: await photographsOf(em, file),
      signedAt: signing.signedAt,
    },
    assessment,
  );
  const tablet = await compareWithTablet(em, inspection, assessment);
  return canonicalJson({
    ...(report as object),
    ...(tablet === undefined ? {} : { tablet: toDocument(tablet) }),
    // What a stranger to this database needs besides the rows to run the same arithmetic again.
    zone: event.zone,
    ...(file.paperwork === null ? {} : { paperwork: toDocument(file.paperwork) }),
  });
};
