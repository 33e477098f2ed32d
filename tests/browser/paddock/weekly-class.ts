import { randomUUID } from 'node:crypto';
import type { Clause } from '@/domain/rulebook/clause';
import { limit } from '@/domain/rulebook/rule-sets/rule-set';
import { TAPPET_RULE_SET } from '@/domain/rulebook/rule-sets/tappet';
import type { Visitor } from '../../support/browser';
import { runningSeason } from '../../support/season';

const text = (number: string, subject: string, question: string): Clause => ({
  number,
  heading: question,
  words: `${question}: as it is declared.`,
  force: 'mandatory',
  penaltyRow: 'B',
  requirement: { kind: 'matches-paperwork', subject, question, per: 'engine' },
});

const photograph = (number: string, subject: string, heading: string, visible: string): Clause => ({
  number,
  heading,
  words: `A photograph shows ${visible} with a scale and the car number.`,
  force: 'mandatory',
  penaltyRow: 'B',
  requirement: { kind: 'photograph', subject, visible: [visible, 'a scale', 'the car number'] },
});

const heading = (number: string, words: string): Clause => ({
  number,
  heading: words,
  words: `${words}.`,
  force: 'text',
});

/** What a weekly class asks for: eight questions and four photographs, no sheet. */
export const WEEKLY: readonly Clause[] = [
  heading('1', 'What is declared'),
  {
    number: '1.1',
    heading: 'Tappet type',
    words: 'Tappets are solid flat tappets.',
    force: 'mandatory',
    penaltyRow: 'A',
    requirement: {
      kind: 'choice',
      subject: 'tappet-type',
      question: 'Which type are the tappets?',
      options: [
        { value: 'flat', label: 'Solid flat' },
        { value: 'roller', label: 'Solid roller' },
      ],
      allowed: ['flat'],
      per: 'engine',
    },
  },
  {
    number: '1.2',
    heading: 'Bores bushed',
    words: 'Lifter bores are not bushed.',
    force: 'mandatory',
    penaltyRow: 'A',
    requirement: {
      kind: 'yes-no',
      subject: 'bores-bushed',
      question: 'Is any lifter bore bushed?',
      required: 'no',
      per: 'engine',
    },
  },
  {
    number: '1.3',
    heading: 'Displacement',
    words: 'Displacement is at most 362.0 cubic inches.',
    force: 'mandatory',
    penaltyRow: 'A',
    requirement: limit({
      quantity: 'displacement',
      unit: 'in³',
      per: 'engine',
      max: { text: '362.0', unit: 'in³' },
    }),
  },
  text('1.4', 'block-casting-number', 'Block casting number'),
  text('1.5', 'head-casting-numbers', 'Head casting numbers'),
  text('1.6', 'serial-number', 'Serial number'),
  text('1.7', 'seal-numbers', 'Seal numbers'),
  text('1.8', 'engine-builder', 'Who built the engine'),
  heading('2', 'Photographs'),
  photograph('2.1', 'block-photograph', 'Block casting', 'the casting number of the block'),
  photograph('2.2', 'carburettor-photograph', 'Carburettor base', 'the base of the carburettor'),
  photograph('2.3', 'bores-photograph', 'Tappet bores', 'the tappet bores'),
  photograph('2.4', 'foot-photograph', 'Lifter foot', 'the foot of a lifter'),
];

/** Sends JSON as the signed-in visitor's own page would. */
export const send = async <T>(
  { page }: Visitor,
  path: string,
  body: unknown,
  method = 'POST',
): Promise<T> => {
  const answer = await page.evaluate(
    async ([to, how, what]) => {
      const response = await fetch(to ?? '', {
        method: how ?? 'POST',
        headers: { 'content-type': 'application/json' },
        body: what ?? '',
      });
      return { ok: response.ok, text: await response.text() };
    },
    [path, method, JSON.stringify(body)],
  );
  if (!answer.ok) throw new Error(`${path}: ${answer.text}`);
  return JSON.parse(answer.text) as T;
};

/** Opens a class of the demo's season and puts these rules in force. Gives the class's id. */
export const openClass = async (
  official: Visitor,
  name: string,
  clauses: readonly Clause[] = WEEKLY,
): Promise<string> => {
  const { page, open } = official;
  await open('/office/series/corran-valley');
  const season = runningSeason(page);
  await season.getByLabel(/^New class in season/).fill(name);
  await season.getByRole('button', { name: 'Add the class' }).click();
  const link = page.getByRole('link', { name, exact: true });
  const classId = ((await link.getAttribute('href')) ?? '').split('/').at(-1) ?? '';
  const content = { clauses, penalties: TAPPET_RULE_SET.penalties };
  const draft = await send<{ draftId: string }>(
    official,
    `/api/rulebooks/classes/${classId}/drafts`,
    {
      act: randomUUID(),
      id: randomUUID(),
      kind: 'edition',
      title: 'First',
      content,
    },
  );
  await send(official, `/api/rulebooks/drafts/${draft.draftId}/publish`, {
    act: randomUUID(),
    version: 1,
    inForceAt: null,
  });
  return classId;
};
