import { assessInspection, type InspectionRecord } from '@/domain/inspection/assess-inspection';
import type { GaugeRecord } from '@/domain/inspection/capture/gauge-record';
import type { Place, ReadingRow, RemarkRow, ZeroRow } from '@/domain/inspection/capture/rows';
import { WHOLE_ENGINE } from '@/domain/inspection/capture/rows';
import { TAPPET_RULE_SET } from '@/domain/rulebook/rule-sets/tappet';
import type { RulesInForce } from '@/domain/rulebook/rules-in-force';
import type { BoreLayout } from '@/domain/tappet/layout/bore-layout';
import { bankOf } from '@/domain/tappet/layout/generic-layouts';

/** One cylinder, two bores: small enough to read. */
export const TWIN: BoreLayout = {
  name: 'One cylinder',
  viewedFrom: 'front',
  banks: [bankOf({ name: 'block', side: 'middle', offset: 'level', cylinders: [1] }, 'IE')],
};

const start = Date.parse('2026-07-16T02:00:00.000Z');
export const at = (second: number): string => new Date(start + second * 1000).toISOString();

export const intake: Place = { bank: 'block', cylinder: '1', valve: 'intake' };
export const exhaust: Place = { bank: 'block', cylinder: '1', valve: 'exhaust' };

const captured = (id: string, second: number) => ({
  id,
  takenBy: 'inspector',
  occurredAt: at(second),
  standing: 'accepted' as const,
});

export const inches = (text: string) => ({ text, unit: 'in' });

/** `r7` is taken in second 7. */
export const reading = (id: string, text: string, more: Partial<ReadingRow> = {}): ReadingRow => ({
  ...captured(id, Number(id.replace(/\D/g, ''))),
  quantity: 'tappet-bore-diameter',
  place: intake,
  depth: 'above',
  axis: 'along',
  repeat: 1,
  set: 1,
  method: 'absolute',
  gaugeId: 'bore',
  value: inches(text),
  ...more,
});

export const body = (id: string, text: string, more: Partial<ReadingRow> = {}): ReadingRow =>
  reading(id, text, { quantity: 'lifter-body-diameter', gaugeId: 'mic', ...more });

export const foot = (id: string, text: string, more: Partial<ReadingRow> = {}): ReadingRow =>
  reading(id, text, { quantity: 'foot-diameter', gaugeId: 'mic', ...more });

export const zero = (
  id: string,
  kind: ZeroRow['kind'],
  text: string,
  more: Partial<ZeroRow> = {},
): ZeroRow => ({
  ...captured(id, Number(id.replace(/\D/g, ''))),
  runId: 'run1',
  kind,
  gaugeId: 'dial',
  zeroedOn: 'lifter',
  reading: inches(text),
  ...more,
});

export const remark = (
  id: string,
  kind: RemarkRow['kind'],
  more: Partial<RemarkRow> = {},
): RemarkRow => ({
  ...captured(id, Number(id.replace(/\D/g, ''))),
  kind,
  place: WHOLE_ENGINE,
  subject: '',
  answer: {},
  reason: '',
  ...more,
});

const gauge = (id: string, more: Partial<GaugeRecord>): GaugeRecord => ({
  id,
  code: id.toUpperCase(),
  kind: 'micrometer',
  division: inches('0.0001'),
  certificate: {
    number: `C-${id}`,
    expandedUncertainty: inches('0.00004'),
    coverageFactor: '2',
  },
  calibratedOn: '2026-03-02',
  dueOn: '2027-03-02',
  ...more,
});

export const GAUGES: readonly GaugeRecord[] = [
  gauge('mic', { range: { from: inches('0'), to: inches('1') } }),
  gauge('bore', { kind: 'dial-bore-gauge', range: { from: inches('0.5'), to: inches('1') } }),
  gauge('dial', { kind: 'dial-bore-gauge', largerReads: 'minus' }),
  gauge('ring', { kind: 'setting-ring' }),
  gauge('old', { dueOn: '2026-07-14' }),
];

export const RULES: RulesInForce = {
  className: 'Street Stock',
  season: '2026',
  edition: 1,
  clauses: TAPPET_RULE_SET.clauses,
  penalties: TAPPET_RULE_SET.penalties,
  bulletins: [],
  clarifications: [],
  waivers: [],
  sources: [],
};

export const record = (more: Partial<InspectionRecord> = {}): InspectionRecord => ({
  rules: RULES,
  bearer: { carNumber: '12J' },
  layout: TWIN,
  zone: 'America/Chicago',
  readings: [],
  zeros: [],
  remarks: [],
  gauges: GAUGES,
  ...more,
});

export const findingOf = (clause: string, more: Partial<InspectionRecord>) => {
  const found = assessInspection(record(more)).findings.find((row) => row.clause === clause);
  if (found === undefined) throw new Error(`no finding on ${clause}`);
  return found;
};

export const atIntake = (clause: string, more: Partial<InspectionRecord>) => {
  const found = findingOf(clause, more).perPosition.find((row) => row.position === '1 intake');
  if (found === undefined) throw new Error('no intake');
  return found;
};
