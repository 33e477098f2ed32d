import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import type { Actor } from '@/domain/access/permission';
import type { Mapping } from '@/domain/paperwork/sheet/header/find-columns';
import { confirmUpload } from '@/services/file/upload/confirm-upload';
import { expectUpload } from '@/services/file/upload/expect-upload';
import { readSheetFile } from '@/services/paperwork/read-sheet-file';
import { annotateSheet } from '@/services/paperwork/sheet/annotate/annotate-sheet';
import { rememberColumns } from '@/services/paperwork/sheet/file/remember-columns';
import { makeTemplate } from '@/services/paperwork/sheet/template/make-template';
import { openPaddock, type Paddock, start } from '../../support/paperwork';
import { openWorld, type World } from '../../support/world';
import { must } from '../rulebook/build';

let world: World;
let paddock: Paddock;
let paperworkId: string;

beforeAll(async () => {
  world = await openWorld();
  paddock = await openPaddock(world);
  paperworkId = await start(paddock, '1');
});
afterAll(() => world.close());

const subject = 'lifter-sheet';

const keep = async (text: string, name = 'lifters.csv'): Promise<string> => {
  const fileId = paddock.uuid();
  const bytes = new TextEncoder().encode(text);
  must(
    await expectUpload(paddock.ports(), paddock.competitor, {
      act: paddock.uuid(),
      fileId,
      paperworkId,
      purpose: 'sheet',
      item: subject,
      name,
      type: 'text/csv',
      bytes: bytes.length,
    }),
  );
  await paddock.objects.write(`uploads/${paddock.seriesId}/${fileId}`, bytes, 'text/csv');
  must(await confirmUpload(paddock.ports(), paddock.competitor, { act: paddock.uuid(), fileId }));
  return fileId;
};

const read = async (fileId: string, actor: Actor = paddock.competitor, mapping?: Mapping) =>
  readSheetFile(paddock.ports(), actor, { fileId, subject, mapping });

const reading = (quantity: 'lifter-body-diameter' | 'tappet-bore-diameter', unit = 'in') =>
  ({ kind: 'reading', quantity, unit, depth: '', axis: '' }) as const;
const MAPPING: Mapping = {
  OD: reading('lifter-body-diameter'),
  ID: reading('tappet-bore-diameter'),
  Who: { kind: 'not-taken' },
};

const remember = (fileId: string, mapping: Mapping, actor: Actor = paddock.competitor) =>
  rememberColumns(paddock.ports(), actor, { act: paddock.uuid(), fileId, subject, mapping });

const typed = async (fileId: string) =>
  must(await read(fileId)).cells.map(({ quantity, typed: text }) => `${quantity} ${text}`);

describe('columns that somebody explained once', () => {
  it('are read by it in the next file with the same headings, in any order', async () => {
    const first = await keep('Place,OD,ID,Who\n3 intake,0.8422,0.8440,JM\n');
    expect(await typed(first)).toEqual([]);
    expect(must(await remember(first, MAPPING))).toEqual({ remembered: 3 });
    const second = await keep('ID;Who;Place;OD\n0,8441;JM;3 exhaust;0,8423\n', 'next.csv');
    expect(await typed(second)).toEqual([
      'tappet-bore-diameter 0,8441',
      'lifter-body-diameter 0,8423',
    ]);
    const { columns, notes } = must(await read(second));
    expect(columns.filter(({ chosen }) => chosen).map(({ key }) => key)).toEqual([
      'ID',
      'Who',
      'OD',
    ]);
    expect(notes).toEqual([]);
  });

  it('with one heading more it is another sheet: asked again', async () => {
    const other = await keep('Place,OD,ID,Who,Wear\n3 intake,0.8422,0.8440,JM,1\n');
    expect(await typed(other)).toEqual([]);
  });

  it('what is chosen on screen goes before what is remembered, and replaces it', async () => {
    const file = await keep('Place,OD,ID,Who\n3 intake,21.39,0.8440,JM\n');
    const change = { OD: reading('lifter-body-diameter', 'mm') };
    expect(must(await read(file, paddock.competitor, change)).cells[0]?.unit).toBe('mm');
    expect(must(await read(file)).cells[0]?.unit).toBe('in');
    expect(must(await remember(file, change))).toEqual({ remembered: 3 });
    expect(must(await read(file)).cells.map(({ unit }) => unit)).toEqual(['mm', 'in']);
  });

  it('belong to the person: nobody else’s file is read by them, nobody else sees the file', async () => {
    const file = await keep('Place,OD,ID,Who\n3 intake,0.8422,0.8440,JM\n');
    for (const other of [paddock.rival, paddock.official]) {
      expect(await read(file, other)).toMatchObject({ failure: { name: 'absent' } });
      expect(await remember(file, MAPPING, other)).toMatchObject({ failure: { name: 'absent' } });
      const asked = { fileId: file };
      expect(await annotateSheet(paddock.ports(), other, asked)).toMatchObject({
        failure: { name: 'absent' },
      });
    }
    const rows = await world
      .ports()
      .db.execute<{ person_id: string }[]>('select distinct person_id from public.sheet_columns');
    expect(rows.map((row) => row.person_id)).toEqual([paddock.competitor.personId]);
  });

  it('are known again in the file that was given back with its errors', async () => {
    const file = await keep('Place,OD,ID,Who\n3 intake,21.39,0.84.40,JM\n');
    const asked = { fileId: file };
    const given = must(await annotateSheet(paddock.ports(), paddock.competitor, asked));
    const again = await keep(Buffer.from(given.bytes).toString().replace('0.84.40', '0.8440'));
    expect(await typed(again)).toEqual([
      'lifter-body-diameter 21.39',
      'tappet-bore-diameter 0.8440',
    ]);
  });

  it('a choice for a column that the file lacks is not kept', async () => {
    const file = await keep('Place,A,B\n3 intake,0.8422,0.8440\n');
    const kept = await remember(file, { ...MAPPING, A: reading('lifter-body-diameter') });
    expect(must(kept)).toEqual({ remembered: 1 });
  });

  it('a heading named like a property of every object is a heading like others', async () => {
    const file = await keep('Place,constructor,__proto__\n3 intake,0.8422,0.8440\n');
    expect(await typed(file)).toEqual([]);
    must(await remember(file, { constructor: reading('lifter-body-diameter') } as Mapping));
    expect(await typed(file)).toEqual(['lifter-body-diameter 0.8422']);
  });
});

describe('files that are given out', () => {
  it('the sheet with its errors beside each row, read by what is remembered', async () => {
    const file = await keep('Place,OD,ID,Who\n3 intake,21.39,0.84.40,JM\n', 'mine.csv');
    const given = must(await annotateSheet(paddock.ports(), paddock.competitor, { fileId: file }));
    expect([given.name, given.type]).toEqual(['mine to correct.csv', 'text/csv']);
    expect(Buffer.from(given.bytes).toString()).toContain('C2: 3 intake, bore: “0.84.40”');
  });

  it('a template by layout, rules and units, as CSV and as XLSX, for the owner alone', async () => {
    const asked = { paperworkId, subject, system: 'metric', as: 'xlsx' } as const;
    const made = must(await makeTemplate(paddock.ports(), paddock.competitor, asked));
    expect(made.name).toBe('lifters-1-metric.xlsx');
    const csv = must(
      await makeTemplate(paddock.ports(), paddock.competitor, { ...asked, as: 'csv' }),
    );
    const lines = Buffer.from(csv.bytes).toString().split('\r\n');
    expect(lines[0]).toContain('Car number: 1. Engine: VR-2231.');
    expect(lines[5]).toBe(
      'Position,Lifter body diameter (mm),Lifter foot diameter (mm),Tappet bore diameter (mm)',
    );
    expect(lines.slice(6).filter((line) => line !== '')).toHaveLength(16);
    expect(await makeTemplate(paddock.ports(), paddock.rival, asked)).toMatchObject({
      failure: { name: 'absent' },
    });
  });
});
