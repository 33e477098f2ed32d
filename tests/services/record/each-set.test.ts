import { afterAll, beforeAll, expect, it } from 'vitest';
import { readCaseFile } from '@/contracts/case-file/case-file';
import { checkCaseFile } from '@/contracts/case-file/check-case-file';
import { recompute } from '@/contracts/case-file/recompute';
import type { SentRow } from '@/contracts/inspection/rows';
import { toHex } from '@/domain/ledger/bytes';
import { formatVerifierKey } from '@/domain/ledger/note/verifier-key';
import { TAPPET_RULE_SET } from '@/domain/rulebook/rule-sets/tappet';
import { readReports } from '@/services/inspection/report/read-reports';
import { signReport } from '@/services/inspection/report/sign-report';
import { exportCaseFile } from '@/services/ledger/case-file/export-case-file';
import { fileOf, get, openInspection, openRaceNight, rowsFor, send } from '../../support/bay';
import { openRecordWorld, type RecordWorld, signNow } from '../../support/record';
import { addActor } from '../../support/world';

let world: RecordWorld;
beforeAll(async () => {
  world = await openRecordWorld();
});
afterAll(() => world.close());

const EACH = {
  ...TAPPET_RULE_SET,
  clauses: TAPPET_RULE_SET.clauses.map((clause) =>
    clause.number === '4.2' && clause.requirement?.kind === 'limit'
      ? { ...clause, requirement: { ...clause.requirement, twoSets: 'each' as const } }
      : clause,
  ),
};

it('a report under a clause that holds each set by itself is worked out anew from its case file', async () => {
  const night = await openRaceNight(world, 'each-set', EACH);
  const uuid = () => world.ports().random.uuid();
  const other = await addActor(world, 'Wim Aldergate', [
    { seriesId: night.seriesId, role: 'inspector' },
  ]);
  const inspectionId = await openInspection(world, night, '12J');
  const rows = rowsFor(world, night);
  const body = (cylinder: string, text: string, set = 1) =>
    rows.reading({
      place: { bank: 'left', cylinder, valve: 'exhaust' },
      set,
      value: { text, unit: 'in' },
    });
  const first = [body('1', '0.8431'), body('3', '0.8431'), body('5', '0.8431')];
  get(await send(world, night.inspector, inspectionId, first));
  get(await send(world, other, inspectionId, [body('1', '0.8430', 2), body('3', '0.8423', 2)]));
  const choice: SentRow = {
    kind: 'remark',
    id: uuid(),
    occurredAt: rows.reading({}).occurredAt,
    place: { bank: 'left', cylinder: '3', valve: 'exhaust' },
    remark: 'second-set',
    value: '1',
    reason: 'The second was read on the groove.',
  };
  get(await send(world, night.inspector, inspectionId, [choice]));
  const head = toHex((await fileOf(world, night.inspector, inspectionId)).chain.head);
  const inspector = { ...night.inspector, authenticatedAt: world.clock.now().toISOString() };
  get(await signReport(world.ports(), inspector, { act: uuid(), inspectionId, head }));
  await signNow(world.ports(), night.seriesId);
  const text = get(await exportCaseFile(world.ports(), night.official, { inspectionId }));
  const file = get(readCaseFile(text));
  expect(recompute(file)).toMatchObject([{ revision: '1', differences: [] }]);
  const key = formatVerifierKey(world.keys.signer(night.seriesId).key);
  expect(checkCaseFile(file, [key]).find(({ id }) => id === 'worked-out-anew')?.outcome).toBe(
    'passed',
  );
  const [report] = await readReports(world.ports().db, night.seriesId, inspectionId);
  const { findings } = JSON.parse(report?.document ?? '{}') as {
    findings: {
      clause: string;
      perPosition: { position: string; state: string; pass: boolean | null; sets?: unknown[] }[];
    }[];
  };
  const at = findings.find(({ clause }) => clause === '4.2')?.perPosition ?? [];
  const stateAt = (bore: string) => at.find(({ position }) => position === bore);
  expect(stateAt('1 exhaust')).toMatchObject({ state: 'outside', pass: false });
  expect(stateAt('1 exhaust')?.sets).toHaveLength(2);
  // Chosen or not: sets that differ state nothing under this clause.
  expect(stateAt('3 exhaust')).toMatchObject({ state: 'no-statement', pass: null });
  expect(stateAt('5 exhaust')).toMatchObject({ state: 'no-statement', pass: null });

  // One digit of a second set is enough for the file to be found out.
  const forged = text.replaceAll('\\"0.8430\\"', '\\"0.8423\\"');
  expect(forged).not.toBe(text);
  const changed = readCaseFile(forged);
  const outcome = changed.ok
    ? checkCaseFile(changed.value, [key]).map((check) => check.outcome)
    : ['refused'];
  expect(outcome.some((one) => one !== 'passed')).toBe(true);
});
