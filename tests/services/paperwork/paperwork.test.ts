import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import type { Actor } from '@/domain/access/permission';
import { sha256, toHex, utf8 } from '@/domain/ledger/bytes';
import { EMPTY_DRAFT } from '@/domain/paperwork/draft';
import { checkPaperwork } from '@/services/paperwork/check-paperwork';
import { decidePaperwork } from '@/services/paperwork/decide-paperwork';
import { handInPaperwork } from '@/services/paperwork/hand-in-paperwork';
import { listOwnPaperwork } from '@/services/paperwork/read/list-own-paperwork';
import { listPaperworkToCheck } from '@/services/paperwork/read/list-paperwork-to-check';
import { openPaperwork } from '@/services/paperwork/read/open-paperwork';
import { openPaperworkToCheck } from '@/services/paperwork/read/open-paperwork-to-check';
import { openOwnVersion } from '@/services/paperwork/read/open-version';
import { saveDraft } from '@/services/paperwork/save-draft';
import { startPaperwork } from '@/services/paperwork/start-paperwork';
import { withdrawPaperwork } from '@/services/paperwork/withdraw-paperwork';
import {
  fullDraft,
  handedIn,
  handIn,
  keepPhotograph,
  openPaddock,
  type Paddock,
  picture,
  save,
  start,
} from '../../support/paperwork';
import { openWorld, type World } from '../../support/world';
import { must } from '../rulebook/build';

let world: World;
let paddock: Paddock;

beforeAll(async () => {
  world = await openWorld();
  paddock = await openPaddock(world);
});
afterAll(() => world.close());

const rows = <T>(sql: string, parameters: unknown[] = []) =>
  world.ports().db.execute<T[]>(sql, parameters);

const decide = (
  official: Actor,
  paperworkId: string,
  decision: 'accepted' | 'returned',
  remarks: readonly { item: string; text: string }[] = [],
  number = 1,
) =>
  decidePaperwork(paddock.ports(), official, {
    act: paddock.uuid(),
    paperworkId,
    number,
    decision,
    remarks,
  });

describe('beginning', () => {
  it('fills in what is known of the engine and refuses a second one for the same car', async () => {
    const id = await start(paddock, '7');
    const opened = must(await openPaperwork(paddock.ports(), paddock.competitor, id));
    expect(opened.row.draft.answers).toEqual([
      { subject: 'block-casting-number', position: 'engine', typed: '41-7730' },
    ]);
    const { seriesId, classId, engineId, uuid } = paddock;
    const again = { act: uuid(), id: uuid(), seriesId, classId, engineId, carNumber: '7' };
    expect(await startPaperwork(paddock.ports(), paddock.competitor, again)).toMatchObject({
      ok: false,
      failure: { name: 'not-in-this-state' },
    });
  });

  it('takes over the numbers of the engine’s last paperwork', async () => {
    const first = await start(paddock, '70');
    await save(paddock, first, 1, fullDraft({ '3 intake bore': '0.8441' }));
    const second = await start(paddock, '71');
    const opened = must(await openPaperwork(paddock.ports(), paddock.competitor, second));
    expect(opened.row.draft.sheets[0]?.cells).toHaveLength(48);
    expect(opened.row.draft.sheets[0]?.cells.map((cell) => cell.typed)).toContain('0.8441');
  });

  it('names a car number that is none, and hides another person’s engine', async () => {
    const { seriesId, classId, engineId, uuid } = paddock;
    const input = { act: uuid(), id: uuid(), seriesId, classId, engineId };
    expect(
      await startPaperwork(paddock.ports(), paddock.competitor, { ...input, carNumber: 'red one' }),
    ).toMatchObject({ failure: { faults: [{ pointer: '/carNumber' }] } });
    expect(
      await startPaperwork(paddock.ports(), paddock.rival, { ...input, carNumber: '5' }),
    ).toMatchObject({ failure: { name: 'absent' } });
  });
});

describe('a draft', () => {
  it('keeps what is typed, right or not, letter for letter', async () => {
    const id = await start(paddock, '20');
    const draft = fullDraft({ '3 intake bore': '0.84.41', '6 exhaust lifter': '0.8840' });
    await save(paddock, id, 1, draft);
    const opened = must(await openPaperwork(paddock.ports(), paddock.competitor, id));
    expect(opened.row.draft).toEqual(draft);
    expect(opened.checked.missing.cells.map((cell) => cell.detail)).toEqual([
      '3 intake, bore: “0.84.41” is no number. Kept as written.',
      '6 exhaust, lifter: 0.8840 in, the rest are near 0.8423.',
    ]);
  });

  it('is not overwritten by an older one from another device', async () => {
    const id = await start(paddock, '21');
    const { uuid, competitor } = paddock;
    expect(await save(paddock, id, 1, fullDraft())).toBe(2);
    const older = {
      act: uuid(),
      paperworkId: id,
      version: 1,
      draft: fullDraft({ '1 intake bore': '9' }),
    };
    const refused = await saveDraft(paddock.ports(), competitor, older);
    expect(refused).toMatchObject({ ok: false, failure: { name: 'stale' } });
    const opened = must(await openPaperwork(paddock.ports(), competitor, id));
    expect(opened.row.draft).toEqual(fullDraft());
  });

  it('sent twice under one id is saved once', async () => {
    const id = await start(paddock, '22');
    const input = { act: paddock.uuid(), paperworkId: id, version: 1, draft: fullDraft() };
    const answers = await Promise.all(
      Array.from({ length: 6 }, () => saveDraft(paddock.ports(), paddock.competitor, input)),
    );
    for (const answer of answers) expect(answer).toEqual(answers[0]);
    expect(answers[0]).toMatchObject({ ok: true, value: { version: 2 } });
  });

  it('is nobody else’s: a rival and an official get the answer of what is not there', async () => {
    const id = await start(paddock, '23');
    for (const other of [paddock.rival, paddock.official, paddock.stranger]) {
      expect(await openPaperwork(paddock.ports(), other, id)).toMatchObject({
        failure: { name: 'absent' },
      });
      expect(await checkPaperwork(paddock.ports(), other, { paperworkId: id })).toMatchObject({
        failure: { name: 'absent' },
      });
      const input = { act: paddock.uuid(), paperworkId: id, version: 1 };
      expect(
        await saveDraft(paddock.ports(), other, { ...input, draft: fullDraft() }),
      ).toMatchObject({ failure: { name: 'absent' } });
      expect(await handInPaperwork(paddock.ports(), other, input)).toMatchObject({
        failure: { name: 'absent' },
      });
    }
    expect(
      await openPaperworkToCheck(paddock.ports(), paddock.official, { paperworkId: id }),
    ).toMatchObject({ failure: { name: 'absent' } });
    expect(await openPaperwork(paddock.ports(), paddock.competitor, 'no-id')).toMatchObject({
      failure: { name: 'absent' },
    });
  });
});

describe('handing in', () => {
  it('names everything that is missing by its place', async () => {
    const id = await start(paddock, '30');
    const version = await save(paddock, id, 1, EMPTY_DRAFT);
    const input = { act: paddock.uuid(), paperworkId: id, version };
    const refused = await handInPaperwork(paddock.ports(), paddock.competitor, input);
    expect(refused.ok ? [] : refused.failure.faults?.map((fault) => fault.pointer)).toEqual([
      '/answers/displacement',
      '/answers/block-casting-number',
      '/answers/tappet-type',
      '/answers/bore-bushed',
      '/photographs/lifters-racked',
      '/sheets/lifter-sheet',
    ]);
  });

  it('freezes a version with its hash, the rules’ hash, a ledger line and a receipt by mail', async () => {
    const id = await start(paddock, '31');
    await keepPhotograph(paddock, id, await picture());
    const version = await save(paddock, id, 1, fullDraft());
    const receipt = await handIn(paddock, id, version);
    expect(receipt.number).toBe(1);
    const [stored] = await rows<{ document: string; hash: Buffer; rules: number }>(
      `select v.document, v.hash, (select count(*)::int from record.rules r where r.hash = v.rules_hash) as rules
       from record.paperwork_version v where v.paperwork_id = ?`,
      [id],
    );
    expect(toHex(sha256(utf8(stored!.document)))).toBe(receipt.hash);
    expect(toHex(new Uint8Array(stored!.hash))).toBe(receipt.hash);
    expect(stored!.rules).toBe(1);
    // Trailing zeros stay: numbers stand as text.
    expect(stored!.document).toContain('"text":"0.8420"');
    const lines = await rows<{ kind: string; open: boolean }>(
      `select l.kind, c.open from record.ledger_line l
       join record.ledger_content c on c.series_id = l.series_id and c.line_index = l.index and c.role = 'paperwork'
       where l.series_id = ? and position(? in l.line) > 0`,
      [paddock.seriesId, receipt.hash],
    );
    expect(lines).toEqual([{ kind: 'paperwork-handed-in', open: false }]);
    const mails = await rows<{ kind: string; paragraphs: string }>(
      `select kind, content ->> 'paragraphs' as paragraphs from public.mail where person_id = ? and subject like '%car 31,%'`,
      [paddock.competitor.personId],
    );
    expect(mails).toHaveLength(1);
    expect(mails[0]?.paragraphs).toContain(receipt.hash);
    expect(mails[0]?.paragraphs).toContain('Acceptance is not approval of the engine.');
  });

  it('twice at once makes one version', async () => {
    const id = await start(paddock, '32');
    await keepPhotograph(paddock, id, await picture());
    const version = await save(paddock, id, 1, fullDraft());
    const answers = await Promise.all(
      Array.from({ length: 4 }, () =>
        handInPaperwork(paddock.ports(), paddock.competitor, {
          act: paddock.uuid(),
          paperworkId: id,
          version,
        }),
      ),
    );
    expect(answers.filter((answer) => answer.ok)).toHaveLength(1);
    expect(
      await rows('select 1 from record.paperwork_version where paperwork_id = ?', [id]),
    ).toHaveLength(1);
  });

  it('what was handed in is no longer written in', async () => {
    const { paperworkId, version } = await handedIn(paddock, '33');
    const input = { act: paddock.uuid(), paperworkId, version, draft: fullDraft() };
    expect(await saveDraft(paddock.ports(), paddock.competitor, input)).toMatchObject({
      failure: { name: 'not-in-this-state' },
    });
  });

  it('an engine outside a limit is handed in all the same: the program assesses, a person decides', async () => {
    const id = await start(paddock, '34');
    await keepPhotograph(paddock, id, await picture());
    const version = await save(
      paddock,
      id,
      1,
      fullDraft({ '5 intake foot': '0.8450', '3 exhaust bore': '0.8446' }),
    );
    await handIn(paddock, id, version);
    const opened = must(
      await openOwnVersion(paddock.ports(), paddock.competitor, { paperworkId: id, number: 1 }),
    );
    const of = (clause: string) => opened.results.find((result) => result.clause === clause);
    expect(of('4.3')?.pass).toBe(false);
    expect(of('4.6')).toMatchObject({ state: 'outside', pass: null, advisory: true });
  });
});

describe('deciding', () => {
  it('a remark can be answered instead of followed, and the answer goes to the official with the version', async () => {
    const { paperworkId, version } = await handedIn(paddock, '47');
    const remarks = [{ item: 'bore-bushed', text: 'Are you sure?' }];
    must(await decide(paddock.official, paperworkId, 'returned', remarks));
    const asked = { act: paddock.uuid(), paperworkId, version: version + 1 };
    expect(await handInPaperwork(paddock.ports(), paddock.competitor, asked)).toMatchObject({
      failure: { name: 'invalid' },
    });
    const replies = [{ item: 'bore-bushed', text: 'Yes: measured twice.' }];
    const saved = await save(paddock, paperworkId, version + 1, { ...fullDraft(), replies });
    await handIn(paddock, paperworkId, saved);
    const check = await openPaperworkToCheck(paddock.ports(), paddock.official, { paperworkId });
    expect(must(check).document.replies).toEqual(replies);
    // Returned once more, the answer is gone: it belonged to the remark before.
    must(await decide(paddock.official, paperworkId, 'returned', remarks, 2));
    const again = must(await openPaperwork(paddock.ports(), paddock.competitor, paperworkId));
    expect(again.row.draft.replies).toBeUndefined();
    expect(again.checked.missing.remarks).toEqual(remarks);
  });

  it('two officials at once: one decides, the other is told so', async () => {
    const { paperworkId } = await handedIn(paddock, '48');
    const both = await Promise.all([
      decide(paddock.official, paperworkId, 'accepted'),
      decide(paddock.second, paperworkId, 'returned', [{ item: 'general', text: 'No.' }]),
    ]);
    expect(both.filter(({ ok }) => ok)).toHaveLength(1);
    expect(both.find(({ ok }) => !ok)).toMatchObject({ failure: { name: 'not-in-this-state' } });
  });

  it('withdrawn by the competitor, it is kept, declares nothing, and can be begun anew', async () => {
    const { paperworkId, version } = await handedIn(paddock, '49');
    const input = { act: paddock.uuid(), paperworkId, version, reason: 'Another engine runs.' };
    const withdraw = (actor: Actor, change = {}) =>
      withdrawPaperwork(paddock.ports(), actor, { ...input, ...change });
    expect(await withdraw(paddock.rival)).toMatchObject({ failure: { name: 'absent' } });
    expect(await withdraw(paddock.competitor, { act: paddock.uuid(), version: 1 })).toMatchObject({
      failure: { name: 'stale' },
    });
    must(await withdraw(paddock.competitor));
    expect(must(await withdraw(paddock.competitor))).toBeNull();
    expect(
      await rows(
        'select state_before, reason from record.paperwork_withdrawal where paperwork_id = ?',
        [paperworkId],
      ),
    ).toEqual([{ state_before: 'handed-in', reason: 'Another engine runs.' }]);
    const [line] = await rows<{ n: number }>(
      `select count(*)::int as n from record.ledger_line
       where kind = 'paperwork-withdrawn' and line::jsonb #>> '{refs,paperwork}' = ?`,
      [paperworkId],
    );
    expect(line?.n).toBe(1);
    expect(await decide(paddock.official, paperworkId, 'accepted')).toMatchObject({
      failure: { name: 'not-in-this-state' },
    });
    const opened = await openOwnVersion(paddock.ports(), paddock.competitor, {
      paperworkId,
      number: 1,
    });
    expect(must(opened).document.carNumber).toBe('49');
    expect(await start(paddock, '49')).not.toBe(paperworkId);
  });

  it('returned with remarks, put right and handed in again, version 1 stays as it was', async () => {
    const { paperworkId, version } = await handedIn(paddock, '40');
    const [before] = await rows<{ document: string }>(
      'select document from record.paperwork_version where paperwork_id = ? and number = 1',
      [paperworkId],
    );
    const remarks = [{ item: 'lifters-racked', text: 'The scale is cut off. Take it again.' }];
    expect(must(await decide(paddock.official, paperworkId, 'returned', remarks))).toEqual({
      state: 'returned',
    });
    const saved = await save(
      paddock,
      paperworkId,
      version + 1,
      fullDraft({ '1 intake bore': '0.8439' }),
    );
    // The remark was on the photograph: another number alone does not meet it.
    const tooSoon = { act: paddock.uuid(), paperworkId, version: saved };
    expect(await handInPaperwork(paddock.ports(), paddock.competitor, tooSoon)).toMatchObject({
      failure: { faults: [{ pointer: '/replies/lifters-racked' }] },
    });
    await keepPhotograph(paddock, paperworkId, await picture(640, 480));
    await handIn(paddock, paperworkId, saved);

    const [after] = await rows<{ document: string }>(
      'select document from record.paperwork_version where paperwork_id = ? and number = 1',
      [paperworkId],
    );
    expect(after).toEqual(before);
    const opened = must(
      await openPaperworkToCheck(paddock.ports(), paddock.official, { paperworkId }),
    );
    expect(
      opened.versions.map(({ number, decision, remarks: said }) => ({ number, decision, said })),
    ).toEqual([
      { number: 2, decision: null, said: [] },
      { number: 1, decision: 'returned', said: remarks },
    ]);
    const bore = (document: typeof opened.document) =>
      document.sheets[0]?.readings.find(
        (r) => r.position === '1 intake' && r.quantity === 'tappet-bore-diameter',
      )?.value.text;
    expect([bore(opened.document), bore(opened.previous!)]).toEqual(['0.8439', '0.8440']);
  });

  it('accepting says that it is no approval, and returning needs a remark', async () => {
    const { paperworkId } = await handedIn(paddock, '41');
    expect(
      await decide(paddock.official, paperworkId, 'returned', [{ item: 'general', text: '  ' }]),
    ).toMatchObject({
      failure: { name: 'invalid', faults: [{ pointer: '/remarks' }] },
    });
    must(await decide(paddock.official, paperworkId, 'accepted'));
    const [mail] = await rows<{ paragraphs: string }>(
      "select content ->> 'paragraphs' as paragraphs from public.mail where kind = 'paperwork-accepted' and subject like '%car 41'",
    );
    expect(mail?.paragraphs).toContain('Acceptance is not approval of the engine.');
    expect(await decide(paddock.official, paperworkId, 'accepted')).toMatchObject({
      failure: { name: 'not-in-this-state' },
    });
  });

  it('a version that is no longer the last is not decided on', async () => {
    const { paperworkId } = await handedIn(paddock, '42');
    expect(await decide(paddock.official, paperworkId, 'accepted', [], 2)).toMatchObject({
      failure: { name: 'stale' },
    });
  });

  it('nobody but an official decides, and no official on their own paperwork', async () => {
    const { paperworkId } = await handedIn(paddock, '43');
    for (const other of [paddock.rival, paddock.competitor]) {
      expect(await decide(other, paperworkId, 'accepted')).toMatchObject({
        failure: { name: 'absent' },
      });
      expect(await openPaperworkToCheck(paddock.ports(), other, { paperworkId })).toMatchObject({
        failure: { name: 'absent' },
      });
    }
    const both: Actor = {
      ...paddock.competitor,
      standings: [
        ...paddock.competitor.standings,
        { seriesId: paddock.seriesId, role: 'official' },
      ],
    };
    expect(await decide(both, paperworkId, 'accepted')).toMatchObject({
      failure: { name: 'conflict-of-interest' },
    });
  });

  it('an official of another series sees nothing of this one', async () => {
    const elsewhere = await openPaddock(world);
    const { paperworkId } = await handedIn(paddock, '44');
    expect(
      await openPaperworkToCheck(paddock.ports(), elsewhere.official, { paperworkId }),
    ).toMatchObject({ failure: { name: 'absent' } });
    expect(await listPaperworkToCheck(paddock.ports(), elsewhere.official)).toEqual([]);
  });
});

describe('lists', () => {
  it('the paddock shows one’s own, what came back first; the office what waits', async () => {
    const own = await listOwnPaperwork(paddock.ports(), paddock.competitor);
    expect(own.length).toBeGreaterThan(5);
    expect(own.map((row) => row.state)).toEqual(
      own.map((row) => row.state).toSorted((a, b) => order(a) - order(b)),
    );
    expect(await listOwnPaperwork(paddock.ports(), paddock.rival)).toEqual([]);
    const waiting = await listPaperworkToCheck(paddock.ports(), paddock.official);
    expect(waiting[0]?.state).toBe('handed-in');
    expect(waiting.map((row) => row.state)).not.toContain('draft');
  });
});

const order = (state: string): number =>
  ['returned', 'draft', 'handed-in', 'accepted', 'withdrawn'].indexOf(state);
