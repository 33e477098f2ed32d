import { describe, expect, it } from 'vitest';
import { assessInspection } from '@/domain/inspection/assess-inspection';
import type { QuantityName } from '@/domain/rulebook/quantity-catalogue';
import type { RulesInForce } from '@/domain/rulebook/rules-in-force';
import { exhaust, GAUGES, intake, RULES, reading, record } from './build';

const cylinder = { bank: 'block', cylinder: '1', valve: '' } as const;
const engine = { bank: '', cylinder: '', valve: '' } as const;

let second = 0;
const read = (quantity: QuantityName, text: string, unit = 'in', place: object = engine) => {
  second += 1;
  return reading(`r${second}`, text, {
    quantity,
    depth: '',
    axis: '',
    gaugeId: 'mic',
    value: { text, unit },
    ...(place as { place: typeof engine }),
  });
};
const of = (quantity: QuantityName, readings: ReturnType<typeof read>[], position: string) =>
  assessInspection(record({ readings })).facts.numbers.find(
    (fact) => fact.quantity === quantity && fact.position === position,
  );

describe('a compression ratio', () => {
  const sizes = [
    read('cylinder-bore', '4.000', 'in', { place: cylinder }),
    read('stroke', '3.000'),
    read('chamber-volume', '64.0', 'cc', { place: cylinder }),
    read('piston-volume', '6.0', 'cc', { place: cylinder }),
    read('deck-clearance', '0.025', 'in', { place: cylinder }),
    read('gasket-bore', '4.100'),
    read('gasket-thickness', '0.041'),
  ];

  it('is worked out from its volumes where all of them were measured', () => {
    // Swept π/4 × 4² × 3 = 37.6991 in³ = 617.78 cc. Clearance 64 + 6 + deck 0.31416 in³ (5.148 cc)
    // + gasket 0.54130 in³ (8.870 cc) = 84.018 cc. (617.78 + 84.018) ÷ 84.018 = 8.3529.
    const swept = (Math.PI / 4) * 16 * 3 * 16.387064;
    const clearance = 70 + (Math.PI / 4) * (16 * 0.025 + 16.81 * 0.041) * 16.387064;
    const found = of('compression-ratio', sizes, '1');
    expect(Number(found?.value.text)).toBeCloseTo((swept + clearance) / clearance, 6);
    expect(found?.standardUncertainty).toBeGreaterThan(0);
    expect(found?.budget?.map(({ words }) => words)).toContain(
      'how well the gasket thickness was measured',
    );
  });

  it('is not, while one is missing', () => {
    expect(of('compression-ratio', sizes.slice(1), '1')).toBeUndefined();
  });
});

describe('valve lift', () => {
  const lobe = read('lobe-lift', '0.3000', 'in', { place: intake });
  const ratio = read('rocker-ratio', '1.50', '1', { place: intake });

  it('is lobe lift × rocker ratio, less the lash of the rule', () => {
    // The rule of this class takes it without lash: 0.3000 × 1.50 = 0.4500 in.
    expect(of('valve-lift', [lobe, ratio], '1 intake')?.value.text).toMatch(/^0\.450*$/);
    const rules: RulesInForce = {
      ...RULES,
      clauses: RULES.clauses.map((clause) =>
        clause.requirement?.kind === 'limit' && clause.requirement.quantity === 'valve-lift'
          ? {
              ...clause,
              requirement: { ...clause.requirement, lash: { text: '0.016', unit: 'in' } },
            }
          : clause,
      ),
    };
    const { findings } = assessInspection(record({ rules, readings: [lobe, ratio] }));
    const lift = findings
      .find(({ clause }) => clause === '4.5')
      ?.perPosition.find(({ position }) => position === '1 intake');
    expect(lift?.exact).toEqual({ text: '0.434', unit: 'in' });
    expect(findings.find(({ clause }) => clause === '4.5')?.readings).toEqual([lobe.id, ratio.id]);
  });

  it('read at the valve comes before what is worked out', () => {
    const direct = read('valve-lift', '0.4550', 'in', { place: intake });
    const { numbers } = assessInspection(record({ readings: [lobe, ratio, direct] })).facts;
    const lifts = numbers.filter(({ quantity }) => quantity === 'valve-lift');
    expect(new Set(lifts.map(({ value }) => Number(value.text)))).toEqual(new Set([0.455]));
  });
});

describe('reference parts', () => {
  const rules: RulesInForce = {
    ...RULES,
    clauses: [
      {
        number: '9.1',
        heading: 'Valve head',
        words: 'As the average of at least three reference parts, 0.005 in either way.',
        force: 'mandatory',
        requirement: {
          kind: 'reference-average',
          quantity: 'valve-head-diameter',
          unit: 'in',
          per: 'bore',
          n: 3,
          plus: { text: '0.005', unit: 'in' },
          minus: { text: '0.005', unit: 'in' },
          decisionRule: { kind: 'guarded-rejection', guardFactor: '1' },
          comparison: { method: 'absolute' },
        },
      },
    ],
  } as unknown as RulesInForce;
  const head = (text: string, more: object) =>
    ({ ...read('valve-head-diameter', text), ...more }) as ReturnType<typeof read>;
  // The micrometer of these tests ends at 1 in.
  const WIDE = GAUGES.map((gauge) => ({ ...gauge, range: undefined }));
  const references = ['2.020', '2.022', '2.021'].map((text, i) =>
    head(text, { referencePart: `R${i + 1}` }),
  );
  const stateAt = (readings: ReturnType<typeof read>[], position: string) =>
    assessInspection(record({ rules, readings, gauges: WIDE })).findings[0]?.perPosition.find(
      (one) => one.position === position,
    );

  it('make the value that the engine’s parts are held against, once there are enough', () => {
    const parts = [head('2.024', { place: intake }), head('2.030', { place: exhaust })];
    const few = stateAt([...references.slice(1), ...parts], '1 intake');
    expect(few?.state).toBe('not-measured');
    expect(few?.sentence).toContain('2 of 3 reference parts measured');
    // Mean 2.021: 2.024 lies 0.003 over, 2.030 lies 0.009 over.
    expect(stateAt([...references, ...parts], '1 intake')?.state).toBe('within');
    expect(stateAt([...references, ...parts], '1 exhaust')?.state).toBe('outside');
    const weak = assessInspection(record({ rules, readings: [...references, ...parts] }));
    expect(weak.findings[0]?.perPosition[1]?.sentence).toContain('out of the range of gauge MIC');
  });

  it('are no part of the engine: they count for no bore', () => {
    const { facts, completeness } = assessInspection(record({ rules, readings: references }));
    expect(facts.numbers).toEqual([]);
    expect(facts.references.map(({ part }) => part)).toEqual(['R1', 'R2', 'R3']);
    expect(completeness.measured).toBe(0);
  });
});
