import { absent } from '@/domain/failure';
import { csvText, templateRows } from '@/domain/paperwork/sheet/template';
import { fail, ok } from '@/domain/result';
import { read, signInFirst } from '@/http/api';
import { openPaperwork } from '@/services/paperwork/read/open-paperwork';

/** `?units=metric` for millimetres. */
export const GET = read(async ({ ports, actor, params, context }) => {
  if (actor === null) return fail(signInFirst());
  const opened = await openPaperwork(ports, actor, params['paperwork'] ?? '');
  if (!opened.ok) return opened;
  const { form } = opened.value.checked;
  const sheet = form.sheets.find((one) => one.subject === params['sheet']);
  if (sheet === undefined || sheet.columns.length === 0) return fail(absent());
  const system = context.url.searchParams.get('units') === 'metric' ? 'metric' : 'inch';
  const rows = templateRows({ form: sheet, layout: opened.value.row.layout }, system);
  return ok(
    new Response(csvText(rows), {
      headers: {
        'content-type': 'text/csv; charset=utf-8',
        'content-disposition': `attachment; filename="${sheet.sheet}-${system}.csv"`,
        'cache-control': 'no-store',
      },
    }),
  );
});
