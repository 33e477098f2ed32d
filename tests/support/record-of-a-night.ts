import { noticePrinter } from '@/adapters/pdf/notice-printer';
import { sha256, toHex } from '@/domain/ledger/bytes';
import { formatVerifierKey } from '@/domain/ledger/note/verifier-key';
import { announceDraw } from '@/services/draw/announce-draw';
import { findClassDraw } from '@/services/draw/find-class-draw';
import { publishDraw } from '@/services/draw/publish-draw';
import { enterCars } from '@/services/event/enter-cars';
import { signReport } from '@/services/inspection/report/sign-report';
import { eraseStrokes } from '@/services/ledger/erasure/erase-strokes';
import { proveForNotice } from '@/services/ledger/proof/prove-for-notice';
import { renderNotice } from '@/services/notice/render-notice';
import type { Ports } from '@/services/ports';
import { publishVerdict } from '@/services/verdict/publish-verdict';
import { saveVerdictDraft } from '@/services/verdict/save-verdict-draft';
import { fileOf, get, openInspection, openRaceNight, type RaceNight, rowsFor, send } from './bay';
import { FakeObjects } from './fakes';
import { handedIn, openPaddock, type Paddock } from './paperwork';
import { openRecordWorld, type RecordWorld, signNow } from './record';
import { recordThePaddock } from './record-of-a-paddock';
import { recordTheDay } from './record-of-the-day';
import { NO_BREACH } from './verdict-case';

/** Two series whose record holds rows of every kind that is committed to, some of them erased. */
export interface RecordOfANight {
  readonly world: RecordWorld;
  readonly objects: FakeObjects;
  readonly night: RaceNight;
  readonly paddock: Paddock;
  /** What was written and not erased, for tests that erase. */
  readonly left: {
    readonly eventId: string;
    readonly takenBack: string;
    readonly signedFor: string;
    readonly swapped: string;
  };
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

  const day = recordTheDay(ports, night);
  world.clock.set('2026-07-11T20:30:00.000Z');
  await day.openWeighing();
  await draw();
  const early = await signNow(ports(), seriesId);
  const inspected = await inspect('12J');
  await decide(inspected);
  await day.weigh(await day.enterLate());
  await day.hold(inspected);
  await day.results();
  const inspectionId = await inspect('90X');
  const reason = 'The season’s retention time has passed.';
  get(await eraseStrokes(ports(), official, { act: uuid(), seriesId, inspectionId, reason }));
  await day.doubt();
  return { night, early, last: await signNow(ports(), seriesId) };
};

/** Paperwork of every end, an event with a bulletin and swaps, engines sold; some of it erased. */
const fillPaddock = async (paddock: Paddock) => {
  const { ports, seriesId, engineId } = paddock;
  const write = recordThePaddock(paddock);
  const [first] = [await write.returned('12J', 300), await write.returned('7', 301)];
  const early = await signNow(ports(), seriesId);
  const { paperworkId: accepted } = await handedIn(paddock, '20');
  await write.decide(accepted, 'accepted');
  const [back, takenBack] = [await write.takenBack('30'), await write.takenBack('31')];
  const [signed = '', signedFor = ''] = await write.signedFor(['40', '41']);
  const eventId = await write.openEvent();
  const entries = [await write.enter(eventId, '20'), await write.enter(eventId, '21')];
  await write.bulletin(eventId, entries);
  const erased = await write.swap(entries[0] ?? '', 'SPARE-1');
  const swapped = await write.swap(entries[1] ?? '', 'SPARE-2');
  await write.serveOtherwise();
  await write.sell(engineId, 'Bought 1');
  const shelved = await write.undeclared();
  await write.correct(shelved);
  await write.sell(shelved, 'Bought 2');
  for (const paperworkId of [first, back, signed, erased]) await write.erase(paperworkId);
  const left = { eventId, takenBack, signedFor, swapped };
  return { left, early, last: await signNow(ports(), seriesId) };
};

export const openRecordOfANight = async (): Promise<RecordOfANight> => {
  const objects = new FakeObjects();
  const world = await openRecordWorld({ objects, notices: noticePrinter });
  const { night, ...heads } = await write(objects)(world);
  const opened = await openPaddock(world);
  const paddock: Paddock = { ...opened, objects, ports: () => ({ ...opened.ports(), objects }) };
  const { left, ...paddockHeads } = await fillPaddock(paddock);
  const key = (seriesId: string) => formatVerifierKey(world.keys.signer(seriesId).key);
  const kept = new Map([
    [night.seriesId, { key: key(night.seriesId), ...heads }],
    [paddock.seriesId, { key: key(paddock.seriesId), ...paddockHeads }],
  ]);
  return { world, objects, night, paddock, left, kept, ports: () => world.ports({ objects }) };
};
