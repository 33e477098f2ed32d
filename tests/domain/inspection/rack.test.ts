import { describe, expect, it } from 'vitest';
import { orderOf, orderWords, rackOf, signedReturnOf } from '@/domain/inspection/rack/rack';
import { exhaust, intake, remark, TWIN } from './build';

const out = [
  remark('o1', 'lifter-out', { place: intake }),
  remark('o2', 'lifter-out', { place: exhaust }),
];
const back = (id: string, lifter: string, place = intake) =>
  remark(id, 'lifter-in', { place, subject: lifter });

describe('lifters racked by bore', () => {
  it('are in the engine until they come out, and racked until they go in', () => {
    expect(rackOf(TWIN, []).map(({ state }) => state)).toEqual(['in-engine', 'in-engine']);
    const rack = rackOf(TWIN, [...out, back('i3', '1 intake')]);
    expect(rack.map(({ lifter, state }) => `${lifter} ${state}`).sort()).toEqual([
      '1 exhaust racked',
      '1 intake returned',
    ]);
    expect(orderOf(rack)).toMatchObject({ kept: false, racked: ['1 exhaust'], changed: [] });
  });

  it('back in their own bores keep the order; swapped ones are named', () => {
    const kept = rackOf(TWIN, [...out, back('i3', '1 intake'), back('i4', '1 exhaust', exhaust)]);
    expect(orderOf(kept)).toMatchObject({ kept: true, racked: [], twice: [] });
    const swapped = orderOf(
      rackOf(TWIN, [...out, back('i3', '1 intake', exhaust), back('i4', '1 exhaust')]),
    );
    expect(swapped.kept).toBe(false);
    expect(orderWords(swapped).split(', ').sort()).toEqual([
      '1 exhaust into 1 intake',
      '1 intake into 1 exhaust',
    ]);
  });

  it('two in one bore are noticed', () => {
    const rack = rackOf(TWIN, [...out, back('i3', '1 intake'), back('i4', '1 exhaust')]);
    expect(orderOf(rack).twice).toEqual(['1 intake']);
  });

  it('the signed return stands until a lifter moves again', () => {
    const sign = remark('s9', 'lifters-returned', {
      subject: 'Fenn Ostrava',
      answer: { value: 'kept' },
    });
    expect(signedReturnOf([...out, sign])).toMatchObject({
      signedBy: 'Fenn Ostrava',
      order: 'kept',
      outdated: false,
    });
    const later = remark('o12', 'lifter-out', { place: intake });
    expect(signedReturnOf([...out, sign, later])?.outdated).toBe(true);
    expect(signedReturnOf(out)).toBeUndefined();
  });
});
