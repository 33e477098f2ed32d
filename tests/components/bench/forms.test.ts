import { describe, expect, it } from 'vitest';
import {
  placesFor,
  shownDecimal,
  shownPercent,
  shownWidth,
} from '@/components/bench/answers/shown';
import { calculators } from '@/components/bench/calculators';
import { type FieldGroup, fieldsOf, type Typed } from '@/components/bench/fields';
import {
  camExamples,
  eventsBody,
  eventsForm,
  liftBody,
  liftForm,
  tableBody,
  tableForm,
} from '@/components/bench/forms/cam';
import { clearanceBody, clearanceExample, clearanceForm } from '@/components/bench/forms/clearance';
import {
  compressionBody,
  compressionExample,
  compressionForm,
} from '@/components/bench/forms/compression';
import { decisionBody, decisionExample, decisionForm } from '@/components/bench/forms/decision';
import {
  displacementBody,
  displacementExample,
  displacementForm,
} from '@/components/bench/forms/displacement';
import {
  areaBody,
  areaForm,
  sizesExamples,
  springBody,
  springForm,
  weightsBody,
  weightsForm,
} from '@/components/bench/forms/sizes';
import {
  temperatureBody,
  temperatureExample,
  temperatureForm,
} from '@/components/bench/forms/temperature';
import {
  uncertaintyBody,
  uncertaintyExample,
  uncertaintyForm,
} from '@/components/bench/forms/uncertainty';
import { faultsByField, typedFrom } from '@/components/bench/typed';
import { assessRequest } from '@/contracts/bench/assess';
import { clearanceRequest } from '@/contracts/bench/clearance';
import { engineRequest } from '@/contracts/bench/engine';
import { temperatureRequest } from '@/contracts/bench/temperature';
import { uncertaintyRequest } from '@/contracts/bench/uncertainty';
import { readBody } from '@/contracts/read-body';
import { invalid } from '@/domain/failure';

const typed = (query: string, groups: readonly FieldGroup[]) =>
  typedFrom(new URLSearchParams(query), groups);

const forms = [
  ['clearance', clearanceForm, clearanceExample, clearanceBody, clearanceRequest],
  ['decision', decisionForm, decisionExample, decisionBody, assessRequest],
  ['uncertainty', uncertaintyForm({}), uncertaintyExample, uncertaintyBody, uncertaintyRequest],
  ['displacement', displacementForm, displacementExample, displacementBody, engineRequest],
  ['compression', compressionForm, compressionExample, compressionBody, engineRequest],
  ['cam events', eventsForm, camExamples.events, eventsBody, engineRequest],
  ['cam table', tableForm, camExamples.table, tableBody, engineRequest],
  ['cam lift', liftForm, camExamples.lift, liftBody, engineRequest],
  ['spring', springForm, sizesExamples.spring, springBody, engineRequest],
  ['area', areaForm, sizesExamples.area, areaBody, engineRequest],
  ['weights', weightsForm, sizesExamples.weights, weightsBody, engineRequest],
  ['temperature', temperatureForm, temperatureExample, temperatureBody, temperatureRequest],
] as const;

describe('each calculator', () => {
  it.each(forms)(
    '%s: its example is a request the contract takes',
    (_, groups, example, body, schema) => {
      const request = body(typed(example, groups));
      expect(schema.safeParse(request).error?.issues).toBeUndefined();
    },
  );

  it.each(forms)(
    '%s: what was left out is told at a field that exists',
    (_, groups, __, body, schema) => {
      const result = readBody(schema as typeof assessRequest, body({}));
      const faults = faultsByField(groups, result.ok ? undefined : result.failure);
      const names = fieldsOf(groups).map(({ name }) => name);
      const places = Object.keys(faults);
      expect(places.length).toBeGreaterThan(0);
      if (_ !== 'uncertainty') for (const place of places) expect(names).toContain(place);
    },
  );

  it.each(forms)('%s: no two fields share a name or a place', (_, groups) => {
    const fields = fieldsOf(groups);
    expect(new Set(fields.map(({ name }) => name)).size).toBe(fields.length);
    expect(new Set(fields.map(({ pointer }) => pointer)).size).toBe(fields.length);
  });

  it('has its place in the list', () => {
    expect(calculators.map(({ slug }) => slug)).toEqual([
      'clearance',
      'decision',
      'uncertainty',
      'displacement',
      'compression',
      'cam',
      'temperature',
      'sizes',
    ]);
  });
});

describe('what is typed', () => {
  it('a bore is read depth by depth, with repeats and places that were not read', () => {
    const request = clearanceBody({ bore: '0.8440/0.8441  -\r\n\n.8439;0,8440' } as Typed);
    expect(request).toMatchObject({
      bore: [
        [['0.8440', '0.8441'], null],
        ['.8439', '0,8440'],
      ],
    });
  });

  it('empty and unknown parameters are left out, spaces trimmed', () => {
    expect(typed('?bore=+4.0+&stroke=&evil=1', displacementForm)).toEqual({ bore: '4.0' });
  });

  it('lines of a budget that were left empty are passed over, and faults still find their line', () => {
    const entered = { name1: 'dial', u1: '1', name3: 'hand', u3: 'q' };
    expect(uncertaintyBody(entered)).toMatchObject({
      components: [{ name: 'dial' }, { name: 'hand' }],
    });
    const failure = invalid([{ pointer: '/components/1/standardUncertainty', detail: 'no' }]);
    expect(faultsByField(uncertaintyForm(entered), failure)).toEqual({ u3: ['no'] });
  });

  it('a fault within a table says its line and place', () => {
    const failure = invalid([{ pointer: '/bore/1/0', detail: '"x" is not a number.' }]);
    expect(faultsByField(clearanceForm, failure)).toEqual({
      bore: ['Line 2, place 1: "x" is not a number.'],
    });
  });

  it('a fault of the whole rule stands at no single field', () => {
    const failure = invalid([{ pointer: '/requirement', detail: 'Write a min, a max, or both.' }]);
    expect(faultsByField(decisionForm, failure)).toEqual({ '': ['Write a min, a max, or both.'] });
  });
});

describe('what is shown', () => {
  it('decimals half to even, a real minus', () => {
    expect(shownDecimal('0.00125', 4)).toBe('0.0012');
    expect(shownDecimal('-0.00135', 4)).toBe('−0.0014');
  });
  it('an uncertainty keeps two figures and is never rounded down', () => {
    expect(placesFor(0.0000784)).toBe(6);
    expect(shownWidth(0.0000784, placesFor(0.0000784))).toBe('0.000079');
    expect(shownWidth(0.2234, placesFor(0.2234))).toBe('0.23');
    expect(shownWidth(0.0002, 4)).toBe('0.0002');
  });
  it('a probability is never rounded to certainty', () => {
    expect(shownPercent(0.99999)).toBe('more than 99.9 %');
    expect(shownPercent(0.00001)).toBe('less than 0.1 %');
    expect(shownPercent(1)).toBe('100.0 %');
    expect(shownPercent(0.5)).toBe('50.0 %');
  });
});
