import { noticePrinter } from '@/adapters/pdf/notice-printer';
import { sha256, toHex } from '@/domain/ledger/bytes';
import { formatVerifierKey } from '@/domain/ledger/note/verifier-key';
import { announceDraw } from '@/services/draw/announce-draw';
import { findClassDraw } from '@/services/draw/find-class-draw';
import { publishDraw } from '@/services/draw/publish-draw';
import { enterCars } from '@/services/event/enter-cars';
import { signReport } from '@/services/inspection/report/sign-report';
import { eraseContent } from '@/services/ledger/erasure/erase-content';
import { eraseStrokes } from '@/services/ledger/erasure/erase-strokes';
import { removeObjects } from '@/services/ledger/erasure/remove-objects';
import { proveForNotice } from '@/services/ledger/proof/prove-for-notice';
import { renderNotice } from '@/services/notice/render-notice';
import { decidePaperwork } from '@/services/paperwork/decide-paperwork';
import type { Ports } from '@/services/ports';
import { publishVerdict } from '@/services/verdict/publish-verdict';
import { saveVerdictDraft } from '@/services/verdict/save-verdict-draft';
import { fileOf, get, openInspection, openRaceNight, type RaceNight, rowsFor, send } from './bay';
import { FakeObjects } from './fakes';
import {
  fullDraft,
  handIn,
  keepPhotograph,
  openPaddock,
  type Paddock,
  picture,
  save,
  start,
} from './paperwork';
import { openRecordWorld, type RecordWorld, signNow } from './record';
import { NO_BREACH } from './verdict-case';

/** Two series whose record holds rows of every kind that is committed to, some of them erased. */
export interface RecordOfANight {
  readonly world: RecordWorld;
  readonly objects: FakeObjects;
  readonly night: RaceNight;
  readonly paddock: Paddock;
  /** By series: the key, a head signed early and one signed last, as somebody outside kept them. */
  readonly kept: ReadonlyMap<string, { key: string; early: string; last: string }>;
  ports(): Ports;
}

const STROKES = ['100,200 140,90 180,210', '220,150'];

const write = (objects: FakeObjects) => async (world: RecordWorld) => {
  const ports = () => world.ports({ objects });
  const uuid = () => ports().random.uuid();
  const night = await openRaceNight(world);
  const { seriesId, eventId, classId, official } = night;

  const draw = async () => {
    world.clock.set('2026-07-11T21:00:00.000Z');
    const entries = ['7', '21', '33'].map((carNumber) => ({
      id: uuid(),
      classId,
      carNumber,
      competitorName: `Competitor ${carNumber}`,
      engineReference: '',
      position: null,
    }));
    get(await enterCars(ports(), official, { act: uuid(), seriesId, eventId, entries }));
    const seen = await findClassDraw(ports(), official, { eventId, classId });
    const name = 'Laps under caution';
    const { id } = get(
      await announceDraw(ports(), official, {
        act: uuid(),
        seriesId,
        id: uuid(),
        eventId,
        classId,
        poolHash: seen?.now.hash ?? '',
        select: 1,
        sessionAt: '2026-07-11T23:30:00.000Z',
        values: [{ name, ifMissing: 'void', substitute: '' }],
      }),
    );
    world.clock.set('2026-07-12T03:30:00.000Z');
    const values = [{ name, source: 'announced' as const, numbers: ['7'] }];
    get(await publishDraw(ports(), official, { act: uuid(), seriesId, drawId: id, values }));
  };

  const keepBayPhotograph = async (inspectionId: string): Promise<string> => {
    const id = uuid();
    const bytes = new TextEncoder().encode('a photograph of a tappet');
    const digest = sha256(bytes);
    const objectKey = `originals/${toHex(digest)}`;
    await objects.write(objectKey, bytes, 'image/jpeg');
    await ports().db.execute(
      `insert into public.file (series_id, id, inspection_id, purpose, name, declared_type, declared_bytes,
         upload_key, state, object_key, media_type, bytes, sha256, created_by, created_at, kept_at)
       values (?, ?, ?, 'finding', 'bore.jpg', 'image/jpeg', ?, 'upload', 'kept', ?, 'image/jpeg', ?, ?, ?, now(), now())`,
      [
        seriesId,
        id,
        inspectionId,
        bytes.length,
        objectKey,
        bytes.length,
        Buffer.from(digest),
        night.inspector.personId,
      ],
    );
    return id;
  };

  const sign = async (inspectionId: string) => {
    const head = toHex((await fileOf(world, night.inspector, inspectionId)).chain.head);
    const inspector = { ...night.inspector, authenticatedAt: world.clock.now().toISOString() };
    const asked = { act: uuid(), inspectionId, head, strokes: STROKES };
    get(await signReport(ports(), inspector, asked));
  };

  const inspect = async (carNumber: string): Promise<string> => {
    const inspectionId = await openInspection(world, night, carNumber);
    const rows = rowsFor(world, night);
    get(await send(world, night.inspector, inspectionId, rows.fullBore('1')));
    const fileId = await keepBayPhotograph(inspectionId);
    const wrong = rows.reading({ value: { text: '0.8501', unit: 'in' } });
    get(
      await send(world, night.inspector, inspectionId, [
        wrong,
        rows.strike(wrong.id),
        {
          kind: 'remark',
          id: uuid(),
          occurredAt: '2026-07-12T03:20:00.000Z',
          place: { bank: 'left', cylinder: '1', valve: 'exhaust' },
          remark: 'photograph',
          subject: 'scored bore',
          value: fileId,
          reason: '',
        },
      ]),
    );
    await sign(inspectionId);
    return inspectionId;
  };

  const decide = async (inspectionId: string) => {
    const asked = { seriesId, inspectionId };
    const draft = { act: uuid(), ...asked, version: null, content: NO_BREACH };
    const { version } = get(await saveVerdictDraft(ports(), official, draft));
    const publish = { act: uuid(), ...asked, version };
    const { verdictId } = get(await publishVerdict(ports(), official, publish));
    await renderNotice(ports(), { seriesId, verdictId }, (line) =>
      proveForNotice(ports(), seriesId, line),
    );
  };

  await draw();
  const early = await signNow(ports(), seriesId);
  await decide(await inspect('12J'));
  const inspectionId = await inspect('90X');
  const reason = 'The season’s retention time has passed.';
  get(await eraseStrokes(ports(), official, { act: uuid(), seriesId, inspectionId, reason }));
  return { night, early, last: await signNow(ports(), seriesId) };
};

/** Paperwork that was handed in and returned, twice: what the first said is erased. */
const fillPaddock = async (paddock: Paddock) => {
  const { ports, uuid, official, seriesId } = paddock;
  const ids: string[] = [];
  for (const [at, carNumber] of ['12J', '7'].entries()) {
    const paperworkId = await start(paddock, carNumber);
    await keepPhotograph(paddock, paperworkId, await picture(300 + at));
    await handIn(paddock, paperworkId, await save(paddock, paperworkId, 1, fullDraft()));
    const decision = {
      number: 1,
      decision: 'returned' as const,
      remarks: [{ item: 'general', text: 'The rack is not legible' }],
    };
    get(await decidePaperwork(ports(), official, { act: uuid(), paperworkId, ...decision }));
    ids.push(paperworkId);
  }
  const early = await signNow(ports(), seriesId);
  const reason = 'The season’s retention time has passed.';
  const [paperworkId = ''] = ids;
  get(await eraseContent(ports(), official, { act: uuid(), seriesId, paperworkId, reason }));
  await removeObjects(ports(), { seriesId });
  return { early, last: await signNow(ports(), seriesId) };
};

export const openRecordOfANight = async (): Promise<RecordOfANight> => {
  const objects = new FakeObjects();
  const world = await openRecordWorld({ objects, notices: noticePrinter });
  const { night, ...heads } = await write(objects)(world);
  const opened = await openPaddock(world);
  const paddock: Paddock = { ...opened, objects, ports: () => ({ ...opened.ports(), objects }) };
  const paddockHeads = await fillPaddock(paddock);
  const key = (seriesId: string) => formatVerifierKey(world.keys.signer(seriesId).key);
  const kept = new Map([
    [night.seriesId, { key: key(night.seriesId), ...heads }],
    [paddock.seriesId, { key: key(paddock.seriesId), ...paddockHeads }],
  ]);
  return { world, objects, night, paddock, kept, ports: () => world.ports({ objects }) };
};
