import { fail, ok } from '@/domain/result';
import { read, signInFirst } from '@/http/api';
import { makeTemplate } from '@/services/paperwork/sheet/template/make-template';
import { bytesResponse } from '../../../files/_bytes';

/** `?units=metric` for millimetres, `?as=xlsx` for a workbook. */
export const GET = read(async ({ ports, actor, params, context }) => {
  if (actor === null) return fail(signInFirst());
  const { searchParams } = context.url;
  const made = await makeTemplate(ports, actor, {
    paperworkId: params['paperwork'] ?? '',
    subject: params['sheet'] ?? '',
    system: searchParams.get('units') === 'metric' ? 'metric' : 'inch',
    as: searchParams.get('as') === 'xlsx' ? 'xlsx' : 'csv',
  });
  return made.ok ? ok(bytesResponse(made.value, 'attachment')) : made;
});
