import type { SwapRequest } from '@/contracts/engine/swap';
import { sha256, toHex } from '@/domain/ledger/bytes';
import type { Clause } from '@/domain/rulebook/clause';
import { createEngine } from '@/services/engine/create-engine';
import { correctEngine } from '@/services/engine/facts/correct-engine';
import { swapEngine } from '@/services/engine/swap/swap-engine';
import { acceptEngineOffer } from '@/services/engine/transfer/accept-engine-offer';
import { offerEngine } from '@/services/engine/transfer/offer-engine';
import { createEvent } from '@/services/event/create-event';
import { enterCars } from '@/services/event/enter-cars';
import { eraseContent } from '@/services/ledger/erasure/erase-content';
import { removeObjects } from '@/services/ledger/erasure/remove-objects';
import { recordService } from '@/services/mail/record-service';
import { decidePaperwork } from '@/services/paperwork/decide-paperwork';
import { handInPaperwork } from '@/services/paperwork/hand-in-paperwork';
import { withdrawPaperwork } from '@/services/paperwork/withdraw-paperwork';
import { endGuardianship, markMinor } from '@/services/people/guardian/mark-minor';
import { recordSignOn } from '@/services/rulebook/acknowledgement/record-sign-on';
import { bulletinOf, clauseOf, must, publish } from '../services/rulebook/build';
import { asNow, emailOf, tokenMailedTo } from './helping';
import {
  fullDraft,
  handedIn,
  handIn,
  keepPhotograph,
  layout,
  type Paddock,
  picture,
  save,
  start,
} from './paperwork';
import { addActor } from './world';

const REASON = 'The season’s retention time has passed.';

/** What a competitor's engines write: paperwork, bulletins, swaps, changes of hands; some of it erased. */
export const recordThePaddock = (paddock: Paddock) => {
  const { world, ports, uuid, official, competitor, rival, seriesId, seasonId, classId } = paddock;

  const decide = async (paperworkId: string, decision: 'accepted' | 'returned') => {
    const remarks =
      decision === 'accepted' ? [] : [{ item: 'general', text: 'The rack is not legible' }];
    const decided = { act: uuid(), paperworkId, number: 1, decision, remarks };
    must(await decidePaperwork(ports(), official, decided));
  };

  /** Handed in, with a photograph of its own, and returned. */
  const returned = async (carNumber: string, width: number): Promise<string> => {
    const paperworkId = await start(paddock, carNumber);
    await keepPhotograph(paddock, paperworkId, await picture(width));
    await handIn(paddock, paperworkId, await save(paddock, paperworkId, 1, fullDraft()));
    await decide(paperworkId, 'returned');
    return paperworkId;
  };

  const erase = async (paperworkId: string) => {
    must(
      await eraseContent(ports(), official, { act: uuid(), seriesId, paperworkId, reason: REASON }),
    );
    await removeObjects(ports(), { seriesId });
  };

  const takenBack = async (carNumber: string): Promise<string> => {
    const { paperworkId, version } = await handedIn(paddock, carNumber);
    const reason = `Joss Farrow bought car ${carNumber}`;
    const asked = { act: uuid(), paperworkId, version, reason };
    must(await withdrawPaperwork(ports(), competitor, asked));
    return paperworkId;
  };

  const signedFor = async (carNumbers: readonly string[]): Promise<readonly string[]> => {
    const guardian = await addActor(world, 'Maud Lindqvist');
    const minor = { seriesId, personId: competitor.personId };
    const guardianEmail = await emailOf(world, guardian);
    const marked = { act: uuid(), ...minor, guardianName: 'Maud Lindqvist', guardianEmail };
    must(await markMinor(ports(), official, marked));
    const ids: string[] = [];
    for (const carNumber of carNumbers) {
      const paperworkId = await start(paddock, carNumber);
      await keepPhotograph(paddock, paperworkId, await picture());
      const version = await save(paddock, paperworkId, 1, fullDraft());
      const signer = await asNow(world, guardian);
      must(await handInPaperwork(ports(), signer, { act: uuid(), paperworkId, version }));
      ids.push(paperworkId);
    }
    must(await endGuardianship(ports(), official, { act: uuid(), ...minor }));
    return ids;
  };

  const openEvent = async (): Promise<string> => {
    const id = uuid();
    must(
      await createEvent(ports(), official, {
        act: uuid(),
        seriesId,
        id,
        seasonId,
        slug: 'round-1',
        name: 'Round 1',
        track: 'Quarrel Fen Oval',
        zone: 'America/Chicago',
        startsAt: '2026-07-12T23:00:00.000Z',
        endsAt: '2026-07-13T04:00:00.000Z',
        protestMinutes: 30,
      }),
    );
    return id;
  };

  const enter = async (eventId: string, carNumber: string): Promise<string> => {
    const id = uuid();
    const entry = {
      id,
      classId,
      carNumber,
      competitorName: competitor.name,
      competitorEmail: await emailOf(world, competitor),
      engineReference: '',
      position: null,
    };
    must(await enterCars(ports(), official, { act: uuid(), seriesId, eventId, entries: [entry] }));
    return id;
  };

  /** A bulletin that the declared 361.4 in³ do not meet; who signs on has read it. */
  const bulletin = async (eventId: string, entryIds: readonly string[]) => {
    const clause: Clause = clauseOf('3.1');
    if (clause.requirement?.kind !== 'limit') throw new Error('Clause 3.1 is no limit.');
    const requirement = { ...clause.requirement, max: { text: '361.0', unit: 'in³' } };
    const changed = { ...clause, words: 'At most 361.0 cubic inches.', requirement };
    const content = bulletinOf(changed, { kind: 'safety' }, 'Smaller');
    must(await publish(world, paddock, content));
    const [row] = await ports().db.execute<{ id: string }[]>(
      "select id from record.rule_publication where series_id = ? and kind = 'bulletin'",
      [seriesId],
    );
    const bulletinIds = [row?.id ?? ''];
    for (const entryId of entryIds) {
      const asked = { act: uuid(), seriesId, eventId, entryId, bulletinIds };
      must(await recordSignOn(ports(), official, { ...asked, name: 'Edda Lindqvist' }));
    }
  };

  const swap = async (entryId: string, reference: string): Promise<string> => {
    const asked: SwapRequest = {
      act: uuid(),
      id: uuid(),
      entryId,
      engine: { id: uuid(), reference, blockCasting: '41-9' },
      seal: 'T-0417',
      paperworkId: uuid(),
      photograph: { fileId: uuid(), sha256: toHex(sha256(await picture(200, 150))) },
    };
    return must(await swapEngine(ports(), competitor, asked)).paperworkId;
  };

  const serveOtherwise = async () => {
    const [mail] = await ports().db.execute<{ id: string }[]>(
      `update public.mail set state = 'bounced' where id = (select id from public.mail
         where series_id = ? and kind = 'paperwork-receipt' order by created_at, id limit 1)
       returning id`,
      [seriesId],
    );
    const how = 'Handed over in bay 2, before a witness.';
    const served = { how, servedAt: ports().clock.now().toISOString() };
    const asked = { act: uuid(), seriesId, mailId: mail?.id ?? '', ...served };
    must(await recordService(ports(), official, asked));
  };

  const sell = async (engineId: string, reference: string) => {
    const email = await emailOf(world, rival);
    const offer = { act: uuid(), engineId, kind: 'sold', email, untilAt: null } as const;
    must(await offerEngine(ports(), competitor, offer));
    const accepted = { act: uuid(), reference, name: '', agent: '', previousToken: undefined };
    const token = await tokenMailedTo(world, email);
    must(await acceptEngineOffer(ports(), { ...accepted, token }));
  };

  /** An engine that no series has paperwork of. */
  const undeclared = async (): Promise<string> => {
    const id = uuid();
    const facts = { layout, blockCasting: '', headCastings: '', serial: '' };
    const engine = { act: uuid(), id, reference: 'On the shelf', ...facts };
    must(await createEngine(ports(), competitor, engine));
    return id;
  };

  const correct = async (engineId: string) => {
    const facts = { blockCasting: '41-7731', headCastings: '62-119', serial: '0418' };
    must(await correctEngine(ports(), competitor, { act: uuid(), engineId, version: 1, ...facts }));
  };

  return {
    decide,
    returned,
    erase,
    takenBack,
    signedFor,
    openEvent,
    enter,
    bulletin,
    swap,
    serveOtherwise,
    sell,
    undeclared,
    correct,
  };
};
