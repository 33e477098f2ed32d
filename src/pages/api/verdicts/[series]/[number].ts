import { absent } from '@/domain/failure';
import { fail, ok } from '@/domain/result';
import { read } from '@/http/api';
import { findNotice } from '@/services/public/find-notice';

/** `series` is the series' address here, `corran-valley`: a stranger knows no id. */
export const GET = read(async ({ ports, params }) => {
  const { series: slug = '', number = '' } = params;
  const found = await findNotice(ports, { slug, number });
  if (found === undefined) return fail(absent());
  const { document, salt, line, index, pdf } = found;
  return ok({
    document,
    role: 'notice' as const,
    salt,
    line,
    index,
    pdf: pdf && { sha256: pdf.sha256, bytes: pdf.bytes },
  });
});
