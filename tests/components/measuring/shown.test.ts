import { describe, expect, it } from 'vitest';
import { placesRead, shownResult, valueRead } from '@/components/measuring/sheet/shown';
import { assessInspection } from '@/domain/inspection/assess-inspection';
import { body, GAUGES, RULES, reading, record } from '../../domain/inspection/build';

const clauseOf = (number: string) => {
  const clause = RULES.clauses.find((one) => one.number === number);
  if (clause === undefined) throw new Error(`no clause ${number}`);
  return clause;
};

const shownAt = (number: string, readings: Parameters<typeof body>[]) => {
  const rows = readings.map(([id, text, more]) => body(id, text, more));
  const finding = assessInspection(
    record({ readings: [...rows, reading('r90', '0.8440')] }),
  ).findings.find(({ clause }) => clause === number);
  const result = finding?.perPosition.find(({ position }) => position === '1 intake');
  if (finding === undefined || result === undefined) throw new Error('no result');
  const clause = clauseOf(number);
  const most = placesRead(clause, finding, GAUGES);
  return { finding, result, most, value: shownResult(clause, result, most)?.value };
};

const eight: Parameters<typeof body>[] = [
  '0.8424',
  '0.8425',
  '0.8424',
  '0.8424',
  '0.8425',
  '0.8424',
  '0.8425',
  '0.8424',
].map((text, at) => [
  `b${at + 1}`,
  text,
  { depth: at % 2 === 0 ? 'upper' : 'lower', axis: `a${at}`, set: at < 4 ? 1 : 2 },
]);

describe('a mean on the screen', () => {
  it('has one place more than the gauge’s division, and stands in full behind it', () => {
    const { result, most, value } = shownAt('4.2', eight);
    // Of two sets of four: 0.842425 and 0.842450, pooled 0.8424375 in.
    expect(result.exact).toEqual({ text: '0.8424375', unit: 'in' });
    expect(most).toBe(5);
    expect(value).toBe('0.84244');
  });

  it('of a clearance in thousandths has two places by a dial of a ten-thousandth', () => {
    const { most, value } = shownAt('4.6', eight);
    expect(most).toBe(2);
    expect(value).toMatch(/^1\.\d\d$/);
  });

  it('in the unit of the rule too, for the competitor’s side', () => {
    const { finding, result } = shownAt('4.2', eight);
    expect(valueRead(clauseOf('4.2'), finding, result, GAUGES)).toEqual({
      text: '0.84244',
      unit: 'in',
    });
    expect(valueRead(clauseOf('4.2'), finding, result, [])).toEqual(result.value);
  });

  it('is as it was written where no gauge says what it resolves', () => {
    const { result } = shownAt('4.2', eight);
    const finding = { gauges: ['nobody'] };
    expect(placesRead(clauseOf('4.2'), finding, GAUGES)).toBeUndefined();
    expect(shownResult(clauseOf('4.2'), result)?.value).toBe('0.8424375');
  });
});
