import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { answerQuestion } from '@/services/rulebook/question/answer-question';
import { askQuestion } from '@/services/rulebook/question/ask-question';
import { listQuestions } from '@/services/rulebook/question/list-questions';
import { grantWaiver } from '@/services/rulebook/ruling/grant-waiver';
import { publishClarification } from '@/services/rulebook/ruling/publish-clarification';
import { openWorld, type World } from '../../support/world';
import { bulletinOf, clauseOf, must, type Office, openOffice, publish, putInForce } from './build';

let world: World;
let office: Office;
beforeAll(async () => {
  world = await openWorld();
  office = await openOffice(world);
  await putInForce(world, office);
});
afterAll(() => world.close());

const ids = () => {
  const { random } = world.ports();
  return { act: random.uuid(), id: random.uuid() };
};
const lines = async (kind: string) =>
  world
    .ports()
    .db.execute<{ line: string }[]>(
      'select line from record.ledger_line where series_id = ? and kind = ?',
      [office.seriesId, kind],
    );

describe('a bulletin', () => {
  it('that does not fit the rules it amends is refused with its faults', async () => {
    const wrong = bulletinOf(clauseOf('4.4', { number: '9.9', heading: '' }), { kind: 'safety' });
    const refused = await publish(world, office, { ...wrong, reason: ' ' });
    const pointers = refused.ok ? [] : refused.failure.faults?.map((fault) => fault.pointer);
    expect(pointers).toEqual(['/reason', '/changes/0', '/changes/0/clause/heading']);
    expect(await lines('bulletin-published')).toHaveLength(0);
  });

  it('is refused while no edition is in force', async () => {
    const empty = await openOffice(world);
    const refused = await publish(world, empty, bulletinOf(clauseOf('4.4'), { kind: 'safety' }));
    expect(refused).toMatchObject({ failure: { name: 'not-in-this-state' } });
  });

  it('is numbered one after the other, however many are published at once, each with its line', async () => {
    const contents = ['a', 'b', 'c'].map((words) =>
      bulletinOf(clauseOf('4.4', { words }), { kind: 'safety' }),
    );
    const done = await Promise.all(contents.map((content) => publish(world, office, content)));
    expect(done.map((one) => must(one).number).sort()).toEqual([1, 2, 3]);
    expect(await lines('bulletin-published')).toHaveLength(3);
  });
});

describe('a waiver', () => {
  const waiver = (change: object = {}) => ({
    ...ids(),
    seriesId: office.seriesId,
    classId: office.classId,
    clause: '4.4',
    for: { kind: 'car' as const, carNumber: '12J' },
    words: 'One bushed bore is allowed.',
    reason: 'A repair before the rule.',
    fromAt: world.clock.now().toISOString(),
    untilAt: '2026-12-31T06:00:00.000Z',
    ...change,
  });

  it('names what is missing', async () => {
    const bad = waiver({
      clause: '99',
      for: { kind: 'car', carNumber: '12j' },
      words: '',
      untilAt: '2026-01-01T06:00:00.000Z',
    });
    const refused = await grantWaiver(world.ports(), office.official, bad);
    const pointers = refused.ok ? [] : refused.failure.faults?.map((fault) => fault.pointer);
    expect(pointers).toEqual(['/clause', '/carNumber', '/words', '/untilAt']);
  });

  it('for an engine names one that is declared in the class', async () => {
    const strange = { kind: 'engine', engineId: ids().id, engineName: 'VR-1' };
    const refused = await grantWaiver(world.ports(), office.official, waiver({ for: strange }));
    expect(refused).toMatchObject({ failure: { faults: [{ pointer: '/engineId' }] } });
  });

  it('never reaches back before it was granted, and writes its line', async () => {
    const early = waiver({ fromAt: '2026-01-01T06:00:00.000Z' });
    expect(must(await grantWaiver(world.ports(), office.official, early)).number).toBe(1);
    const [row] = await world
      .ports()
      .db.execute<{ from: string }[]>(
        `select document::jsonb #>> '{content,fromAt}' as from from record.rule_publication where id = ?`,
        [early.id],
      );
    expect(row?.from).toBe(world.clock.now().toISOString());
    expect(await lines('waiver-published')).toHaveLength(1);
  });

  it('is for officials to grant', async () => {
    expect(await grantWaiver(world.ports(), office.stranger, waiver())).toMatchObject({
      failure: { name: 'absent' },
    });
  });
});

describe('a rules question', () => {
  const ask = async (clause = '4.4') => {
    const { act, id } = ids();
    const { seriesId, classId } = office;
    return askQuestion(world.ports(), office.stranger, {
      act,
      id,
      seriesId,
      classId,
      clause,
      question: 'Is a sleeve a bush?',
    });
  };
  const answer = (questionId: string, publish: { id: string; question: string } | null) =>
    answerQuestion(world.ports(), office.official, {
      act: ids().act,
      seriesId: office.seriesId,
      questionId,
      answer: 'Yes, a sleeve is a bush.',
      publish,
    });
  const mails = (kind: string) =>
    world
      .ports()
      .db.execute<{ person_id: string }[]>('select person_id from public.mail where kind = ?', [
        kind,
      ]);

  it('is answered once, to the one who asked alone', async () => {
    const { questionId } = must(await ask());
    // Both officials and the administrator who opened the series.
    expect(await mails('rules-question')).toHaveLength(3);
    expect(must(await answer(questionId, null)).clarification).toBeNull();
    expect(await mails('rules-answer')).toEqual([{ person_id: office.stranger.personId }]);
    expect(await answer(questionId, null)).toMatchObject({
      failure: { name: 'not-in-this-state' },
    });
    expect(await lines('clarification-published')).toHaveLength(0);
  });

  it('becomes a clarification in the officials’ words, in the same act', async () => {
    const { questionId } = must(await ask());
    const done = must(
      await answer(questionId, { id: ids().id, question: 'May bores be sleeved?' }),
    );
    expect(done.clarification).toBe(1);
    const listed = await listQuestions(
      world.ports(),
      office.stranger,
      office.seriesId,
      office.classId,
    );
    expect(listed.find((one) => one.id === questionId)).toMatchObject({
      state: 'clarified',
      clarification: 1,
    });
    expect(await lines('clarification-published')).toHaveLength(1);
  });

  it('against a clause that is not there, or by somebody who does not take part, is refused', async () => {
    expect(await ask('99')).toMatchObject({ failure: { faults: [{ pointer: '/clause' }] } });
    const other = await openOffice(world);
    const { act, id } = ids();
    const { seriesId, classId } = office;
    const asked = { act, id, seriesId, classId, clause: '4.4', question: 'May I?' };
    expect(await askQuestion(world.ports(), other.stranger, asked)).toMatchObject({
      failure: { name: 'absent' },
    });
    expect(await listQuestions(world.ports(), other.stranger, seriesId, classId)).toEqual([]);
  });
});

it('a clarification is published once for one act', async () => {
  const { seriesId, classId } = office;
  const asked = {
    ...ids(),
    seriesId,
    classId,
    clause: '4.1',
    question: 'Are ceramic feet flat?',
    answer: 'Yes.',
  };
  const done = await Promise.all(
    Array.from({ length: 4 }, () => publishClarification(world.ports(), office.official, asked)),
  );
  expect(new Set(done.map((one) => must(one).number)).size).toBe(1);
});
