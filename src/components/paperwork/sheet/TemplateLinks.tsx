import { Fragment } from 'react';
import type { SheetForm } from '@/domain/rulebook/form/form';

const KINDS = [
  { query: '?as=xlsx', words: 'XLSX in inches' },
  { query: '?as=xlsx&units=metric', words: 'XLSX in millimetres' },
  { query: '', words: 'CSV in inches' },
  { query: '?units=metric', words: 'CSV in millimetres' },
] as const;

/** Sheets to fill in, one row for every place on this engine. */
export const TemplateLinks = ({
  paperworkId,
  form,
}: {
  readonly paperworkId: string;
  readonly form: SheetForm;
}) => (
  <>
    To start from a template:{' '}
    {KINDS.map(({ query, words }, at) => (
      <Fragment key={words}>
        {at > 0 && ', '}
        <a href={`/api/paperwork/${paperworkId}/template/${form.subject}${query}`} download>
          {words}
        </a>
      </Fragment>
    ))}
    .
  </>
);
