import { describe, expect, it } from 'vitest';
import { ENGINE_RULE_SET } from '@/domain/rulebook/rule-sets/engine';
import { TAPPET_RULE_SET } from '@/domain/rulebook/rule-sets/tappet';
import { WEIGHTS_RULE_SET } from '@/domain/rulebook/rule-sets/weights';
import { clausesCsv, readClausesCsv } from '@/services/rulebook/file/clauses-csv';
import { readFile } from '@/services/rulebook/file/read-file';

/** With each of two sets by itself wherever a limit may say so. */
const EACH_SET = {
  ...TAPPET_RULE_SET,
  title: 'Two sets, each by itself',
  clauses: TAPPET_RULE_SET.clauses.map((clause) =>
    clause.requirement?.kind === 'limit'
      ? { ...clause, requirement: { ...clause.requirement, twoSets: 'each' as const } }
      : clause,
  ),
};
const SETS = [TAPPET_RULE_SET, ENGINE_RULE_SET, WEIGHTS_RULE_SET, EACH_SET];
const details = (result: ReturnType<typeof readFile>) =>
  result.ok ? [] : (result.failure.faults ?? []).map((fault) => fault.detail);

describe('clauses as CSV', () => {
  it.each(SETS)('go out and come back without loss: $title', (set) => {
    const read = readClausesCsv(clausesCsv(set.clauses));
    expect(read).toEqual({ ok: true, value: JSON.parse(JSON.stringify(set.clauses)) });
  });

  it('keep commas, quotation marks, line ends and spaces at the edge', () => {
    const clause = {
      number: '1',
      heading: 'He said "no", twice',
      words: ' First line.\r\nSecond, line. ',
      force: 'text' as const,
    };
    expect(readClausesCsv(clausesCsv([clause]))).toEqual({ ok: true, value: [clause] });
  });

  it('take plain clauses of few columns in any order, with the mark of the byte order', () => {
    const read = readClausesCsv('\uFEFFheading,number,words\nPurpose,1,Fair and safe.\nWords,2,\n');
    expect(read).toEqual({
      ok: true,
      value: [
        { number: '1', heading: 'Purpose', words: 'Fair and safe.', force: 'text' },
        { number: '2', heading: 'Words', words: '', force: 'text' },
      ],
    });
  });

  it('name every fault by line and column', () => {
    const text = [
      'number,heading,force,requirement',
      '1.x,Purpose,text,',
      '2,Type,perhaps,',
      '3,Body,mandatory,{not json',
      '4,Body,mandatory,"{""kind"":""limit""}"',
    ].join('\n');
    const read = readFile('rules.csv', text, []);
    expect(details(read)).toEqual(
      expect.arrayContaining([
        'Line 4, requirement: this is not JSON.',
        expect.stringMatching(/^Line 2, number: /),
        expect.stringMatching(/^Line 3, force: /),
        expect.stringMatching(/^Line 5, requirement\/quantity: /),
      ]),
    );
  });

  it('need their columns named', () => {
    expect(details(readFile('rules.csv', 'a,b\n1,2\n', []))[0]).toMatch(/^The first line names/);
    expect(details(readFile('rules.csv', 'number,colour\n1,red\n', []))).toEqual([
      'There is no column "colour" here.',
    ]);
  });
});

describe('a rulebook as a JSON file', () => {
  it.each(SETS)('comes back without loss: $title', ({ title, clauses, penalties }) => {
    const file = { format: 'tagwire/rulebook', version: '1', title, clauses, penalties };
    const read = readFile('rules.json', JSON.stringify(file), []);
    expect(read).toEqual({
      ok: true,
      value: JSON.parse(JSON.stringify({ title, clauses, penalties })),
    });
  });

  it('says of every fault in which clause it stands', () => {
    const [first, second] = TAPPET_RULE_SET.clauses;
    const file = {
      format: 'tagwire/rulebook',
      version: '1',
      title: 'Rules',
      clauses: [
        { ...first, colour: 'red' },
        { ...second, force: 'perhaps' },
      ],
      penalties: [],
    };
    expect(details(readFile('rules.json', JSON.stringify(file), []))).toEqual([
      'clauses 1 (1), colour: There is no field of this name here.',
      'clauses 2 (2), force: Write one of: mandatory, advisory, judged, text.',
    ]);
  });

  it('that is no JSON, or of another kind, is refused as a whole', () => {
    expect(details(readFile('rules.json', '{', []))).toEqual(['The file is not JSON.']);
    expect(readFile('rules.pdf', '', [])).toMatchObject({ failure: { name: 'unsupported-file' } });
  });
});
