import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { readCaseFile } from '@/contracts/case-file/case-file';
import { checkCaseFile } from '@/contracts/case-file/check-case-file';
import type { Actor } from '@/domain/access/permission';
import { readStrokes } from '@/domain/inspection/strokes';
import { toHex } from '@/domain/ledger/bytes';
import { formatVerifierKey } from '@/domain/ledger/note/verifier-key';
import { readReports } from '@/services/inspection/report/read-reports';
import { signReport } from '@/services/inspection/report/sign-report';
import { auditLedger } from '@/services/ledger/audit/audit-ledger';
import { exportCaseFile } from '@/services/ledger/case-file/export-case-file';
import { eraseStrokes } from '@/services/ledger/erasure/erase-strokes';
import { liftHold } from '@/services/ledger/erasure/lift-hold';
import { listErasures } from '@/services/ledger/erasure/list-erasures';
import { placeHold } from '@/services/ledger/erasure/place-hold';
import { reapplyErasures } from '@/services/ledger/erasure/reapply-erasures';
import { listLines } from '@/services/ledger/proof/list-lines';
import {
  failureOf,
  fileOf,
  get,
  openInspection,
  openRaceNight,
  type RaceNight,
  rowsFor,
  send,
} from '../../support/bay';
import { FakeObjects } from '../../support/fakes';
import { openRecordWorld, type RecordWorld, signNow } from '../../support/record';
import { addActor } from '../../support/world';

const STROKES = ['100,200 140,90 180,210', '220,150'];
const REASON = 'The season’s retention time has passed.';

let world: RecordWorld;
let night: RaceNight;
let rival: Actor;
beforeAll(async () => {
  world = await openRecordWorld({ objects: new FakeObjects() });
  night = await openRaceNight(world);
  const { seriesId } = night;
  rival = await addActor(world, 'Teo Marsh', [{ seriesId, role: 'competitor' }]);
});
afterAll(() => world.close());

const uuid = () => world.ports().random.uuid();

const measured = async (carNumber: string): Promise<string> => {
  const id = await openInspection(world, night, carNumber);
  get(await send(world, night.inspector, id, rowsFor(world, night).fullBore()));
  return id;
};

const sign = async (inspectionId: string, strokes?: readonly string[]) => {
  const head = toHex((await fileOf(world, night.inspector, inspectionId)).chain.head);
  const inspector = { ...night.inspector, authenticatedAt: world.clock.now().toISOString() };
  return signReport(world.ports(), inspector, { act: uuid(), inspectionId, head, strokes });
};

const strokesOf = async (inspectionId: string) => {
  const [report] = await readReports(world.ports().db, night.seriesId, inspectionId);
  return report?.strokes;
};

const erase = (inspectionId: string, actor = night.official) =>
  eraseStrokes(world.ports(), actor, {
    act: uuid(),
    seriesId: night.seriesId,
    inspectionId,
    reason: REASON,
  });

const faults = async () => {
  const head = await signNow(world.ports(), night.seriesId);
  const asked = { seriesId: night.seriesId, heads: [head], keys: [] };
  return (await auditLedger(world.ports(), asked)).faults;
};

const caseFile = async (inspectionId: string) => {
  await signNow(world.ports(), night.seriesId);
  const text = get(await exportCaseFile(world.ports(), night.official, { inspectionId }));
  const file = get(readCaseFile(text));
  const key = formatVerifierKey(world.keys.signer(night.seriesId).key);
  const outcomes = checkCaseFile(file, [key]).map(({ outcome }) => outcome);
  const contents = file.lines.flatMap((line) => line.contents);
  const find = (wanted: string) => contents.find(({ role }) => role === wanted);
  return { outcomes, strokes: find('strokes'), signature: find('signature') };
};

describe('pen strokes beside a signature', () => {
  it('are kept as drawn, committed to by the report’s line and carried by the case file', async () => {
    const id = await measured('1');
    const { hash } = get(await sign(id, STROKES));
    const document = (await strokesOf(id)) ?? '';
    expect(JSON.parse(document)).toMatchObject({ document: 'tagwire/strokes', report: hash });
    expect(readStrokes(document)).toEqual(STROKES);
    const { outcomes, strokes, signature } = await caseFile(id);
    expect(new Set(outcomes)).toEqual(new Set(['passed']));
    expect(strokes?.document).toBe(document);
    expect(JSON.parse(signature?.document ?? '')).toMatchObject({
      document: 'tagwire/signature',
      report: hash,
      signer: night.inspector.personId,
      authenticatedAt: world.clock.now().toISOString(),
    });
    expect(await faults()).toEqual([]);
  });

  it('are never published: who reads the ledger sees that there are some', async () => {
    const id = await measured('2');
    get(await sign(id, STROKES));
    const { seriesId } = night;
    const lines = await listLines(world.ports(), { seriesId, from: 0, count: 500 });
    const line = lines.find(
      ({ line: text }) => text.includes(id) && text.includes('report-signed'),
    );
    expect(line?.line).toContain('"role":"strokes"');
    expect(line?.open.map(({ role }) => role)).not.toContain('strokes');
    expect(JSON.stringify(lines)).not.toContain(STROKES[0]);
  });

  it('are not needed: an empty pad signs as well, and has no commitment', async () => {
    const id = await measured('3');
    get(await sign(id));
    expect(await strokesOf(id)).toBeNull();
    expect((await caseFile(id)).strokes).toBeUndefined();
  });

  it('are refused when they are none, and the inspection stays open', async () => {
    const id = await measured('4');
    for (const wrong of [['<script>'], ['1,2', '5000,1'], Array.from({ length: 61 }, () => '1,1')])
      expect(failureOf(await sign(id, wrong)).name).toBe('invalid');
    get(await sign(id, STROKES));
  });

  it('can be erased by an official, not under a hold, while signature and ledger stand', async () => {
    const id = await measured('5');
    const { hash } = get(await sign(id, STROKES));
    for (const actor of [night.inspector, night.competitor, rival])
      expect(failureOf(await erase(id, actor)).name).toBe('absent');
    const { seriesId } = night;
    const hold = { act: uuid(), id: uuid(), seriesId, reason: 'A protest is open.' };
    get(await placeHold(world.ports(), night.official, hold));
    expect(failureOf(await erase(id)).detail).toContain('A hold stands');
    const lift = { act: uuid(), seriesId, holdId: hold.id };
    get(await liftHold(world.ports(), night.official, lift));

    expect(get(await erase(id))).toEqual({ contents: 1 });
    expect(failureOf(await erase(id)).name).toBe('not-in-this-state');
    expect(await strokesOf(id)).toBeNull();
    const [report] = await readReports(world.ports().db, seriesId, id);
    expect(report?.hash).toBe(hash);
    const { outcomes, strokes } = await caseFile(id);
    expect(new Set(outcomes)).toEqual(new Set(['passed']));
    expect(strokes).toBeUndefined();
    expect(await faults()).toEqual([]);
  });

  it('do not come back: what the list of erasures names is gone already', async () => {
    const id = await measured('6');
    get(await sign(id, STROKES));
    get(await erase(id));
    const list = await listErasures(world.ports().db, night.seriesId);
    const done = get(await reapplyErasures(world.ports(), list));
    expect(done).toEqual({ erased: 0, nothingHere: list.length });
  });
});
