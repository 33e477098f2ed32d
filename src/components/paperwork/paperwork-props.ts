import type { Need } from '@/domain/access/paperwork-access';
import type { PaperworkDocument } from '@/domain/paperwork/document';
import type { PaperworkDraft } from '@/domain/paperwork/draft';
import type { LastFound } from '@/domain/paperwork/last-found';
import type { ItemRemark } from '@/domain/paperwork/state';
import type { PaperworkForm } from '@/domain/rulebook/form/form';
import type { RulesInForce } from '@/domain/rulebook/rules-in-force';
import type { BoreLayout } from '@/domain/tappet/layout/bore-layout';

/** A file of the draft as the page knows it. */
export interface ShownFile {
  readonly fileId: string;
  readonly purpose: 'photograph' | 'sheet';
  readonly item: string;
  readonly name: string;
  readonly state: 'expected' | 'kept' | 'refused';
  readonly refusedBecause: string | null;
  /** ISO 8601 instant in UTC. */
  readonly keptAt: string | null;
  readonly sha256: string;
  readonly bytes: string;
  readonly type: string;
  /** Where a small picture of it is; one just taken is shown from the device. */
  readonly picture?: string | undefined;
}

/** Everything the form works with, as plain data. */
export interface PaperworkProps {
  readonly paperworkId: string;
  readonly version: number;
  readonly draft: PaperworkDraft;
  readonly updatedAt: string;
  readonly carNumber: string;
  readonly engineId: string;
  readonly layout: BoreLayout;
  readonly rules: Pick<RulesInForce, 'clauses' | 'waivers'>;
  readonly form: PaperworkForm;
  readonly files: readonly ShownFile[];
  /** Remarks on the version that was returned. */
  readonly remarks: readonly ItemRemark[];
  /** That version, to know which remarks were followed. */
  readonly returned?: PaperworkDocument | undefined;
  /** What the last teardown of this engine found, where there was one. */
  readonly lastFound?: LastFound | undefined;
  /** What this person may write and do. */
  readonly rights: readonly Need[];
}
