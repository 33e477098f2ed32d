import sharp from 'sharp';
import { images } from '@/adapters/images/sharp';
import type { Actor } from '@/domain/access/permission';
import type { PaperworkDraft } from '@/domain/paperwork/draft';
import type { SheetCell } from '@/domain/paperwork/sheet/sheet-cell';
import { GENERIC_LAYOUTS } from '@/domain/tappet/layout/generic-layouts';
import { createEngine } from '@/services/engine/create-engine';
import { keepFile } from '@/services/file/keep-file';
import { handInPaperwork } from '@/services/paperwork/hand-in-paperwork';
import { saveDraft } from '@/services/paperwork/save-draft';
import { startPaperwork } from '@/services/paperwork/start-paperwork';
import type { Ports } from '@/services/ports';
import { must, type Office, openOffice, putInForce } from '../services/rulebook/build';
import { FakeObjects } from './fakes';
import { addActor, type World } from './world';

/** A class with the tappet rules in force, a competitor with an engine, and what the services need. */
export interface Paddock extends Office {
  readonly world: World;
  readonly objects: FakeObjects;
  readonly competitor: Actor;
  readonly rival: Actor;
  readonly engineId: string;
  ports(): Ports;
  uuid(): string;
}

export const layout = GENERIC_LAYOUTS[0] as (typeof GENERIC_LAYOUTS)[number];

export const openPaddock = async (world: World): Promise<Paddock> => {
  const office = await openOffice(world);
  await putInForce(world, office);
  const { seriesId } = office;
  const competitor = await addActor(world, 'Ada Lindqvist', [{ seriesId, role: 'competitor' }]);
  const rival = await addActor(world, 'Teo Marsh', [{ seriesId, role: 'competitor' }]);
  const objects = new FakeObjects();
  const ports = () => world.ports({ objects, uploads: objects.uploads, images });
  const uuid = () => ports().random.uuid();
  const engineId = uuid();
  must(
    await createEngine(ports(), competitor, {
      act: uuid(),
      id: engineId,
      reference: 'VR-2231',
      layout,
      blockCasting: '41-7730',
      headCastings: '62-118, 62-118',
      serial: '0417',
    }),
  );
  return { ...office, world, objects, competitor, rival, engineId, ports, uuid };
};

export const start = async (
  { ports, uuid, competitor, seriesId, classId, engineId }: Paddock,
  carNumber = '12J',
): Promise<string> => {
  const id = uuid();
  const input = { act: uuid(), id, seriesId, classId, engineId, carNumber };
  return must(await startPaperwork(ports(), competitor, input)).paperworkId;
};

const POSITIONS = layout.banks.flatMap((bank) =>
  bank.bores.map(({ cylinder, valve }) => `${cylinder} ${valve}`),
);

const cell = (position: string, quantity: SheetCell['quantity'], typed: string): SheetCell => ({
  position,
  quantity,
  depth: '',
  axis: '',
  typed,
  unit: 'in',
});

/** A draft that lacks nothing but its photograph; `change` replaces single values, by `3 intake bore`. */
export const fullDraft = (change: Readonly<Record<string, string>> = {}): PaperworkDraft => ({
  answers: [
    { subject: 'tappet-type', position: 'engine', typed: 'flat' },
    { subject: 'bore-bushed', position: 'engine', typed: 'no' },
    { subject: 'displacement', position: 'engine', typed: '361.4' },
    { subject: 'block-casting-number', position: 'engine', typed: '41-7730' },
  ],
  sheets: [
    {
      subject: 'lifter-sheet',
      cells: POSITIONS.flatMap((position) => [
        cell(position, 'lifter-body-diameter', change[`${position} lifter`] ?? '0.8423'),
        cell(position, 'foot-diameter', change[`${position} foot`] ?? '0.8420'),
        cell(position, 'tappet-bore-diameter', change[`${position} bore`] ?? '0.8440'),
      ]),
    },
  ],
  note: '',
});

export const picture = (width = 320, height = 240): Promise<Buffer> =>
  sharp({ create: { width, height, channels: 3, background: '#8a8f88' } })
    .jpeg()
    .toBuffer();

export const keepPhotograph = async (
  { ports, uuid, competitor }: Paddock,
  paperworkId: string,
  bytes: Uint8Array,
  item = 'lifters-racked',
) =>
  must(
    await keepFile(ports(), competitor, {
      act: uuid(),
      fileId: uuid(),
      paperworkId,
      purpose: 'photograph',
      item,
      name: 'lifters.jpg',
      declaredType: 'image/jpeg',
      declaredBytes: bytes.length,
      bytes,
    }),
  );

/** Saves the draft over whatever version stands and hands it in. */
export const save = async (
  { ports, uuid, competitor }: Paddock,
  paperworkId: string,
  version: number,
  draft: PaperworkDraft,
): Promise<number> =>
  must(await saveDraft(ports(), competitor, { act: uuid(), paperworkId, version, draft })).version;

export const handIn = async (
  { ports, uuid, competitor }: Paddock,
  paperworkId: string,
  version: number,
) => must(await handInPaperwork(ports(), competitor, { act: uuid(), paperworkId, version }));

/** Paperwork that was handed in as version 1. */
export const handedIn = async (
  paddock: Paddock,
  carNumber = '12J',
): Promise<{ readonly paperworkId: string; readonly version: number }> => {
  const paperworkId = await start(paddock, carNumber);
  await keepPhotograph(paddock, paperworkId, await picture());
  const version = await save(paddock, paperworkId, 1, fullDraft());
  await handIn(paddock, paperworkId, version);
  return { paperworkId, version: version + 1 };
};
