import { LOBES } from '@/domain/paperwork/cam/cam-place';
import type { PaperworkDraft } from '@/domain/paperwork/draft';
import { rowsFor } from '@/domain/paperwork/sheet/positions';
import { incompletePlaces } from '@/domain/paperwork/still-missing';
import type { SheetForm, SheetRow } from '@/domain/rulebook/form/form';
import type { BoreLayout } from '@/domain/tappet/layout/bore-layout';

interface CompletenessProps {
  readonly form: SheetForm;
  readonly layout: BoreLayout;
  readonly draft: PaperworkDraft;
}

const KINDS: Partial<Record<SheetRow, string>> = { cylinder: 'cylinders', degree: 'lobes' };

/** How many places are complete, and what the others lack. */
export const Completeness = ({ form, layout, draft }: CompletenessProps) => {
  const places = form.per === 'degree' ? LOBES : rowsFor(form.per, layout);
  const open = incompletePlaces(draft, form, layout);
  const kind = KINDS[form.per] ?? 'bores';
  const words = `${places.length - open.length} of ${places.length} ${kind} complete`;
  if (open.length === 0) return <p className="py-2">{words}.</p>;
  return (
    <details className="py-2">
      <summary className="min-h-12 cursor-pointer font-semibold">{words}</summary>
      <ul>
        {open.map(({ position, lacks }) => (
          <li key={position}>
            {position}: {lacks.join(', ')} missing
          </li>
        ))}
      </ul>
    </details>
  );
};
