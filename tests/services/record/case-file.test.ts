import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { type CaseFile, readCaseFile } from '@/contracts/case-file/case-file';
import { checkCaseFile } from '@/contracts/case-file/check-case-file';
import { recompute } from '@/contracts/case-file/recompute';
import { toHex } from '@/domain/ledger/bytes';
import { formatVerifierKey } from '@/domain/ledger/note/verifier-key';
import { changeState } from '@/services/inspection/change-state';
import { reviseReport } from '@/services/inspection/report/revise-report';
import { signReport } from '@/services/inspection/report/sign-report';
import { exportCaseFile } from '@/services/ledger/case-file/export-case-file';
import { publishVerdict } from '@/services/verdict/publish-verdict';
import { saveVerdictDraft } from '@/services/verdict/save-verdict-draft';
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
import { openRecordWorld, type RecordWorld, signNow } from '../../support/record';
import { NO_BREACH } from '../../support/verdict-case';
import { addActor, addSeries } from '../../support/world';

let world: RecordWorld;
let night: RaceNight;
let inspectionId: string;
let text: string;
let key: string;

const uuid = () => world.ports().random.uuid();

const sign = async () => {
  const head = toHex((await fileOf(world, night.inspector, inspectionId)).chain.head);
  const inspector = { ...night.inspector, authenticatedAt: world.clock.now().toISOString() };
  get(await signReport(world.ports(), inspector, { act: uuid(), inspectionId, head }));
};

const read = (changed = text): CaseFile => get(readCaseFile(changed));

beforeAll(async () => {
  world = await openRecordWorld();
  night = await openRaceNight(world);
  inspectionId = await openInspection(world, night, '12J');
  const rows = rowsFor(world, night);
  const first = rows.fullBore('1');
  const wrong = rows.reading({ value: { text: '0.8501', unit: 'in' } });
  get(
    await send(world, night.inspector, inspectionId, [...first, wrong], { clockOffsetMs: -1500 }),
  );
  const moved = rows.reading({ place: { bank: 'left', cylinder: '3', valve: 'exhaust' } });
  get(
    await send(world, night.inspector, inspectionId, [
      rows.strike(wrong.id),
      moved,
      rows.move(moved.id, '5'),
      rows.reading({
        quantity: 'foot-diameter',
        value: { text: '21.386', unit: 'mm' },
      }),
    ]),
  );
  await sign();
  // What arrives after the signature is kept and counts in no report before it is corrected.
  get(await send(world, night.inspector, inspectionId, [rows.reading({ repeat: 2 })]));
  const reason = 'A second lifter was measured and left out.';
  get(await reviseReport(world.ports(), night.inspector, { act: uuid(), inspectionId, reason }));
  get(await send(world, night.inspector, inspectionId, rows.fullBore('3')));
  await sign();
  const draft = { ...NO_BREACH, reportRevision: 2 };
  const asked = { seriesId: night.seriesId, inspectionId };
  const saved = get(
    await saveVerdictDraft(world.ports(), night.official, {
      act: uuid(),
      ...asked,
      version: null,
      content: draft,
    }),
  );
  const publish = { act: uuid(), ...asked, version: saved.version };
  get(await publishVerdict(world.ports(), night.official, publish));
  await signNow(world.ports(), night.seriesId);
  text = get(await exportCaseFile(world.ports(), night.official, { inspectionId }));
  key = formatVerifierKey(world.keys.signer(night.seriesId).key);
});
afterAll(() => world.close());

const outcomes = (file: CaseFile, keys: readonly string[] = [key]) =>
  Object.fromEntries(checkCaseFile(file, keys).map(({ id, outcome }) => [id, outcome]));

const allPassed = {
  'key-known': 'passed',
  'lines-included': 'passed',
  'contents-committed': 'passed',
  'chain-complete': 'passed',
  'worked-out-anew': 'passed',
};

describe('a case file', () => {
  it('is for officials and the panel of its series alone', async () => {
    const { seriesId } = night;
    const other = await addSeries(world, 'another');
    const panel = await addActor(world, 'Panel', [{ seriesId, role: 'panel' }]);
    const stranger = await addActor(world, 'Stranger', [{ seriesId: other, role: 'official' }]);
    expect((await exportCaseFile(world.ports(), panel, { inspectionId })).ok).toBe(true);
    for (const actor of [stranger, night.inspector, night.competitor]) {
      const refused = failureOf(await exportCaseFile(world.ports(), actor, { inspectionId }));
      expect(refused.name).toBe('absent');
    }
    const unknown = await exportCaseFile(world.ports(), night.official, { inspectionId: uuid() });
    expect(failureOf(unknown).name).toBe('absent');
  });

  it('holds every line on the inspection and every batch, and passes every step', () => {
    const file = read();
    const kinds = file.lines.map(({ proof }) => (JSON.parse(proof.line) as { kind: string }).kind);
    expect(kinds.filter((kind) => kind !== 'inspection-changed')).toEqual([
      'inspection-opened',
      'report-signed',
      'report-revised',
      'verdict-published',
    ]);
    expect(file.batches).toHaveLength(4);
    expect(checkCaseFile(file, [key]).filter(({ outcome }) => outcome !== 'passed')).toEqual([]);
    expect(outcomes(file)).toEqual(allPassed);
    expect(outcomes(file, [])).toEqual({ ...allPassed, 'key-known': 'not checked' });
  });

  it('is worked out anew from the raw readings, each report from the batches it was signed over', () => {
    const made = recompute(read());
    expect(made.map(({ revision, batches }) => [revision, batches])).toEqual([
      ['1', 2],
      ['2', 4],
    ]);
    for (const { findings, differences } of made) {
      expect(findings).toBeGreaterThan(3);
      expect(differences).toEqual([]);
    }
  });

  it('shows a report that says something else than its readings give', () => {
    const file = read();
    const at = file.lines.findIndex(({ contents }) => contents.some((c) => c.role === 'report'));
    const lines = structuredClone(file.lines);
    const content = lines[at]?.contents.find(({ role }) => role === 'report');
    if (content?.document == null) throw new Error('no report');
    const report = JSON.parse(content.document) as { findings: { state: string }[] };
    const finding = report.findings.find(({ state }) => state === 'not-measured');
    if (finding === undefined) throw new Error('no finding to forge');
    finding.state = 'within';
    content.document = JSON.stringify(report);
    const forged = { ...file, lines };
    expect(outcomes(forged)).toEqual({
      ...allPassed,
      'contents-committed': 'failed',
      'worked-out-anew': 'failed',
    });
    expect(recompute(forged)[0]?.differences).toEqual([
      {
        pointer: expect.stringMatching(/^\/findings\/\d+\/state$/),
        signed: '"within"',
        anew: '"not-measured"',
      },
    ]);
  });

  it('shows a reading altered, left out or added, whichever batch it is in', () => {
    const file = read();
    const altered = file.batches.map((batch) => batch.replace('0.8423', '0.8422'));
    expect(altered).not.toEqual(file.batches);
    const cases = {
      altered,
      'left out': file.batches.slice(1),
      added: [file.batches[0] ?? '', ...file.batches],
      swapped: [file.batches[1] ?? '', file.batches[0] ?? '', ...file.batches.slice(2)],
    };
    for (const [name, batches] of Object.entries(cases)) {
      const steps = outcomes({ ...file, batches });
      expect([name, steps['chain-complete'], steps['worked-out-anew']]).toEqual([
        name,
        'failed',
        'failed',
      ]);
    }
  });

  it('shows other rules, a line of another ledger and a foreign key', () => {
    const file = read();
    const rules = file.rules.map((document) => document.replace('0.8', '0.7'));
    expect(outcomes({ ...file, rules })['worked-out-anew']).toBe('failed');
    expect(outcomes({ ...file, series: uuid() })['lines-included']).toBe('failed');
    const foreign = key.replace(/\+[0-9a-f]{8}\+/, '+00000000+');
    expect(outcomes(file, [foreign])['key-known']).toBe('failed');
    expect(outcomes({ ...file, lines: [] })['lines-included']).toBe('failed');
  });

  it('is refused in another form', () => {
    expect(readCaseFile('{').ok).toBe(false);
    expect(readCaseFile(text.replace('"v":"1"', '"v":"2"')).ok).toBe(false);
    expect(readCaseFile(JSON.stringify({ ...read(), more: '' })).ok).toBe(false);
  });

  it('waits until its newest line is under a signed head', async () => {
    get(
      await changeState(world.ports(), night.inspector, {
        act: uuid(),
        inspectionId: await openInspection(world, night, '77', false),
        to: 'open',
        reason: '',
      }),
    );
    const [row] = await world
      .ports()
      .db.execute<{ id: string }[]>(
        "select id from public.inspection where state = 'open' limit 1",
      );
    const asked = { inspectionId: row?.id ?? '' };
    const early = await exportCaseFile(world.ports(), night.official, asked);
    expect(failureOf(early).name).toBe('unavailable');
    await signNow(world.ports(), night.seriesId);
    expect((await exportCaseFile(world.ports(), night.official, asked)).ok).toBe(true);
  });
});
