import { describe, expect, it } from 'vitest';
import { type HeldPart, tagCode } from '@/domain/inspection/custody/tag';

const part: HeldPart = {
  tag: 'T-0007',
  kind: 'held',
  carNumber: '12J',
  event: 'Round 7; #1?',
  words: 'Lifter & foot',
  placeOnEngine: 'intake 3',
  clause: '4.3',
  bag: '',
  takenFrom: 'Wren Halloway',
  takenBy: 'Ilse Törnkvist',
  takenAt: '2026-07-12T03:40:00.000Z',
  hash: 'ab'.repeat(32),
};

describe('the code of a tag', () => {
  const code = tagCode('https://tags.example/barn/parts/0190', part);

  it('is a link to the part that carries the tag’s text by itself', () => {
    const url = new URL(code);
    expect(`${url.origin}${url.pathname}`).toBe('https://tags.example/barn/parts/0190');
    expect(code.split('#')).toEqual([
      'https://tags.example/barn/parts/0190',
      `TAG=T-0007;CAR=12J;PART=Lifter_-_foot,_intake_3;CLAUSE=4.3;TAKEN=2026-07-12T03:40;BY=Ilse_Törnkvist;EVENT=Round_7-_-1-;SHA256=${part.hash}`,
    ]);
  });

  it('leaves out what was not written', () => {
    expect(code).not.toContain('BAG=');
  });
});
