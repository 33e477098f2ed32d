import type { APIContext, APIRoute } from 'astro';
import { describe, expect, it } from 'vitest';
import * as z from 'zod/mini';
import { assessResponse } from '@/contracts/bench/assess';
import { clearanceResponse } from '@/contracts/bench/clearance';
import { engineResponse } from '@/contracts/bench/engine';
import { operations } from '@/contracts/bench/operations';
import { studyResponse } from '@/contracts/bench/study';
import { uncertaintyResponse } from '@/contracts/bench/uncertainty';
import { POST as assess } from '@/pages/api/bench/assess';
import { POST as clearance } from '@/pages/api/bench/clearance';
import { POST as engine } from '@/pages/api/bench/engine';
import { POST as study } from '@/pages/api/bench/study';
import { POST as temperature } from '@/pages/api/bench/temperature';
import { POST as uncertainty } from '@/pages/api/bench/uncertainty';
import { checkValue, provenance } from '../support/check-value';

const clock = { at: new Date('2026-05-02T18:00:00Z') };

const send = async (route: APIRoute, body: string, address = '192.0.2.1'): Promise<Response> => {
  const request = new Request('http://127.0.0.1/api/bench', {
    method: 'POST',
    headers: { 'content-type': 'application/json' },
    body,
  });
  const locals = { ports: { clock: { now: () => clock.at } }, actor: null };
  const context = { request, locals, params: {}, clientAddress: address };
  return (await route(context as unknown as APIContext)) as Response;
};

const ask = async (route: APIRoute, body: unknown) => {
  const response = await send(route, JSON.stringify(body));
  return {
    status: response.status,
    type: response.headers.get('content-type'),
    body: (await response.json()) as Record<string, unknown>,
  };
};

const answered = async (route: APIRoute, body: unknown) => {
  const { status, body: answer } = await ask(route, body);
  expect(status, JSON.stringify(answer)).toBe(200);
  return answer;
};

/** The pointers of a refused request. */
const refused = async (route: APIRoute, body: unknown) => {
  const answer = await ask(route, body);
  expect(answer.status).toBe(422);
  expect(answer.type).toBe('application/problem+json');
  const errors = answer.body['errors'] as { pointer: string; detail: string }[];
  for (const { detail } of errors) expect(detail).not.toMatch(/^(Invalid|This cannot)/);
  return errors.map(({ pointer }) => pointer);
};

const near = (found: unknown, expected: number, tolerance: number): void => {
  expect(
    Math.abs(Number(found) - expected),
    `${String(found)} against ${expected}`,
  ).toBeLessThanOrEqual(tolerance);
};

const requirement = {
  unit: 'in',
  min: '0.0013',
  max: '0.0019',
  decisionRule: { kind: 'guarded-rejection' },
  comparison: 'absolute',
};
const reading = { requirement, value: '0.0017', unit: 'in', standardUncertainty: 0.00003 };

describe('POST /api/bench/assess', () => {
  it('answers every field of the contract', async () => {
    const answer = await answered(assess, reading);
    expect(assessResponse.safeParse(answer).error).toBeUndefined();
    expect(answer).toMatchObject({
      assessment: 'within',
      fit: true,
      complies: true,
      fourState: 'pass',
      distribution: 'normal',
    });
    near(answer['coverageFactor'], 1.959963984540054, 1e-12);
    near(answer['expandedUncertainty'], 1.959963984540054 * 0.00003, 1e-12);
    near(answer['ratio'], 0.0006 / (2 * 1.959963984540054 * 0.00003), 1e-3);
    // Guarded rejection at one-sided 95 %: outside only beyond the limit by 1.645 u.
    const acceptance = answer['acceptance'] as { min: string; max: string };
    near(acceptance.max, 0.0019 + 1.6448536269514722 * 0.00003, 1e-9);
    near(acceptance.min, 0.0013 - 1.6448536269514722 * 0.00003, 1e-9);
  });

  it('a value equal to a limit, without uncertainty, is within', async () => {
    const answer = await answered(assess, {
      ...reading,
      value: '.0019',
      standardUncertainty: '0',
      requirement: { ...requirement, decisionRule: { kind: 'simple' } },
    });
    expect(answer).toMatchObject({ assessment: 'within', complies: true });
  });

  it('an unfit gauge makes no statement under guarded rejection', async () => {
    const answer = await answered(assess, { ...reading, standardUncertainty: 0.0006 });
    expect(answer).toMatchObject({ fit: false, complies: null });
  });

  it('takes another unit of the same dimension, and t for few degrees of freedom', async () => {
    const answer = await answered(assess, {
      ...reading,
      value: '0.0432',
      unit: 'mm',
      standardUncertainty: 0.0008,
      degreesOfFreedom: 4,
    });
    expect(answer['distribution']).toBe('t');
    near(answer['coverageFactor'], 2.776445105, 1e-8);
    near(answer['expandedUncertainty'], 2.776445105 * 0.0008, 1e-9);
  });

  const zener = checkValue('jcgm106-7.3.3-ex1-zener');
  it(`a unit the trade does not use, named by both sides (${provenance(zener)})`, async () => {
    const answer = await answered(assess, {
      requirement: { unit: 'V', max: '-5.40', decisionRule: { kind: 'guarded-acceptance' } },
      value: '-5.47',
      unit: 'V',
      standardUncertainty: zener.inputs['u'],
    });
    near(answer['conformanceProbability'], 0.9192433408, 1e-9);
    expect(answer['complies']).toBe(false);
    expect(answer['sentence']).toMatch(/\d V/);
    expect(answer['sentence']).not.toMatch(/\d 1\b/);
  });

  const oil = checkValue('jcgm106-7.4-sae40');
  it(`conformance probability of a window (${provenance(oil)})`, async () => {
    const answer = await answered(assess, {
      requirement: { unit: 'mm²/s', min: '12.5', max: '16.3', decisionRule: { kind: 'simple' } },
      value: '13.6',
      unit: 'mm²/s',
      standardUncertainty: '1.8',
    });
    near(answer['conformanceProbability'], oil.expected['pC'] as number, 0.005);
  });

  const speed = checkValue('jcgm106-8.3.3-speed');
  it(`guarded rejection at 0.999 (${provenance(speed)}; unrounded 106.5876)`, async () => {
    const answer = await answered(assess, {
      requirement: {
        unit: 'km/h',
        max: '100',
        decisionRule: { kind: 'guarded-rejection', probability: 0.999 },
        maximumUncertainty: '10',
      },
      value: '106.5',
      unit: 'km/h',
      standardUncertainty: 0.02 * 106.5876,
    });
    near((answer['acceptance'] as { max: string }).max, 106.5876, 1e-3);
    expect(answer['complies']).toBe(true);
  });

  it.each([
    [
      'both guards',
      {
        ...reading,
        requirement: {
          ...requirement,
          decisionRule: { kind: 'guarded-rejection', guardFactor: 1, probability: 0.95 },
        },
      },
      '/requirement/decisionRule',
    ],
    [
      'no limit',
      {
        ...reading,
        requirement: { unit: 'in', decisionRule: { kind: 'simple' }, comparison: 'absolute' },
      },
      '/requirement',
    ],
    [
      'limits crossed',
      { ...reading, requirement: { ...requirement, min: '0.0020' } },
      '/requirement/max',
    ],
    ['another dimension', { ...reading, unit: 'lb' }, '/unit'],
    [
      'an unknown unit',
      { ...reading, requirement: { ...requirement, unit: 'cubit' } },
      '/requirement/unit',
    ],
    ['not a number', { ...reading, value: 'tight' }, '/value'],
    ['a measured value as a JSON number', { ...reading, value: 0.0017 }, '/value'],
    ['a missing value', { ...reading, value: undefined }, '/value'],
    ['a negative uncertainty', { ...reading, standardUncertainty: -1 }, '/standardUncertainty'],
    ['degrees of freedom of zero', { ...reading, degreesOfFreedom: 0 }, '/degreesOfFreedom'],
    ['a level of 1', { ...reading, level: 1 }, '/level'],
    [
      'an unknown rule',
      { ...reading, requirement: { ...requirement, decisionRule: { kind: 'by-feel' } } },
      '/requirement/decisionRule/kind',
    ],
    [
      'rounding without decimals',
      { ...reading, requirement: { ...requirement, comparison: 'rounded' } },
      '/requirement/decimals',
    ],
    [
      'a misspelt field',
      { ...reading, requirement: { ...requirement, maximum: '1' } },
      '/requirement/maximum',
    ],
  ])('refuses %s, naming the field', async (_, body, pointer) => {
    expect(await refused(assess, body)).toContain(pointer);
  });
});

describe('POST /api/bench/clearance', () => {
  const sheet = {
    unit: 'in',
    method: 'absolute',
    lifter: ['0.8422', '0.8423'],
    bore: [
      ['0.8440', '0.8441'],
      ['0.8439', '0.8440'],
    ],
  };

  it('absolute: mean, smallest and largest clearance, form, all exact (brief’s definitions)', async () => {
    const answer = await answered(clearance, sheet);
    expect(clearanceResponse.safeParse(answer).error).toBeUndefined();
    expect(answer).toMatchObject({
      unit: 'in',
      clearance: { mean: '0.00175', min: '0.0016', max: '0.0019' },
      outOfRound: '0.0001',
      taper: { depthMeans: '0.0001', worstAxis: '0.0001', signed: '0.0001' },
      redo: false,
      missing: [],
    });
    expect(answer['standardUncertainty']).toBeGreaterThan(0);
  });

  it('comparative on a dial that reads minus when larger, with drift shared out', async () => {
    const answer = await answered(clearance, {
      unit: 'in',
      method: 'comparative',
      bore: [
        ['-0.0016', '-0.0017'],
        ['-0.0016', '-0.0017'],
      ],
      largerReads: 'minus',
      openingZero: '0',
      closingZero: '0.00005',
    });
    expect(answer['drift']).toBe('0.00005');
    // Reading i of 4 gives back i/5 of the drift: −(−0.0016 − 0.00001) = 0.00161 and so on.
    expect(answer['clearance']).toEqual({ mean: '0.001675', min: '0.00161', max: '0.00174' });
  });

  it('a hot block: the clearance at 20 °C beside the clearance as read', async () => {
    const answer = await answered(clearance, {
      ...sheet,
      temperatures: { bore: '140 °F', lifter: '20 °C' },
      materials: { bore: 'iron', lifter: 'steel' },
    });
    const at20 = answer['clearanceAt20C'] as Record<string, string>;
    near(at20['mean'], 0.00175 - 0.844 * (1 - 1 / (1 + 11.4e-6 * 40)), 1e-9);
  });

  it('says what is missing instead of guessing', async () => {
    const answer = await answered(clearance, {
      unit: 'in',
      method: 'absolute',
      bore: [['0.8440', null]],
    });
    expect(answer['clearance']).toBeNull();
    expect(answer['missing']).toContain('lifter diameter');
  });

  it.each([
    [
      'a cell that is no number',
      {
        ...sheet,
        bore: [
          ['0.8440', 'x'],
          ['0.8439', '0.8440'],
        ],
      },
      '/bore/0/1',
    ],
    [
      'a repeat that is no number',
      { ...sheet, bore: [[['0.8440', '0,8440', '1/2']]] },
      '/bore/0/0/2',
    ],
    ['a bore as a JSON number', { ...sheet, bore: [[0.844]] }, '/bore/0/0'],
    ['no bore', { ...sheet, bore: undefined }, '/bore'],
    ['an unknown method', { ...sheet, method: 'by feel' }, '/method'],
    ['a lifter of zero', { ...sheet, lifter: ['0'] }, '/lifter/0'],
    ['a unit of weight', { ...sheet, unit: 'lb' }, '/unit'],
    [
      'a temperature without a unit',
      { ...sheet, temperatures: { bore: '60', lifter: '20 °C' } },
      '/temperatures/bore',
    ],
    [
      'an unknown material',
      { ...sheet, materials: { bore: 'cheese', lifter: 'steel' } },
      '/materials/bore',
    ],
    ['an order that does not fit', { ...sheet, order: [1, 2] }, '/order'],
    ['a wrong length in another unit', { ...sheet, lifter: ['0.8422 kg'] }, '/lifter/0'],
  ])('refuses %s, naming the field', async (_, body, pointer) => {
    expect(await refused(clearance, body)).toContain(pointer);
  });
});

describe('POST /api/bench/uncertainty', () => {
  const gum = checkValue('gum-G.4.1');
  it(`effective degrees of freedom and U (${provenance(gum)}; here unrounded: 18.9987 cut to 18)`, async () => {
    const [a, b, c] = gum.inputs['u_rel_percent'] as number[];
    const [da, db, dc] = gum.inputs['dof'] as number[];
    const answer = await answered(uncertainty, {
      unit: '%',
      components: [
        { name: 'first', standardUncertainty: a, degreesOfFreedom: da },
        { name: 'second', standardUncertainty: b, degreesOfFreedom: db },
        { name: 'third', standardUncertainty: String(c), degreesOfFreedom: dc },
      ],
    });
    expect(uncertaintyResponse.safeParse(answer).error).toBeUndefined();
    near(answer['combined'], 1.0294658809, 1e-9);
    near(answer['effectiveDegreesOfFreedom'], 18.998742, 1e-5);
    near(answer['coverageFactor'], 2.1009, 5e-5);
    near(answer['expanded'], gum.expected['U95_percent'] as number, 0.05);
    const shares = answer['shares'] as { name: string; share: number }[];
    expect(shares.map(({ name }) => name)).toEqual(['third', 'second', 'first']);
    near(
      shares.reduce((sum, { share }) => sum + share, 0),
      1,
      1e-12,
    );
  });

  it('all known well: no degrees of freedom, k of the normal distribution at the level asked for', async () => {
    const answer = await answered(uncertainty, {
      unit: 'in',
      components: [
        { name: 'dial', standardUncertainty: '3e-5', sensitivity: -2, degreesOfFreedom: null },
      ],
      level: 0.99,
    });
    expect(answer['effectiveDegreesOfFreedom']).toBeNull();
    near(answer['combined'], 6e-5, 1e-15);
    near(answer['coverageFactor'], 2.5758293035489004, 1e-12);
  });

  it('names the component at fault', async () => {
    expect(
      await refused(uncertainty, {
        unit: 'in',
        components: [
          { name: 'a', standardUncertainty: 1 },
          { name: 'b', standardUncertainty: -1 },
        ],
      }),
    ).toEqual(['/components/1/standardUncertainty']);
    expect(await refused(uncertainty, { unit: 'in', components: [] })).toEqual(['/components']);
  });
});

describe('POST /api/bench/engine', () => {
  const work = async (quantity: string, inputs: unknown) => {
    const answer = await answered(engine, { quantity, inputs });
    expect(engineResponse.safeParse(answer).error).toBeUndefined();
    expect((answer['working'] as string[]).length).toBeGreaterThan(0);
    return answer;
  };

  const limit = checkValue('disp-limit-362');
  it(`displacement, and rounded up (${provenance(limit)})`, async () => {
    const inputs = { bore: '4.065', stroke: '3.480', cylinders: 8, unit: 'in' };
    const measured = await work('displacement', inputs);
    near(measured['value'], 361.310192, 1e-6);
    expect(measured['unit']).toBe('in³');
    expect(measured).not.toHaveProperty('expandedUncertainty');
    expect((await work('displacement', { ...inputs, roundUp: true }))['value']).toBe('362');
    const uncertain = await work('displacement', {
      ...inputs,
      uncertainties: { bore: '0.0005', stroke: 0.001 },
    });
    near(
      uncertain['expandedUncertainty'],
      1.959963985 * 361.310192 * Math.hypot(0.001 / 4.065, 0.001 / 3.48),
      1e-5,
    );
  });

  const ratio = checkValue('cr-constructed');
  it(`compression ratio (${provenance(ratio)})`, async () => {
    const answer = await work('compression-ratio', {
      bore: '4.03',
      stroke: '3.48',
      chamber: '64',
      piston: '6',
      deck: '0.025',
      gasketBore: '4.1',
      gasketThickness: '0.039',
      lengthUnit: 'in',
      volumeUnit: 'cc',
    });
    near(answer['value'], ratio.expected['CR'] as number, 1e-9);
  });

  it('duration at a checking lift (constructed: 98 + 2 and 319 + 1.5)', async () => {
    const table = [
      ['90', '0'],
      ['98', '0.045'],
      ['102', '0.055'],
      ['200', '0.3'],
      ['319', '0.053'],
      ['322', '0.047'],
    ];
    const answer = await work('duration', { checkingLift: '0.050', table });
    expect(answer).toMatchObject({ value: '220.5', unit: 'deg', centreline: '210.25' });
  });

  const cam = checkValue('cam-6-42');
  it(`valve events (${provenance(cam)})`, async () => {
    const answer = await work('valve-events', {
      intakeOpens: '6',
      intakeCloses: '42',
      exhaustOpens: 48,
      exhaustCloses: '12',
    });
    expect(answer).toMatchObject({
      intakeDuration: '228',
      intakeCentreline: '108',
      overlap: '18',
      exhaustDuration: '240',
      exhaustCentreline: '108',
    });
  });

  it('valve events and weights carry the uncertainty of one event, of one corner', async () => {
    const k = 1.959963984540054;
    const timing = await work('valve-events', {
      intakeOpens: '6',
      intakeCloses: '42',
      exhaustOpens: '48',
      exhaustCloses: '12',
      uncertainties: { event: '1' },
    });
    const spread = timing['expandedUncertainties'] as Record<string, number>;
    near(spread['intakeDuration'], k * Math.SQRT2, 1e-9);
    near(spread['lobeSeparation'], k / 2, 1e-9);
    const car = await work('weights', {
      leftFront: '800',
      rightFront: '800',
      leftRear: '800',
      rightRear: '800',
      unit: 'lb',
      uncertainties: { corner: 1 },
    });
    near((car['expandedUncertainties'] as Record<string, number>)['total'], 2 * k, 1e-9);
  });

  const lift = checkValue('valve-lift');
  it(`lift (${provenance(lift)})`, async () => {
    const inputs = { lobeLift: '0.3', rockerRatio: '1.5', unit: 'in' };
    expect(await work('lift', inputs)).toMatchObject({ value: '0.45', gross: '0.45' });
    expect(await work('lift', { ...inputs, lash: '0.02' })).toMatchObject({
      value: '0.43',
      gross: '0.45',
      net: '0.43',
    });
  });

  it('spring rate, area and weights', async () => {
    const points = [
      { height: '1.7', load: '120' },
      { height: '1.2', load: '310' },
    ];
    expect(await work('spring-rate', { points, lengthUnit: 'in', forceUnit: 'lbf' })).toMatchObject(
      { value: '380', unit: 'lbf/in' },
    );
    near((await work('area', { diameter: '1.375', unit: 'in' }))['value'], 1.4848934, 1e-6);
    const car = await work('weights', {
      leftFront: '900',
      rightFront: '700',
      leftRear: '790',
      rightRear: '620',
      unit: 'lb',
    });
    expect(car['total']).toBe('3010');
    near(car['left'], 56.1462, 1e-4);
  });

  it.each([
    ['an unknown quantity', { quantity: 'horsepower', inputs: {} }, '/quantity'],
    [
      'a missing bore',
      { quantity: 'displacement', inputs: { stroke: '3', cylinders: 8, unit: 'in' } },
      '/inputs/bore',
    ],
    [
      'a bore of zero',
      { quantity: 'displacement', inputs: { bore: '0', stroke: '3', cylinders: 8, unit: 'in' } },
      '/inputs/bore',
    ],
    [
      'half a cylinder',
      { quantity: 'displacement', inputs: { bore: '4', stroke: '3', cylinders: 7.5, unit: 'in' } },
      '/inputs/cylinders',
    ],
    [
      'a unit of volume for a length',
      { quantity: 'area', inputs: { diameter: '1', unit: 'cc' } },
      '/inputs/unit',
    ],
    [
      'a full chamber',
      {
        quantity: 'compression-ratio',
        inputs: {
          bore: '4',
          stroke: '3',
          chamber: '60',
          piston: '-80',
          deck: '0',
          gasketBore: '4',
          gasketThickness: '0.04',
          lengthUnit: 'in',
          volumeUnit: 'cc',
        },
      },
      '/inputs/piston',
    ],
    [
      'falling degrees',
      {
        quantity: 'duration',
        inputs: {
          checkingLift: '0.05',
          table: [
            ['0', '0'],
            ['9', '0.2'],
            ['5', '0'],
          ],
        },
      },
      '/inputs/table/2',
    ],
    [
      'a lift that is no number',
      {
        quantity: 'duration',
        inputs: {
          checkingLift: '0.05',
          table: [
            ['0', '0'],
            ['9', 'x'],
            ['15', '0'],
          ],
        },
      },
      '/inputs/table/1/1',
    ],
    [
      'one height only',
      {
        quantity: 'spring-rate',
        inputs: {
          points: [
            { height: '1', load: '1' },
            { height: '1', load: '2' },
          ],
          lengthUnit: 'in',
          forceUnit: 'lbf',
        },
      },
      '/inputs/points',
    ],
    ['no inputs', { quantity: 'area' }, '/inputs'],
  ])('refuses %s, naming the field', async (_, body, pointer) => {
    expect(await refused(engine, body)).toContain(pointer);
  });
});

describe('POST /api/bench/study', () => {
  const evaluate = async (method: string, data: unknown) => {
    const answer = await answered(study, { method, data });
    expect(studyResponse.safeParse(answer).error).toBeUndefined();
    return answer;
  };

  it('summary of a set with a large offset, numbers as text or as JSON numbers (NIST StRD NumAcc3)', async () => {
    const pairs = Array.from({ length: 500 }, () => [1000000.1, 1000000.3]).flat();
    for (const values of [
      [1000000.2, ...pairs],
      ['1000000.2', ...pairs.map((x) => String(x))],
    ]) {
      expect(await evaluate('summary', { values })).toEqual({
        n: 1001,
        mean: 1000000.2,
        standardDeviation: 0.1,
        lag1: -0.999,
      });
    }
  });

  it('one-way, thirteen figures before the point (NIST StRD SmLs07)', async () => {
    const centres = [4, 3, 5, 3, 5, 3, 5, 3, 5];
    const groups = centres.map((tenth) => [
      `1000000000000.${tenth}`,
      ...Array.from({ length: 10 }, () => [
        `1000000000000.${tenth - 1}`,
        `1000000000000.${tenth + 1}`,
      ]).flat(),
    ]);
    expect(await evaluate('one-way', { groups })).toMatchObject({
      ssBetween: 1.68,
      ssWithin: 1.8,
      F: 21,
    });
    expect(await evaluate('one-way', groups)).toMatchObject({ F: 21 });
  });

  const aiag = checkValue('aiag-avg-range');
  const data = Object.values(aiag.inputs['data[appraiser][trial][part]'] as object) as number[][][];
  it(`average-range and anova (${provenance(aiag)})`, async () => {
    for (const sent of [data, { data }]) {
      const found = await evaluate('average-range', sent);
      expect(found['method']).toBe('average-range');
      for (const key of ['EV', 'AV', 'GRR', 'PV'])
        near(found[key], aiag.expected[key] as number, 5e-5);
      expect(found['ndc']).toBe(5);
    }
    const anova = await evaluate('anova', { data });
    near(anova['GRR'], 0.302373, 2e-6);
    expect(anova['ndc']).toBe(4);
  });

  it('iso5725, bland-altman, kappa and wilson', async () => {
    const precision = await evaluate('iso5725', {
      data: [
        ['10', '12'],
        ['14', '14'],
        ['12', '12'],
      ],
    });
    near(precision['repeatabilitySd'], Math.sqrt(2 / 3), 1e-14);
    near(precision['reproducibilitySd'], Math.sqrt(8 / 3), 1e-14);
    const pefr = checkValue('bland-altman-pefr').inputs;
    const agreement = await evaluate('bland-altman', { a: pefr['wright1'], b: pefr['mini1'] });
    near(agreement['bias'], -2.1176470588, 1e-9);
    near(agreement['lower'], -78.097302, 1e-6);
    expect(
      await evaluate('kappa', {
        table: [
          [20, 5],
          [10, 15],
        ],
      }),
    ).toEqual({ kappa: 0.4 });
    const interval = await evaluate('wilson', { count: 81, n: 100 });
    near(interval['lower'], 0.7222, 6e-5);
    near(interval['upper'], 0.8749, 6e-5);
  });

  it.each([
    ['an unknown method', { method: 'guess', data: {} }, '/method'],
    [
      'a value that is none',
      { method: 'summary', data: { values: ['1', 'x', '3'] } },
      '/data/values/1',
    ],
    ['a null among values', { method: 'summary', data: { values: ['1', null] } }, '/data/values/1'],
    ['one value', { method: 'summary', data: { values: ['1'] } }, '/data/values'],
    ['an empty group', { method: 'one-way', data: { groups: [['1', '2'], []] } }, '/data/groups/1'],
    ['no repeats', { method: 'iso5725', data: { data: [['1'], ['2']] } }, '/data/data'],
    [
      'a ragged crossed study',
      {
        method: 'anova',
        data: {
          data: [
            [
              ['1', '2'],
              ['1', '2'],
            ],
            [['1', '2'], ['1']],
          ],
        },
      },
      '/data/data/1/1',
    ],
    [
      'pairs that do not pair',
      { method: 'bland-altman', data: { a: ['1', '2'], b: ['1', '2', '3'] } },
      '/data/b',
    ],
    [
      'a table that is not square',
      { method: 'kappa', data: { table: [[1, 2], [3]] } },
      '/data/table/1',
    ],
    ['more than all', { method: 'wilson', data: { count: 5, n: 4 } }, '/data/count'],
    ['no data', { method: 'wilson' }, '/data'],
  ])('refuses %s, naming the field', async (_, body, pointer) => {
    expect(await refused(study, body)).toContain(pointer);
  });
});

describe('the plumbing of the bench', () => {
  it('malformed JSON is 400, with problem details', async () => {
    const malformed = await send(assess, '{"value":');
    expect(malformed.status).toBe(400);
    expect(malformed.headers.get('content-type')).toBe('application/problem+json');
  });

  it('a body that is no object names the whole of it', async () => {
    expect(await refused(assess, 5)).toEqual(['']);
    expect(await refused(assess, null)).toEqual(['']);
  });

  it('too many requests of one address are asked to wait; another address goes on', async () => {
    const body = JSON.stringify({ method: 'wilson', data: { count: 1, n: 4 } });
    let last = await send(study, body, '192.0.2.9');
    for (let i = 0; i < 600; i += 1) last = await send(study, body, '192.0.2.9');
    expect(last.status).toBe(429);
    expect(Number(last.headers.get('retry-after'))).toBeGreaterThanOrEqual(1);
    expect((await send(study, body, '192.0.2.10')).status).toBe(200);
    clock.at = new Date(clock.at.getTime() + 1000);
    expect((await send(study, body, '192.0.2.9')).status).toBe(200);
  });
});

describe('the contract in OpenAPI', () => {
  it.each(operations.map((operation) => [operation.path, operation] as const))(
    '%s has a JSON Schema of what goes in and out',
    (_, { body, answer }) => {
      for (const [schema, io] of [
        [body, 'input'],
        [answer, 'output'],
      ] as const) {
        const made = z.toJSONSchema(schema as z.ZodMiniType, { io });
        expect(Object.keys(made).length).toBeGreaterThan(1);
      }
    },
  );
});

describe('POST /api/bench/temperature', () => {
  it('an iron bore read at 60 °C (constructed: 0.844 ÷ (1 + 11.4e-6 × 40))', async () => {
    const request = { unit: 'in', length: '0.8440', temperature: '140 °F', material: 'iron' };
    const answer = await answered(temperature, request);
    near(answer['lengthAt20C'], 0.844 / (1 + 11.4e-6 * 40), 1e-9);
    near(answer['change'], 0.844 - 0.844 / (1 + 11.4e-6 * 40), 1e-9);
    // A steel gauge as warm as the part reads it almost right.
    const warm = await answered(temperature, { ...request, gaugeTemperature: '60 C' });
    near(warm['lengthAt20C'], (0.844 * (1 + 11.5e-6 * 40)) / (1 + 11.4e-6 * 40), 1e-9);
  });

  it.each([
    ['a temperature without its unit', { temperature: '60' }, '/temperature'],
    ['below absolute zero', { temperature: '-300 °C' }, '/temperature'],
    ['an unknown material', { material: 'cheese' }, '/material'],
    ['a length of zero', { length: '0' }, '/length'],
  ])('refuses %s, naming the field', async (_, change, pointer) => {
    const request = { unit: 'in', length: '0.8440', temperature: '60 °C', material: 'iron' };
    expect(await refused(temperature, { ...request, ...change })).toContain(pointer);
  });
});
