import { describe, expect, it } from 'vitest';
import {
  type ColumnChoices,
  guessColumns,
  LAP_COLUMNS,
} from '@/services/event/entries-file/columns';
import { readEntries } from '@/services/event/entries-file/read-entries';
import { readTable } from '@/services/event/entries-file/read-table';

const classes = [
  { id: 'c1', name: 'Street Stock', slug: 'street-stock' },
  { id: 'c2', name: 'Modified Four', slug: 'modified-four' },
];

const tableOf = (text: string) => {
  const read = readTable(text);
  if (!('table' in read)) throw new Error(read.fault.detail);
  return read.table;
};
const read = (text: string, chosen: ColumnChoices = {}, usualClass?: string) => {
  const table = tableOf(text);
  return readEntries(
    table,
    { ...guessColumns(table.heads, {}), ...chosen },
    {
      classes,
      usualClass,
      newId: () => 'new',
    },
  );
};

describe('a file of entries', () => {
  it('names each fault by its line and takes every other line', () => {
    const file = read(
      [
        'Car number;Class;Competitor;Engine;Position',
        '12j;Street Stock;Tamsin Overley;VR-2231;1',
        '7;Late Night;Joss Farrow;;2',
        '',
        '12J;street-stock;Somebody Else;;x',
        '"8";"Street Stock";"Overley, T.";;',
      ].join('\r\n'),
    );
    expect(file.rows.map(({ carNumber, line, position }) => [carNumber, line, position])).toEqual([
      ['12J', 2, 1],
      ['8', 6, null],
    ]);
    expect(file.faults.map(({ line }) => line)).toEqual([3, 5, 5]);
    expect(file.faults[0]?.detail).toContain('“Late Night” is no class');
  });

  it('keeps a car number as text: 007 is not 7, and 12J keeps its letter', () => {
    const { rows } = read(
      'Car,Class,Competitor\n007,Street Stock,A\n7,Street Stock,B\n#12j,Street Stock,C',
    );
    expect(rows.map(({ carNumber }) => carNumber)).toEqual(['007', '7', '12J']);
  });

  it('reads lap times as written: decimal commas, one cell or a column each, in the laps’ order', () => {
    const one = read('Car;Class;Name;Lap times\n8;Street Stock;A;17,482 17,501 1:02,300');
    expect(one.rows[0]?.laps).toEqual(['17,482', '17,501', '1:02,300']);
    const each = read(
      'Car;Class;Name;Lap 2;Lap 10;Lap 1\n8;Street Stock;A;17,50;17,40;17,60\n9;Street Stock;B;18,1;;18,2',
    );
    expect(each.rows.map(({ laps }) => laps)).toEqual([
      ['17,60', '17,50', '17,40'],
      ['18,2', '18,1'],
    ]);
    expect(read('Car;Class;Name;Lap 1\n8;Street Stock;A;fast').faults).toEqual([
      { line: 2, detail: 'Lap 1, “fast”, is no lap time.' },
    ]);
  });

  it('passes a mark of bytes, a stated delimiter and title lines, and counts lines as an editor does', () => {
    const file = read(
      '\uFEFFsep=;\r\nResults of the feature;;\r\nNo.;Class;Driver\r\n8;Street Stock;A\r\n;Street Stock;B\r\n',
    );
    expect(
      file.rows.map(({ line, carNumber, competitorName, driver }) => [
        line,
        carNumber,
        competitorName,
        driver,
      ]),
    ).toEqual([[4, '8', 'A', 'A']]);
    expect(file.faults.map(({ line }) => line)).toEqual([5]);
  });

  it('takes a position as people write it, and none where nobody finished', () => {
    const { rows, faults } = read(
      'Pos,Car,Class,Name\n1.,1,Street Stock,A\n02,2,Street Stock,B\nDNF,3,Street Stock,C\n-,4,Street Stock,D\n0,5,Street Stock,E',
    );
    expect(rows.map(({ position }) => position)).toEqual([1, 2, null, null]);
    expect(faults).toEqual([{ line: 6, detail: '“0” is no finishing position.' }]);
  });

  it('gives lines without a class the one that was chosen for them', () => {
    const text = 'Car,Name\n1,A';
    expect(read(text).faults[0]?.detail).toContain('Choose one for lines that name none');
    expect(read(text, {}, 'c2').rows[0]?.classId).toBe('c2');
  });

  it.each([
    ['', 1],
    ['Only one column\n1', 1],
    ['Car,Class,Competitor\n', 2],
    ['Car,Class,Competitor\n1,"Street Stock,A', 2],
  ])('that cannot be read says where: %j', (text, line) => {
    const result = readTable(text);
    expect('fault' in result && result.fault.line).toBe(line);
  });
});

describe('which column is which', () => {
  const heads = ['Startnummer', 'Klasse', 'Fahrer', 'Rang', 'Lap 1', 'Lap 2'];

  it('is guessed from names, never one column for two fields but the competitor’s own', () => {
    expect(guessColumns(['No', 'Driver', 'Class', 'Pos', 'Lap 1'], {})).toEqual({
      carNumber: 'no',
      className: 'class',
      driver: 'driver',
      competitor: 'driver',
      position: 'pos',
      laps: LAP_COLUMNS,
    });
    expect(guessColumns(heads, {})).toEqual({ laps: LAP_COLUMNS });
  });

  it('is what was chosen for the series before, where the file has that column', () => {
    const before = {
      carNumber: 'startnummer',
      competitor: 'fahrer',
      position: 'rang',
      engine: 'motor',
    };
    expect(guessColumns(heads, before)).toEqual({
      carNumber: 'startnummer',
      competitor: 'fahrer',
      position: 'rang',
      laps: LAP_COLUMNS,
    });
  });

  it('must name car and competitor; the fault stands at the line of the names', () => {
    const table = tableOf('Startnummer;Fahrer\n8;A');
    expect(readEntries(table, {}, { classes, usualClass: 'c1', newId: () => 'x' }).faults).toEqual([
      { line: 1, detail: 'Choose which column is “Car number”.' },
      { line: 1, detail: 'Choose which column is “Competitor”.' },
    ]);
  });
});
