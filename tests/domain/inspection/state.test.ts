import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import {
  acceptsReadings,
  actsFrom,
  type InspectionAct,
  type InspectionState,
  needsReason,
  nextState,
  TRANSITIONS,
} from '@/domain/inspection/state';

const ACTS: readonly InspectionAct[] = [
  'open',
  'hold',
  'resume',
  'refuse',
  'stop',
  'defer',
  'close',
  'correct',
];
const STATES = Object.keys(TRANSITIONS) as InspectionState[];

const step = (state: InspectionState, act: InspectionAct): InspectionState | undefined => {
  const result = nextState(state, act, 'because');
  return result.ok ? result.value : undefined;
};

describe('an inspection', () => {
  it.each<[string, readonly InspectionAct[], InspectionState]>([
    ['plain', ['open', 'close'], 'closed'],
    ['held hot and measured again', ['open', 'hold', 'resume', 'close'], 'closed'],
    ['stopped on Saturday, opened on Monday', ['open', 'stop', 'resume', 'close'], 'closed'],
    ['deferred before it began', ['defer', 'resume', 'close'], 'closed'],
    ['refused, then thought better of', ['open', 'refuse', 'resume'], 'open'],
    ['refused and reported', ['refuse', 'close'], 'closed'],
    ['corrected twice', ['open', 'close', 'correct', 'correct'], 'closed'],
  ])('%s', (_, acts, end) => {
    const state = acts.reduce<InspectionState | undefined>(
      (now, act) => now && step(now, act),
      'to-do',
    );
    expect(state).toBe(end);
  });

  it('is never opened again once closed', () => {
    expect(actsFrom('closed')).toEqual(['correct']);
    fc.assert(
      fc.property(fc.array(fc.constantFrom(...ACTS)), (acts) => {
        expect(
          acts.reduce<InspectionState>((state, act) => step(state, act) ?? state, 'closed'),
        ).toBe('closed');
      }),
    );
  });

  it('can be closed from every state in some way', () => {
    for (const state of STATES.filter((row) => row !== 'closed')) {
      const reached = new Set<InspectionState>([state]);
      for (let i = 0; i < STATES.length; i += 1)
        for (const from of [...reached])
          for (const act of actsFrom(from)) reached.add(step(from, act) ?? from);
      expect([state, reached.has('closed')]).toEqual([state, true]);
    }
  });

  it('asks for a reason where one is owed', () => {
    expect(ACTS.filter(needsReason)).toEqual(['hold', 'refuse', 'stop', 'defer', 'correct']);
    expect(nextState('open', 'stop', '  ')).toMatchObject({
      ok: false,
      failure: { name: 'invalid' },
    });
    expect(nextState('open', 'close', '')).toEqual({ ok: true, value: 'closed' });
    expect(nextState('closed', 'open', 'x')).toMatchObject({
      ok: false,
      failure: { name: 'not-in-this-state' },
    });
  });

  it('takes readings while open or held only', () => {
    expect(STATES.filter(acceptsReadings)).toEqual(['open', 'held-hot']);
  });
});
