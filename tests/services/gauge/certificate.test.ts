import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { confirmCertificate } from '@/services/gauge/certificate/confirm-certificate';
import { expectCertificate } from '@/services/gauge/certificate/expect-certificate';
import { findGaugeHistory } from '@/services/gauge/find-gauge-history';
import { saveGauge } from '@/services/gauge/save-gauge';
import { failureOf, gaugeFigures, get, openRaceNight, type RaceNight } from '../../support/bay';
import { FakeObjects } from '../../support/verdict-world';
import { openWorld, type World } from '../../support/world';

let world: World;
let night: RaceNight;
const objects = new FakeObjects();
const uuid = () => world.ports().random.uuid();

beforeAll(async () => {
  const images = { findFacts: async () => undefined, previews: async () => [] };
  world = await openWorld({ objects, images });
  night = await openRaceNight(world);
});
afterAll(() => world.close());

const announce = (fileId: string, bytes: number, by = night.chief) =>
  expectCertificate(world.ports(), by, {
    act: uuid(),
    seriesId: night.seriesId,
    gaugeId: night.micrometer,
    fileId,
    name: 'C-1.pdf',
    type: 'application/pdf',
    bytes,
  });

const confirm = (fileId: string, by = night.chief) =>
  confirmCertificate(world.ports(), by, {
    act: uuid(),
    seriesId: night.seriesId,
    gaugeId: night.micrometer,
    fileId,
  });

const send = async (text: string) => {
  const body = new TextEncoder().encode(text);
  const fileId = uuid();
  get(await announce(fileId, body.length));
  objects.kept.set(`uploads/${night.seriesId}/${fileId}`, body);
  return { fileId, kept: get(await confirm(fileId)) };
};

const save = (certificateFile: string, version: number) =>
  saveGauge(world.ports(), night.chief, {
    act: uuid(),
    seriesId: night.seriesId,
    id: night.micrometer,
    code: 'MC-01',
    status: 'in-use',
    description: { ...gaugeFigures.micrometer, certificateFile },
    version,
  });

describe('the file of a certificate', () => {
  it('is kept under its hash and named by the register, in every state of it', async () => {
    const { fileId, kept } = await send('%PDF-1.7 a certificate\n%%EOF');
    expect(kept.state).toBe('kept');
    get(await save(fileId, 1));
    const history = get(
      await findGaugeHistory(world.ports(), night.inspector, { gaugeId: night.micrometer }),
    );
    expect(history.entries.map(({ certificateFile }) => certificateFile)).toEqual([
      undefined,
      fileId,
    ]);
    const [line] = await world.ports().db.execute<{ content: string }[]>(
      `select c.content from record.ledger_content c join record.ledger_line l
         on l.series_id = c.series_id and l.index = c.line_index
         where l.kind = 'gauge-entered' and c.role = 'gauge' order by l.index desc limit 1`,
    );
    expect(line?.content).toContain(kept.state === 'kept' ? kept.sha256 : 'nothing');
  });

  it('is refused by what it is, and the register takes none that is not kept with this gauge', async () => {
    const { fileId, kept } = await send('<html>no certificate</html>');
    expect(kept.state).toBe('refused');
    for (const file of [fileId, uuid()]) {
      const refused = failureOf(await save(file, 2));
      expect(refused.faults?.[0]?.pointer).toBe('/description/certificateFile');
    }
    expect(failureOf(await announce(uuid(), 10_000_001)).name).toBe('too-large');
  });

  it('is for who keeps the gauges', async () => {
    for (const actor of [night.inspector, night.official, night.competitor]) {
      expect(failureOf(await announce(uuid(), 10, actor)).name).toBe('absent');
      expect(failureOf(await confirm(uuid(), actor)).name).toBe('absent');
    }
    expect(failureOf(await confirm(uuid())).name).toBe('absent');
  });
});
