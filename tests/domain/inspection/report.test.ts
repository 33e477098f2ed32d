import { describe, expect, it } from 'vitest';
import { assessInspection } from '@/domain/inspection/assess-inspection';
import { type ReportParts, reportDocument } from '@/domain/inspection/report';
import { canonicalDocument } from '@/domain/ledger/canonical';
import { body, foot, GAUGES, reading, record, remark, TWIN, zero } from './build';

const rows = record({
  readings: [
    body('r1', '0.8423'),
    foot('r2', '0.8448'),
    reading('r11', '-0.0020', { method: 'comparative', gaugeId: 'dial', zeroRunId: 'run1' }),
    reading('r12', '-0.0017', { method: 'comparative', gaugeId: 'dial', zeroRunId: 'run1' }),
    reading('r13', '-0.0018', { standing: 'received' }),
  ],
  zeros: [zero('z10', 'opening', '0'), zero('z14', 'closing', '0')],
  remarks: [remark('s20', 'strike', { readingId: 'r11', reason: 'gauge-slipped' })],
});

const parts: ReportParts = {
  inspectionId: 'i1',
  carNumber: '12J',
  className: 'Street Stock',
  event: 'Round 3',
  pickedBecause: 'finished first',
  inspector: { id: 'p1', name: 'A. Inspector' },
  witness: { name: 'B. Builder', role: 'builder', outcome: 'refused' },
  revision: { number: 1, reason: '' },
  rulesHash: 'aa',
  chainHead: 'bb',
  layout: TWIN,
  zeros: rows.zeros,
  remarks: rows.remarks,
  gauges: GAUGES,
  photographs: [{ id: 'f1', sha256: 'cc', words: 'Foot of 1 intake' }],
  signedAt: '2026-07-16T04:00:00.000Z',
};

const textOf = (more: Partial<ReportParts> = {}) => {
  const result = canonicalDocument(reportDocument({ ...parts, ...more }, assessInspection(rows)));
  if (!result.ok) throw new Error(result.failure.detail);
  return result.value;
};

describe('a report', () => {
  const document = JSON.parse(textOf()) as Record<string, never>;

  it('holds every reading with what became of it, the struck and the late ones too', () => {
    const readings = document['readings'] as unknown as readonly {
      row: { id: string };
      state: string;
      reason?: string;
    }[];
    expect(readings.map((row) => [row.row.id, row.state, row.reason])).toEqual([
      ['r1', 'counts', undefined],
      ['r2', 'counts', undefined],
      ['r11', 'struck', 'gauge-slipped'],
      ['r12', 'counts', undefined],
      ['r13', 'received', undefined],
    ]);
  });

  it('names clause, numbers, uncertainty, rule and gauge certificate of what fails', () => {
    const findings = document['findings'] as unknown as readonly {
      clause: string;
      pass: boolean | null;
      gauges: string[];
      perPosition: { value?: unknown; uncertainty?: { text: string }; rule?: string }[];
    }[];
    const found = findings.find((row) => row.clause === '4.3');
    expect(found).toMatchObject({ pass: false, gauges: ['mic'] });
    expect(found?.perPosition[0]?.value).toEqual({ text: '0.0025', unit: 'in' });
    expect(Number(found?.perPosition[0]?.uncertainty?.text)).toBeGreaterThan(0);
    expect(found?.perPosition[0]?.rule).toMatch(/breaches this clause only/);
    expect(textOf()).toContain('"number":"C-mic"');
  });

  it('says that it certifies nothing', () => {
    expect(textOf()).toContain('no certification that an engine is safe');
  });

  it('is the same document for the same rows, and another for any change', () => {
    expect(textOf()).toBe(textOf());
    const changed = [
      textOf({ rulesHash: 'ab' }),
      textOf({ chainHead: 'bc' }),
      textOf({ witness: { ...parts.witness, outcome: 'signed' } }),
      textOf({ revision: { number: 2, reason: 'wrong car number', corrects: 'dd' } }),
    ];
    expect(new Set([textOf(), ...changed]).size).toBe(5);
  });
});
