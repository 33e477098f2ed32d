import { custodyRequest, heldPartRequest, sealRequest } from '@/contracts/custody/custody';
import { WEIGHTS_RULE_SET } from '@/domain/rulebook/rule-sets/weights';
import { recordCustody } from '@/services/custody/record-custody';
import { recordSeal } from '@/services/custody/record-seal';
import { tagPart } from '@/services/custody/tag-part';
import { changeEntry } from '@/services/event/changes/change-entry';
import { findChecks } from '@/services/event/check/find-checks';
import { recordCheck } from '@/services/event/check/record-check';
import { signChecks } from '@/services/event/check/sign-checks';
import { enterCars } from '@/services/event/enter-cars';
import { findEventResults } from '@/services/event/results/find-event-results';
import { makeOfficial, takeBackResults } from '@/services/event/results/state-results';
import { writePositions } from '@/services/event/write-positions';
import { recordGaugeCheck } from '@/services/gauge/record-gauge-check';
import { reportGaugeBad } from '@/services/gauge/report-gauge-bad';
import { actOnReview } from '@/services/gauge/review/act-on-review';
import { listReviews } from '@/services/gauge/review/list-reviews';
import { saveGauge } from '@/services/gauge/save-gauge';
import type { Ports } from '@/services/ports';
import { openDraft } from '@/services/rulebook/open-draft';
import { publishEdition } from '@/services/rulebook/publish-edition';
import { addClass } from '@/services/series/add-class';
import { get, type RaceNight } from './bay';

/** What a race night writes beside its inspections: sign-on, scales, gauges, custody, results. */
export const recordTheDay = (ports: () => Ports, night: RaceNight) => {
  const uuid = () => ports().random.uuid();
  const { seriesId, eventId, seasonId, official, chief, inspector } = night;
  const at = () => ({ act: uuid(), seriesId, eventId });
  const inch = (text: string) => ({ text, unit: 'in' });
  const classId = uuid();
  const pounds = (text: string) => ({ text, unit: 'lb' });

  /** A class whose cars are weighed; before the event begins. */
  const openWeighing = async () => {
    const named = { id: classId, seasonId, name: 'Late Light' };
    get(await addClass(ports(), official, { act: uuid(), seriesId, ...named }));
    const { clauses, penalties } = WEIGHTS_RULE_SET;
    const rules = { clauses: clauses.filter(({ number }) => number === '2'), penalties };
    const content = rules as unknown as Parameters<typeof openDraft>[2]['content'];
    const draft = { id: uuid(), classId, title: 'First edition', content };
    get(await openDraft(ports(), official, { act: uuid(), seriesId, ...draft }));
    const publish = { act: uuid(), seriesId, draftId: draft.id, version: 1, inForceAt: null };
    get(await publishEdition(ports(), official, publish));
  };

  const enterLate = async () => {
    const car = { carNumber: '44', competitorName: 'Joss Farrow', engineReference: 'LL-1' };
    const entries = [{ id: uuid(), classId, position: null, ...car }];
    get(
      await enterCars(ports(), official, { ...at(), entries, lateReason: 'Held up on the road' }),
    );
    const entryId = entries[0]?.id ?? '';
    const driver = { kind: 'driver', becomes: 'Nils Farrow', reason: 'The owner is ill' } as const;
    get(await changeEntry(ports(), official, { ...at(), entryId, ...driver }));
    return entryId;
  };

  const weigh = async (entryId: string) => {
    const gaugeId = uuid();
    const description = {
      kind: 'scale',
      name: 'Platform scale',
      division: pounds('1'),
      calibratedOn: '2026-01-02',
      dueOn: '2027-01-02',
    } as const;
    const scale = {
      id: gaugeId,
      code: 'SC-01',
      description,
      status: 'in-use',
      version: 0,
    } as const;
    get(await saveGauge(ports(), chief, { act: uuid(), seriesId, ...scale }));
    for (const value of [pounds('28000'), pounds('2800')]) {
      const said = { id: uuid(), entryId, clause: '2', value, gaugeId };
      get(await recordCheck(ports(), inspector, { ...at(), ...said }));
    }
    const { mark } = get(await findChecks(ports(), inspector, eventId)).shown;
    const authenticatedAt = ports().clock.now().toISOString();
    get(await signChecks(ports(), { ...inspector, authenticatedAt }, { ...at(), mark }));
  };

  const checkGauge = (checkedAt: string, reads: string) =>
    recordGaugeCheck(ports(), inspector, {
      ...at(),
      id: uuid(),
      gaugeId: night.micrometer,
      kind: 'ring',
      ringId: night.ring,
      inspectionId: null,
      readings: [inch(reads)],
      expected: inch('0.8440'),
      allowed: inch('0.0001'),
      witness: 'Tamsin Overley',
      note: 'Asked for by the crew',
      checkedAt,
    });

  /** The micrometer is found bad, and what was decided by it is reviewed. */
  const doubt = async () => {
    get(await checkGauge('2026-07-12T02:10:00.000Z', '0.8440'));
    get(await checkGauge('2026-07-12T03:20:00.000Z', '0.8447'));
    const fault = {
      id: uuid(),
      gaugeId: night.micrometer,
      foundAt: '2026-07-12T03:25:00.000Z',
      off: inch('0.0007'),
      reason: 'It was dropped; it reads large on the ring.',
    };
    const { reviews } = get(
      await reportGaugeBad(ports(), chief, { act: uuid(), seriesId, ...fault }),
    );
    if (reviews === 0) throw new Error('No verdict relied on the micrometer.');
    const [review] = get(await listReviews(ports(), official));
    const asked = { act: uuid(), seriesId, reviewId: review?.reviewId ?? '' };
    const reason = 'A second micrometer gave the same that night.';
    get(await actOnReview(ports(), official, { ...asked, to: 'stands', reason }));
  };

  const hold = async (inspectionId: string) => {
    const part = {
      act: uuid(),
      id: uuid(),
      kind: 'held',
      inspectionId,
      words: 'Lifter',
      placeOnEngine: 'intake 3',
      clause: '4.2',
      bag: 'B-11',
      takenFrom: 'Tamsin Overley',
      takenBy: 'Oona Brannick',
      place: 'Bay 2',
      takenAt: '2026-07-12T03:10:00.000Z',
      holdUntil: null,
    };
    const { id: partId } = get(await tagPart(ports(), inspector, heldPartRequest.parse(part)));
    const opened = {
      act: uuid(),
      id: uuid(),
      partId,
      kind: 'bag-opened',
      giver: 'Oona Brannick',
      witness: 'Tamsin Overley',
      bag: 'B-11',
      place: 'Bay 2',
      reason: 'A second measurement',
      occurredAt: '2026-07-12T03:20:00.000Z',
    };
    get(await recordCustody(ports(), inspector, custodyRequest.parse(opened)));
    // Not by whom it was taken: the chain has a gap.
    const over = {
      act: uuid(),
      id: uuid(),
      partId,
      kind: 'hand-over',
      giver: 'Somebody Else',
      receiver: 'Perrin Oakhollow',
      place: 'Impound, shelf 4',
      reason: 'Overnight',
      occurredAt: '2026-07-12T03:22:00.000Z',
    };
    get(await recordCustody(ports(), inspector, custodyRequest.parse(over)));
    for (const [kind, state] of [
      ['applied', null],
      ['found', 'intact'],
    ] as const) {
      const seal = {
        act: uuid(),
        id: uuid(),
        inspectionId,
        kind,
        number: '10441',
        place: 'intake manifold',
        state,
        doneBy: 'Oona Brannick',
        note: 'Beside the old one',
        occurredAt: '2026-07-12T03:00:00.000Z',
      };
      get(await recordSeal(ports(), inspector, sealRequest.parse(seal)));
    }
  };

  const results = async () => {
    const find = async () => {
      const { classes } = get(await findEventResults(ports(), official, eventId));
      const found = classes.find((one) => one.classId === night.classId);
      if (found === undefined) throw new Error('The class has no results.');
      return found;
    };
    const positions = (await find()).lines.map(({ entryId }, place) => ({
      entryId,
      position: place + 1,
      state: 'entered' as const,
    }));
    get(await writePositions(ports(), official, { ...at(), positions }));
    const exceptions = (await find()).lines
      .filter(({ held }) => held)
      .map(({ entryId }) => ({ entryId, reason: 'Its engine is opened on Monday.' }));
    const asked = () => ({ ...at(), classId: night.classId });
    get(await makeOfficial(ports(), official, { ...asked(), exceptions }));
    const reason = 'Two cars were counted twice.';
    get(await takeBackResults(ports(), official, { ...asked(), reason }));
  };

  return { openWeighing, enterLate, weigh, doubt, hold, results };
};
