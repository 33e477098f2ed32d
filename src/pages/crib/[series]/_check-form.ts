import { type FieldProblem, problemsOf } from '@/components/form/problems';
import { gaugeCheckRequest } from '@/contracts/gauge/check';
import { readBody } from '@/contracts/read-body';
import { readMoment } from '@/contracts/rulebook/moment';
import type { Actor } from '@/domain/access/permission';
import type { Failure } from '@/domain/failure';
import type { Written } from '@/domain/quantity/dimension';
import { recordGaugeCheck } from '@/services/gauge/record-gauge-check';
import type { Ports } from '@/services/ports';

export type Typed = ReadonlyMap<string, string>;

/** "0.0001 in" as text and unit; the contract says what is wrong with either. */
export const writtenOf = (typed: string): Written => {
  const [, text = '', unit = ''] = /^(\S*)\s*(.*)$/.exec(typed.trim()) ?? [];
  return { text, unit: unit.trim() };
};

const NAMES: Record<string, string> = { eventId: 'event', ringId: 'ring' };

const problemsAt = (failure: Failure): readonly FieldProblem[] =>
  problemsOf(failure).map(({ field, message }) =>
    field === undefined ? { message } : { field: NAMES[field] ?? field, message },
  );

/** Records the check that was typed: readings of one line, each with the unit of the expected value. */
export const postCheck = async (
  ports: Ports,
  actor: Actor,
  typed: Typed,
  where: {
    readonly seriesId: string;
    readonly gaugeId: string;
    readonly inspectionId: string | null;
    readonly zone: string;
  },
): Promise<{ readonly good: boolean } | { readonly problems: readonly FieldProblem[] }> => {
  const text = (name: string) => (typed.get(name) ?? '').trim();
  const expected = writtenOf(text('expected'));
  const ring = text('ring');
  const readings = text('readings')
    .split(/[;\s]+/)
    .filter((part) => part !== '' && part !== expected.unit)
    .map((part) => ({ text: part, unit: expected.unit }));
  const read = readBody(gaugeCheckRequest, {
    act: text('act'),
    id: ports.random.uuid(),
    gaugeId: where.gaugeId,
    kind: ring === '' ? 'zero' : 'ring',
    ringId: ring === '' ? null : ring,
    eventId: text('event') === '' ? null : text('event'),
    inspectionId: where.inspectionId,
    readings,
    expected,
    allowed: writtenOf(text('allowed')),
    witness: text('witness'),
    note: text('note'),
    checkedAt: readMoment(text('checkedAt'), where.zone)?.toISOString() ?? text('checkedAt'),
  });
  if (!read.ok) return { problems: problemsAt(read.failure) };
  const done = await recordGaugeCheck(ports, actor, { ...read.value, seriesId: where.seriesId });
  return done.ok ? { good: done.value.good } : { problems: problemsAt(done.failure) };
};
