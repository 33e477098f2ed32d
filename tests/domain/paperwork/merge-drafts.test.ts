import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { EMPTY_DRAFT, type PaperworkDraft } from '@/domain/paperwork/draft';
import { draftConflicts, mergeDrafts } from '@/domain/paperwork/merge/merge-drafts';

const answer = (subject: string, typed: string) => ({ subject, position: 'engine', typed });
const cell = (position: string, typed: string) => ({
  position,
  quantity: 'tappet-bore-diameter' as const,
  depth: '',
  axis: '',
  typed,
  unit: 'in',
});
const draft = (
  answers: Readonly<Record<string, string>>,
  bores: Readonly<Record<string, string>> = {},
  note = '',
): PaperworkDraft => ({
  ...EMPTY_DRAFT,
  answers: Object.entries(answers).map(([subject, typed]) => answer(subject, typed)),
  sheets:
    Object.keys(bores).length === 0
      ? []
      : [
          {
            subject: 'lifter-sheet',
            cells: Object.entries(bores).map(([at, typed]) => cell(at, typed)),
          },
        ],
  note,
});

describe('two devices', () => {
  it('that wrote different fields need nobody to decide', () => {
    const base = draft({ type: 'flat', heads: '62' }, { '1 intake': '0.8440' });
    const mine = draft({ type: 'flat', heads: '63' }, { '1 intake': '0.8440' }, 'New heads.');
    const theirs = draft(
      { type: 'flat', heads: '62' },
      { '1 intake': '0.8441', '2 intake': '0.8439' },
    );
    expect(draftConflicts(base, mine, theirs)).toEqual([]);
    expect(mergeDrafts(base, mine, theirs)).toEqual(
      draft(
        { type: 'flat', heads: '63' },
        { '1 intake': '0.8441', '2 intake': '0.8439' },
        'New heads.',
      ),
    );
  });

  it('that wrote the same field differently are asked about that field alone', () => {
    const base = draft({ heads: '62', serial: '1' }, { '1 intake': '0.8440' });
    const mine = draft({ heads: '63', serial: '2' }, { '1 intake': '0.8442' });
    const theirs = draft({ heads: '64', serial: '1' }, { '1 intake': '0.8441' });
    const conflicts = draftConflicts(base, mine, theirs);
    expect(conflicts.map(({ mine: m, theirs: t }) => [m, t])).toEqual([
      ['63', '64'],
      ['0.8442 in', '0.8441 in'],
    ]);
    const chosen = new Map([[conflicts[0]?.key ?? '', 'theirs' as const]]);
    expect(mergeDrafts(base, mine, theirs, chosen)).toEqual(
      draft({ heads: '64', serial: '2' }, { '1 intake': '0.8442' }),
    );
  });

  it('one of which took an answer out, that is a change like another', () => {
    const base = draft({ heads: '62' });
    expect(mergeDrafts(base, draft({}), base)).toEqual(draft({}));
    expect(draftConflicts(base, draft({}), draft({ heads: '63' }))).toMatchObject([
      { mine: '', theirs: '63' },
    ]);
  });

  it('of which nobody knows what they began with: every difference is one to decide', () => {
    const conflicts = draftConflicts(
      undefined,
      draft({ a: '1', b: '2' }),
      draft({ a: '1', b: '3', c: '4' }),
    );
    expect(conflicts.map(({ key }) => key)).toEqual(['answer|b|engine', 'answer|c|engine']);
  });

  it('never lose what only one of them wrote, and agree when nothing was written', () => {
    const some = fc
      .dictionary(fc.constantFrom('a', 'b', 'c', 'd'), fc.constantFrom('1', '2', '3'))
      .map((answers) => draft(answers));
    const sorted = ({ answers }: PaperworkDraft) =>
      [...answers].sort((x, y) => x.subject.localeCompare(y.subject));
    fc.assert(
      fc.property(some, some, some, (base, mine, theirs) => {
        expect(sorted(mergeDrafts(base, base, theirs))).toEqual(sorted(theirs));
        expect(sorted(mergeDrafts(base, mine, base))).toEqual(sorted(mine));
        expect(sorted(mergeDrafts(base, mine, mine))).toEqual(sorted(mine));
        const all = new Map(
          draftConflicts(base, mine, theirs).map(({ key }) => [key, 'theirs' as const]),
        );
        const merged = mergeDrafts(base, mine, theirs, all);
        for (const one of theirs.answers) {
          const was = base.answers.find(({ subject }) => subject === one.subject)?.typed;
          if (one.typed !== was) expect(merged.answers).toContainEqual(one);
        }
      }),
    );
  });
});
