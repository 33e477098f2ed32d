import type { Actor } from '@/domain/access/permission';
import { sha256, utf8 } from '@/domain/ledger/bytes';
import { canonicalJson } from '@/domain/ledger/canonical';
import { type RulesInForce, rulesDocument } from '@/domain/rulebook/rules-in-force';
import type { DecisionDraft } from '@/domain/verdict/decision';
import { hexBytes } from '@/services/act/append';
import type { Objects } from '@/services/ports';
import { publishVerdict } from '@/services/verdict/publish-verdict';
import { saveVerdictDraft } from '@/services/verdict/save-verdict-draft';
import { type Engine, reportText, STREET_EIGHT } from './verdict-case';
import { addActor, addSeries, type World } from './world';

/** The object store in memory. */
export class FakeObjects implements Objects {
  readonly kept = new Map<string, Uint8Array>();
  async presignPut(key: string): Promise<string> {
    return `memory:${key}`;
  }
  async findHead(key: string) {
    const body = this.kept.get(key);
    return body && { bytes: body.length };
  }
  async read(key: string): Promise<Uint8Array> {
    const body = this.kept.get(key);
    if (body === undefined) throw new Error(`no object ${key}`);
    return body;
  }
  async write(key: string, body: Uint8Array): Promise<void> {
    this.kept.set(key, body);
  }
  async remove(key: string): Promise<void> {
    this.kept.delete(key);
  }
}

/** One series with an event, its people, and inspections whose reports can be signed. */
export interface VerdictWorld {
  readonly world: World;
  readonly seriesId: string;
  readonly eventId: string;
  readonly official: Actor;
  readonly inspector: Actor;
  readonly competitor: Actor;
  /** An entry that was picked, without a report. */
  readonly addInspection: (car: string, competitor?: Actor | null) => Promise<string>;
  /** What the inspector signs, appended as the product appends it. */
  readonly sign: (inspectionId: string, engine?: Engine, by?: Actor) => Promise<void>;
  readonly decide: (
    inspectionId: string,
    draft: DecisionDraft,
    by?: Actor,
  ) => Promise<Awaited<ReturnType<typeof publishVerdict>>>;
  readonly save: (
    inspectionId: string,
    draft: DecisionDraft,
    version: number | null,
    by?: Actor,
  ) => Promise<Awaited<ReturnType<typeof saveVerdictDraft>>>;
}

export const openVerdictWorld = async (world: World): Promise<VerdictWorld> => {
  const seriesId = await addSeries(world);
  const { random } = world.ports();
  const official = await addActor(world, 'Ilse Törnkvist', [{ seriesId, role: 'official' }]);
  const inspector = await addActor(world, 'Oona Brannick', [{ seriesId, role: 'inspector' }]);
  const competitor = await addActor(world, 'Wren Halloway', [{ seriesId, role: 'competitor' }]);
  const [seasonId, classId, eventId] = [random.uuid(), random.uuid(), random.uuid()];
  const run = (sql: string, values: readonly unknown[]) =>
    world.ports().db.execute(sql, [...values]);
  await run("insert into public.season values (?, ?, '2026', '2026', '2026-01-01', '2026-12-31')", [
    seriesId,
    seasonId,
  ]);
  await run("insert into public.class values (?, ?, ?, 'street-eight', 'Street Eight')", [
    seriesId,
    classId,
    seasonId,
  ]);
  await run(
    `insert into public.event (series_id, id, season_id, number, slug, name, track, zone, starts_at, ends_at, protest_minutes)
     values (?, ?, ?, 7, 'round-7', 'Round 7', 'Quarrel Fen Oval', 'America/Chicago',
             '2026-07-11T22:00:00Z', '2026-07-12T04:00:00Z', 120)`,
    [seriesId, eventId, seasonId],
  );
  const rules: RulesInForce = STREET_EIGHT;
  const document = canonicalJson(rulesDocument(rules));
  await run('select append.rules(?, ?)', [seriesId, document]);
  const rulesHash = sha256(utf8(document));

  const addInspection: VerdictWorld['addInspection'] = async (car, whose = competitor) => {
    const [entryId, inspectionId] = [random.uuid(), random.uuid()];
    await run(
      `insert into public.entry (series_id, id, event_id, class_id, car_number, competitor_id, competitor_name, position)
       values (?, ?, ?, ?, ?, ?, ?, 1)`,
      [
        seriesId,
        entryId,
        eventId,
        classId,
        car,
        whose?.personId ?? null,
        whose?.name ?? 'A. Nobody',
      ],
    );
    await run(
      `insert into public.inspection (series_id, id, event_id, entry_id, picked_because, picked_by, picked_at, rules_hash, layout, inspector_id)
       values (?, ?, ?, ?, 'position', ?, now(), ?, '{}', ?)`,
      [
        seriesId,
        inspectionId,
        eventId,
        entryId,
        official.personId,
        Buffer.from(rulesHash),
        inspector.personId,
      ],
    );
    return inspectionId;
  };

  const sign: VerdictWorld['sign'] = async (inspectionId, engine = {}, by = inspector) => {
    const [last] = await world
      .ports()
      .db.execute<{ n: string }[]>(
        'select count(*) as n from record.report where series_id = ? and inspection_id = ?',
        [seriesId, inspectionId],
      );
    const revision = Number(last?.n) + 1;
    const person = { id: by.personId, name: by.name };
    const text = reportText({ ...engine, inspectionId, inspector: person, revision });
    await run('select append.report(?::jsonb)', [
      JSON.stringify([
        hexBytes({
          series_id: seriesId,
          inspection_id: inspectionId,
          revision,
          document: text,
          hash: sha256(utf8(text)),
          chain_head: new Uint8Array(32),
          rules_hash: rulesHash,
          reason: revision === 1 ? '' : 'A foot was read again.',
          signed_by: by.personId,
          signature: {},
          signed_at: '2026-07-12T03:48:00Z',
          act_id: random.uuid(),
        }),
      ]),
    ]);
  };

  const save: VerdictWorld['save'] = (inspectionId, content, version, by = official) =>
    saveVerdictDraft(world.ports(), by, {
      act: random.uuid(),
      seriesId,
      inspectionId,
      version,
      content,
    });

  const decide: VerdictWorld['decide'] = async (inspectionId, draft, by = official) => {
    const saved = await save(inspectionId, draft, null, by);
    if (!saved.ok) return saved;
    return publishVerdict(world.ports(), by, {
      act: random.uuid(),
      seriesId,
      inspectionId,
      version: saved.value.version,
    });
  };

  return {
    world,
    seriesId,
    eventId,
    official,
    inspector,
    competitor,
    addInspection,
    sign,
    save,
    decide,
  };
};
