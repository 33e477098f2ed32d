import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import type { SentRow } from '@/contracts/inspection/rows';
import { toHex } from '@/domain/ledger/bytes';
import { readReport } from '@/domain/verdict/report-view';
import { changeState } from '@/services/inspection/change-state';
import { assessFile } from '@/services/inspection/read/assess-file';
import { witnessOf } from '@/services/inspection/report/build-report';
import { readReports } from '@/services/inspection/report/read-reports';
import { signReport } from '@/services/inspection/report/sign-report';
import {
  fileOf,
  get,
  openInspection,
  openRaceNight,
  type RaceNight,
  rowsFor,
  send,
} from '../../support/bay';
import { openWorld, type World } from '../../support/world';

let world: World;
let night: RaceNight;
const uuid = () => world.ports().random.uuid();

beforeAll(async () => {
  world = await openWorld();
  night = await openRaceNight(world);
});
afterAll(() => world.close());

const said = (more: object): SentRow =>
  ({
    kind: 'remark',
    id: uuid(),
    occurredAt: '2026-07-12T03:20:00.000Z',
    place: { bank: '', cylinder: '', valve: '' },
    ...more,
  }) as SentRow;

const word = (value: 'signed' | 'refused') =>
  said({ remark: 'witness', subject: 'Tamsin Overley', value, reason: 'The block was hot.' });

const own = (value = '0.8419 in') =>
  said({ remark: 'own-reading', subject: 'lifter-body-diameter', value, reason: 'Tamsin Overley' });

const sign = async (inspectionId: string) => {
  const head = toHex((await fileOf(world, night.inspector, inspectionId)).chain.head);
  const inspector = { ...night.inspector, authenticatedAt: world.clock.now().toISOString() };
  get(await signReport(world.ports(), inspector, { act: uuid(), inspectionId, head }));
  const [report] = await readReports(world.ports().db, night.seriesId, inspectionId);
  return report?.document ?? '';
};

describe('the competitor’s side', () => {
  it('has its own reading kept in the chain and the report, and in no result', async () => {
    const rows = rowsFor(world, night);
    const [plain, beside] = [
      await openInspection(world, night, '1'),
      await openInspection(world, night, '2'),
    ];
    const readings = rows.fullBore('1');
    get(await send(world, night.inspector, beside, [...readings, own()]));
    const file = await fileOf(world, night.inspector, beside);
    const { findings, bores, completeness } = assessFile(file);
    const without = assessFile({
      ...file,
      rows: {
        ...file.rows,
        remarks: file.rows.remarks.filter((row) => row.kind !== 'own-reading'),
      },
    });
    expect({ findings, bores, completeness }).toEqual({
      findings: without.findings,
      bores: without.bores,
      completeness: without.completeness,
    });
    const document = await sign(beside);
    expect(document).toContain('"value":"0.8419 in"');
    expect(readReport(document).ok).toBe(true);
    get(await send(world, night.inspector, plain, rows.fullBore('1')));
    expect(await sign(plain)).not.toContain('own-reading');
  });

  it.each(['refuse', 'stop'] as const)(
    'is heard as well when the teardown ends with “%s”: its word and its reading count',
    async (to) => {
      const inspectionId = await openInspection(world, night, to === 'refuse' ? '3' : '4');
      const asked = { act: uuid(), inspectionId, to, reason: 'Would not go on.' };
      get(await changeState(world.ports(), night.inspector, asked));
      const reading = rowsFor(world, night).reading({});
      const answer = get(
        await send(world, night.inspector, inspectionId, [word('refused'), own(), reading]),
      );
      expect(answer.received.map(({ id }) => id)).toEqual([reading.id]);
      const { rows } = await fileOf(world, night.inspector, inspectionId);
      expect(witnessOf(rows.remarks)).toMatchObject({ outcome: 'refused' });
      expect(await sign(inspectionId)).toContain('"outcome":"refused"');
      const late = get(await send(world, night.inspector, inspectionId, [word('signed')]));
      expect(late.received).toHaveLength(1);
    },
  );
});
