import type { Actor } from '@/domain/access/permission';
import type { Failure } from '@/domain/failure';
import type { Result } from '@/domain/result';
import { readForm } from '@/http/form';
import { recordCaptures } from '@/services/inspection/capture/record-captures';
import { reviseReport } from '@/services/inspection/report/revise-report';
import { signReport } from '@/services/inspection/report/sign-report';
import type { Ports } from '@/services/ports';
import { actOn } from './_acts';

interface Posted {
  readonly to?: string;
  readonly problems?: readonly { readonly field?: string; readonly message: string }[];
  /** What came back is shown again as it was typed. */
  readonly typed?: ReadonlyMap<string, string>;
}

const problemsIn = (failure: Failure): Posted => ({
  problems: (failure.faults ?? [{ pointer: '', detail: failure.detail }]).map(
    ({ pointer, detail }) => {
      const field = pointer.split('/').at(-1) ?? '';
      return field === '' ? { message: detail } : { field, message: detail };
    },
  ),
});

/** What the forms of an inspection's page ask for; each is one use case. */
export const handlePost = async (
  ports: Ports,
  actor: Actor,
  inspectionId: string,
  request: Request,
): Promise<Posted> => {
  const form = await readForm(request);
  const text = (name: string) => (form.get(name) ?? '').trim();
  const page = `/barn/inspections/${inspectionId}`;
  const base = { act: text('act'), inspectionId };
  const say = (result: Result<unknown, Failure>, to = page): Posted =>
    result.ok ? { to } : problemsIn(result.failure);
  const what = text('what');
  const done = await actOn(ports, actor, inspectionId, text);
  if (done !== undefined) return { ...say(done.result, done.to), typed: form };
  if (what === 'witness') {
    const subject = text('witness').slice(0, 120);
    if (subject === '') return { problems: [{ field: 'witness', message: 'Name the witness.' }] };
    return say(
      await recordCaptures(ports, actor, {
        ...base,
        clockOffsetMs: 0,
        rows: [
          {
            kind: 'remark',
            remark: 'witness',
            id: ports.random.uuid(),
            occurredAt: ports.clock.now().toISOString(),
            place: { bank: '', cylinder: '', valve: '' },
            subject,
            value: text('outcome') === 'refused' ? 'refused' : 'signed',
            reason: text('remark').slice(0, 500),
          },
        ],
      }),
    );
  }
  if (what === 'sign')
    return say(
      await signReport(ports, actor, {
        ...base,
        head: text('head'),
        strokes: text('strokes').split(';').filter(Boolean),
      }),
      `${page}?signed=yes`,
    );
  if (what === 'correct')
    return say(await reviseReport(ports, actor, { ...base, reason: text('correction') }));
  return { problems: [{ message: 'This page does not know what was asked. Open it again.' }] };
};
