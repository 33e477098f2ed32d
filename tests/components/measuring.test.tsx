import { renderToStaticMarkup } from 'react-dom/server';
import { describe, expect, it } from 'vitest';
import { Caution } from '@/components/look/Caution';
import { FindingRow, FindingTable } from '@/components/look/FindingRow';
import { ProblemSummary } from '@/components/look/ProblemSummary';
import { displayNumber, ReadingValue } from '@/components/look/ReadingValue';
import { SavedLine } from '@/components/look/SavedLine';
import { StateSheet } from '@/components/look/StateSheet';
import { BoreHeader, LiveReading, ResultStrip } from '@/components/tappet/BorePanels';
import { CellsTable } from '@/components/tappet/CellsTable';
import { Keypad } from '@/components/tappet/Keypad';
import { padKeyOf } from '@/components/tappet/keys';
import { RunLine } from '@/components/tappet/RunLine';
import { Tally } from '@/components/tappet/Tally';

const html = renderToStaticMarkup;
const stops = [
  { key: '1 exhaust', cylinder: '1', valve: 'exhaust' },
  { key: '1 intake', cylinder: '1', valve: 'intake' },
] as const;

describe('numbers for display', () => {
  it.each([
    ['-0.2', false, '−0.2'],
    ['0.2', true, '+0.2'],
    ['-0.2', true, '−0.2'],
    ['0.0', true, '0.0'],
    ['0,20', true, '+0,20'],
    ['0.8440', false, '0.8440'],
  ])('%s signed %s reads %s', (text, signed, shown) => {
    expect(displayNumber(text, signed)).toBe(shown);
  });

  it('never show ± U without its k', () => {
    const shown = html(
      <ReadingValue value="0.0062" unit="in" uncertainty={{ value: '0.0002', k: '2' }} />,
    );
    expect(shown).toContain('0.0062 in ± 0.0002 in');
    expect(shown).toContain('(k = 2)');
    expect(shown).toContain('0.0062 in, plus or minus 0.0002 in, k 2');
  });
});

describe('the keypad', () => {
  it('means the same by key and by keyboard', () => {
    const press = (key: string, more = {}) =>
      padKeyOf({ key, ctrlKey: false, metaKey: false, altKey: false, ...more });
    expect(['7', '.', ',', '-', 'Backspace', 'Enter'].map((key) => press(key))).toEqual([
      '7',
      'point',
      'point',
      'sign',
      'erase',
      'enter',
    ]);
    expect(press('a')).toBeUndefined();
    expect(press('F5')).toBeUndefined();
    expect(press('1', { ctrlKey: true })).toBeUndefined();
  });

  it('names the keys that carry a sign only', () => {
    const pad = html(
      <Keypad onKey={() => undefined} unit="0.001 in" enterHint="on to 5 intake" decimal="," />,
    );
    expect(pad.match(/<button/g)).toHaveLength(14);
    for (const name of ['Change the sign', 'Decimal point', 'Erase the last digit'])
      expect(pad).toContain(`aria-label="${name}"`);
    expect(pad).toContain('Enter<small>on to 5 intake</small>');
  });
});

describe('the zero run', () => {
  it('says that the closing zero is missing, and dashes the way to it', () => {
    const run = html(<RunLine opening="0.0" stops={stops} current="1 intake" />);
    expect(run).toContain('now at 1 intake; closing zero not taken yet');
    expect(run).toContain('stroke-dasharray');
    expect(run.match(/not yet/g)).toHaveLength(1);
  });

  it('is solid to the end once the closing zero stands', () => {
    const run = html(<RunLine opening="0.0" stops={stops} closing="0.1" />);
    expect(run).toContain('closing zero 0.1');
    expect(run).not.toContain('not yet');
    expect(run).toMatch(/x1="94%" x2="94%"[^>]*stroke-dasharray/);
  });
});

describe('panels', () => {
  const cells = (
    <CellsTable
      progress="1 of 2 taken"
      axes={['Along', 'Across']}
      rows={[{ depth: 'Above the gallery', cells: [{ key: 'a', value: '0.1' }, { key: 'b' }] }]}
      current="b"
      onSelect={() => undefined}
    />
  );

  it('make each cell a button that says where it is and what it holds', () => {
    const table = html(cells);
    expect(table).toContain('aria-label="Above the gallery, Along: +0.1"');
    expect(table).toMatch(/aria-current="true" aria-label="Above the gallery, Across: empty"/);
    expect(table).toContain('<th scope="row">Above the gallery</th>');
  });

  it('hide a first set from the second reader', () => {
    const hidden = html(
      <CellsTable
        progress=""
        axes={['Along']}
        rows={[{ depth: 'Above', cells: [{ key: 'a', value: '0.1', state: 'hidden' }] }]}
      />,
    );
    expect(hidden).toContain('hidden');
    expect(hidden).not.toContain('0.1');
  });

  it('count only the marks that occur', () => {
    const tally = html(<Tally statuses={['within', 'within', 'outside']} />);
    expect(tally.match(/<li>/g)).toHaveLength(2);
    expect(tally).toContain('>2</span>within');
  });

  it('lead from each problem to its field', () => {
    const shown = html(
      <ProblemSummary problems={[{ field: 'stroke', message: 'Stroke: "3.4.8" is no number.' }]} />,
    );
    expect(shown).toContain('href="#stroke"');
    expect(html(<ProblemSummary problems={[]} />)).toBe('');
  });

  it('never let anything open wear the notch', () => {
    expect(html(<StateSheet state="live" justClosed />)).toContain('class="sheet-live"');
    expect(html(<StateSheet state="closed" justClosed />)).toContain(
      'class="sheet-closed just-closed"',
    );
  });

  it('render on the server without script, inline style or handler attribute', () => {
    const strip = { max: { value: 1, label: 'max 1' }, unit: 'in' };
    const all = html(
      <>
        {cells}
        <Keypad onKey={() => undefined} unit="in" />
        <RunLine stops={stops} />
        <BoreHeader
          cylinder="5"
          valve="intake"
          clause="7.4.4"
          heading="x"
          limits="max 1 in"
          advisory
        />
        <LiveReading place="Above" value="-0.2" unit="in" />
        <ResultStrip name="Mean" value="1.0" uncertaintyText="0.1" k="2" {...strip} />
        <SavedLine state="device" at="19:12" />
        <Caution title="Hot parts" />
        <StateSheet state="closed" />
        <FindingTable unit="in" k="2" against="Against max" subject="Bore">
          <FindingRow
            subject="5 intake"
            value="1.0"
            uncertainty="0.1"
            strip={strip}
            status="within"
          />
        </FindingTable>
      </>,
    );
    expect(all.length).toBeGreaterThan(5000);
    expect(all).not.toMatch(/ style=|<style|<script| on[a-z]+=/);
  });
});
