import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { canonicalJson } from '@/domain/ledger/canonical';
import type { Clause } from '@/domain/rulebook/clause';
import { toDocument } from '@/domain/rulebook/document';
import { composeNotice } from '@/domain/verdict/notice/compose-notice';
import {
  appealUntilWords,
  decisionWords,
  provisionalWords,
} from '@/domain/verdict/notice/notice-words';
import type { ReportFinding, ReportView } from '@/domain/verdict/report-view';
import { BIG_FEET, NO_BREACH, reportText, STREET_EIGHT } from '../../support/verdict-case';
import { noticeOf, partsOf, reportOf } from './parts';

const text = (notice: ReturnType<typeof noticeOf>) => canonicalJson(toDocument(notice));

describe('a notice of breach', () => {
  const notice = noticeOf();
  const [clause] = notice.breached;

  it('shows the breached clause as in force with its failing positions, U with k, limit and rule', () => {
    expect(
      notice.breached.map(({ number, edition, bulletin }) => [number, edition, bulletin]),
    ).toEqual([['4.3', '4', '2']]);
    expect(clause?.positions.map(({ position, value }) => [position, value?.text])).toEqual([
      ['3 exhaust', '0.0062'],
      ['5 exhaust', '0.0058'],
      ['6 exhaust', '0.0056'],
    ]);
    for (const { uncertainty, k } of clause?.positions ?? []) {
      expect(Number(uncertainty?.text)).toBeGreaterThan(0);
      expect(k).toBe('1.96');
    }
    expect(clause?.limits).toMatchObject({
      max: { text: '0.0010', unit: 'in' },
      guard: { kind: 'rejection' },
    });
    expect(clause?.decisionRule).toMatch(/benefit of the doubt/);
    expect(clause?.positions[0]?.readings.map(({ label, value }) => [label, value.text])).toEqual([
      ['Lifter body diameter', '0.8423'],
      ['Lifter foot diameter', '0.8485'],
    ]);
  });

  it('carries what each breached value’s U is made of, the largest first, in words and percent', () => {
    for (const { budget } of clause?.positions ?? []) {
      const shares = (budget ?? []).map(({ share }) => Number(share));
      expect(shares.length).toBeGreaterThan(1);
      expect(shares).toEqual([...shares].sort((a, b) => b - a));
      expect(Math.abs(shares.reduce((sum, share) => sum + share, 0) - 100)).toBeLessThan(2);
      expect(budget?.[0]?.words).toMatch(/^The micrometer’s (division|calibration) is .+ of it\.$/);
    }
  });

  it('is made from a report that was signed before budgets were kept, without one', () => {
    const old = JSON.parse(reportText(BIG_FEET), (key, value) =>
      key === 'budget' ? undefined : value,
    );
    const made = noticeOf({ report: reportOf(JSON.stringify(old)) });
    expect(made.breached[0]?.positions[0]?.uncertainty).toEqual(clause?.positions[0]?.uncertainty);
    expect(text(made)).not.toContain('budget');
  });

  it('names the gauges of these readings only, with their certificates', () => {
    expect(notice.gauges.map(({ code, certificate }) => [code, certificate])).toEqual([
      ['MIC', 'C-mic'],
    ]);
  });

  it('names an independent second reading, and says when one person read twice', () => {
    const again = (id: string) =>
      noticeOf({
        report: reportOf(
          reportText({ ...BIG_FEET, second: { id, bore: '3 exhaust', foot: '0.8485' } }),
        ),
      }).people.find(({ role }) => role === 'second-reading');
    expect(again('second')).toMatchObject({ name: 'Dov Aranet', standing: 'inspector' });
    expect(again('inspector')?.standing).toBe('inspector; a repeat by the same person');
  });

  it('holds nothing of the advisory clearance, whose reading was outside its window', () => {
    const written = text(notice);
    expect(written).not.toContain('0.0024');
    expect(written).not.toContain('4.6');
    expect(written).not.toContain('learance');
  });

  it('states its deadlines in the event’s zone, each window from the next full minute', () => {
    const odd = noticeOf({ at: '2026-07-12T14:20:07.123Z' });
    expect(odd.provisionalUntil).toBe('2026-07-12T16:21:00.000Z');
    expect(provisionalWords(odd)).toBe(
      'Provisional until Sunday 12 July 2026, 11:21 local time (UTC−5)',
    );
    expect(appealUntilWords(odd)).toBe('Wednesday 15 July 2026, 24:00 local time (UTC−5)');
    expect(decisionWords(odd)).toBe(
      'Car 12J breached clause 4.3 of class Street Eight at event 7, Quarrel Fen Oval, 11 July 2026.',
    );
  });
});

describe('a notice of no breach', () => {
  it('lists the clauses checked and no reading at all', () => {
    const notice = noticeOf({ draft: NO_BREACH, report: reportOf(reportText()) });
    expect(notice.checked.map(({ number }) => number)).toEqual(['4.1', '4.2', '4.3', '4.4']);
    expect(notice).toMatchObject({ breached: [], gauges: [] });
    expect(text(notice)).not.toMatch(/0\.84\d\d/);
  });
});

const clauses: readonly Clause[] = STREET_EIGHT.clauses.filter(({ force }) => force !== 'text');

const position = fc.record({
  position: fc.constantFrom('1 intake', '1 exhaust', '2 intake'),
  pass: fc.constantFrom(true, false, null),
});

interface Planted {
  readonly findings: ReportFinding[];
  readonly readings: ReportView['readings'];
}

/** Every number is planted once and could stand in no other part of a notice by chance. */
const plant = (
  rows: readonly (readonly { readonly position: string; readonly pass: boolean | null }[])[],
): Planted => {
  const readings: ReportView['readings'][number][] = [];
  const findings = clauses.map((clause, i): ReportFinding => {
    const perPosition = (rows[i] ?? []).map(({ position, pass }, j) => {
      const value = `0.73${String(i).padStart(2, '0')}${j}917`;
      const sentence = `planted at ${value}`;
      const [cylinder = '', valve = ''] = position.split(' ');
      readings.push({
        row: {
          id: `r${i}-${j}`,
          takenBy: 'inspector',
          occurredAt: '2026-07-12T03:00:00.000Z',
          quantity: 'foot-diameter',
          depth: 'above',
          axis: 'along',
          set: '1',
          gaugeId: 'mic',
          value: { text: `${value}1`, unit: 'in' },
        },
        place: { bank: 'left', cylinder, valve },
        state: 'counts',
      });
      return {
        position,
        state: 'outside' as const,
        pass,
        fit: true,
        value: { text: value, unit: 'in' },
        sentence,
      };
    });
    return {
      clause: clause.number,
      heading: clause.heading,
      state: 'outside',
      pass: perPosition.some(({ pass }) => pass === false) ? false : null,
      fit: true,
      advisory: clause.force === 'advisory',
      perPosition,
      sentence: `finding ${i}`,
      cautions: [],
      readings: perPosition.map((_, j) => `r${i}-${j}`),
      gauges: ['mic'],
      photographs: [],
    };
  });
  return { findings, readings };
};

describe('whatever was found', () => {
  it('a notice shows readings of the breached clauses’ failing positions and of nothing else', () => {
    const base = partsOf();
    fc.assert(
      fc.property(
        fc.array(fc.uniqueArray(position, { selector: ({ position }) => position, maxLength: 3 }), {
          minLength: clauses.length,
          maxLength: clauses.length,
        }),
        fc.subarray(clauses.map(({ number }) => number)),
        fc.boolean(),
        (rows, named, breach) => {
          const planted = plant(rows);
          const draft = breach ? { ...base.draft, clauses: named } : NO_BREACH;
          const notice = composeNotice({ ...base, draft, report: { ...base.report, ...planted } });
          const written = text(notice);
          planted.findings.forEach((finding) => {
            const open = breach && named.includes(finding.clause);
            const failing = finding.perPosition.some(({ pass }) => pass === false);
            finding.perPosition.forEach(({ value, sentence, pass }) => {
              const shown = open && (failing ? pass === false : pass === null);
              expect(written.includes(`"${value?.text}"`)).toBe(shown);
              expect(written.includes(`"${value?.text}1"`)).toBe(shown);
              expect(written.includes(sentence)).toBe(shown);
            });
          });
        },
      ),
      { numRuns: 300 },
    );
  });
});
