import { describe, expect, test } from 'vitest';
import { paperworkDifferences } from '@/domain/paperwork/differences';
import type { PaperworkDocument } from '@/domain/paperwork/document';
import { GENERIC_LAYOUTS } from '@/domain/tappet/layout/generic-layouts';

const paper = (change: Partial<PaperworkDocument> = {}): PaperworkDocument => ({
  document: 'tagwire/paperwork',
  version: '1',
  series: 'S',
  season: '2026',
  className: 'Street Eight',
  competitor: 'Ada Lindqvist',
  carNumber: '12J',
  engine: {
    id: '01900000-0000-7000-8000-000000000001',
    reference: 'VR-2231',
    layout: GENERIC_LAYOUTS[0]!,
    blockCasting: '',
    headCastings: '',
    serial: '',
  },
  rulesHash: '',
  answers: [{ subject: 'tappet-type', position: 'engine', value: 'flat' }],
  sheets: [
    {
      subject: 'lifter-sheet',
      readings: [
        {
          position: '3 exhaust',
          quantity: 'tappet-bore-diameter',
          depth: '',
          axis: '',
          value: { text: '0.8446', unit: 'in' },
        },
      ],
    },
  ],
  photographs: [
    {
      item: 'lifters-racked',
      fileId: 'a',
      name: 'a.jpg',
      sha256: 'aa',
      bytes: '1',
      type: 'image/jpeg',
    },
  ],
  files: [],
  note: '',
  ...change,
});

describe('two versions side by side', () => {
  test('the same paper shows no difference, under another file name neither', () => {
    expect(paperworkDifferences(paper(), paper())).toEqual([]);
    const renamed = paper({ photographs: [{ ...paper().photographs[0]!, name: 'b.jpg' }] });
    expect(paperworkDifferences(paper(), renamed)).toEqual([]);
  });

  test('a value, an answer, a picture: each with what it was, and what is gone last', () => {
    const reading = paper().sheets[0]!.readings[0]!;
    const now = paper({
      answers: [],
      sheets: [
        {
          subject: 'lifter-sheet',
          readings: [{ ...reading, value: { text: '0.8442', unit: 'in' } }],
        },
      ],
      photographs: [{ ...paper().photographs[0]!, name: 'again.jpg', sha256: 'bb' }],
    });
    expect(paperworkDifferences(paper(), now)).toEqual([
      {
        item: 'lifter-sheet',
        place: '3 exhaust, tappet bore diameter',
        before: '0.8446 in',
        now: '0.8442 in',
      },
      { item: 'lifters-racked', place: 'file', before: undefined, now: 'again.jpg' },
      { item: 'tappet-type', place: '', before: 'flat' },
      { item: 'lifters-racked', place: 'file', before: 'a.jpg' },
    ]);
  });

  test('a trailing zero is a difference: it says how finely it was read', () => {
    const reading = paper().sheets[0]!.readings[0]!;
    const now = paper({
      sheets: [
        {
          subject: 'lifter-sheet',
          readings: [{ ...reading, value: { text: '0.84460', unit: 'in' } }],
        },
      ],
    });
    expect(paperworkDifferences(paper(), now).map((row) => row.now)).toEqual(['0.84460 in']);
  });
});
