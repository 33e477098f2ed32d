import canonicalize from 'canonicalize';
import { describe, expect, it } from 'vitest';
import * as z from 'zod/mini';
import { bulletin, edition, rulebookFile } from '@/contracts/rulebook/edition';
import { readMoment } from '@/contracts/rulebook/moment';
import {
  readPublishable,
  readRulebookContent,
  readRulebookFile,
} from '@/contracts/rulebook/read-rulebook';
import { readRulesDocument } from '@/contracts/rulebook/rules-document';
import type { Bulletin } from '@/domain/rulebook/bulletin';
import type { Edition } from '@/domain/rulebook/edition';
import { ENGINE_RULE_SET } from '@/domain/rulebook/rule-sets/engine';
import { inches, limit } from '@/domain/rulebook/rule-sets/rule-set';
import { TAPPET_RULE_SET } from '@/domain/rulebook/rule-sets/tappet';
import { WEIGHTS_RULE_SET } from '@/domain/rulebook/rule-sets/weights';
import { findRulesInForce, rulesDocument } from '@/domain/rulebook/rules-in-force';
import type { Waiver } from '@/domain/rulebook/ruling';

const SETS = [TAPPET_RULE_SET, ENGINE_RULE_SET, WEIGHTS_RULE_SET];
const content = ({ clauses, penalties }: (typeof SETS)[number]) => ({ clauses, penalties });
const json = (value: unknown): unknown => JSON.parse(JSON.stringify(value));
const pointers = (result: ReturnType<typeof readRulebookContent>) =>
  result.ok ? [] : (result.failure.faults ?? []).map((fault) => fault.pointer);

describe('a rulebook over the wire', () => {
  it.each(SETS)('carries the $title rule set without loss', (set) => {
    const read = readPublishable(json(content(set)));
    expect(read).toEqual({ ok: true, value: content(set) });
    const file = { format: 'tagwire/rulebook', version: '1', title: set.title, ...content(set) };
    expect(readRulebookFile(json(file))).toEqual({ ok: true, value: file });
  });

  it('names every fault with its place and takes nothing by half', () => {
    const [first, ...rest] = TAPPET_RULE_SET.clauses;
    const result = readRulebookContent({
      clauses: [
        { ...first, number: '1.x', colour: 'red' },
        { ...rest[0], force: 'maybe' },
        ...rest.slice(1),
      ],
      penalties: 'none',
    });
    expect(pointers(result)).toEqual(
      expect.arrayContaining([
        '/clauses/0/number',
        '/clauses/0/colour',
        '/clauses/1/force',
        '/penalties',
      ]),
    );
  });

  it('keeps an unfinished draft and refuses to publish it', () => {
    const draft = {
      clauses: [{ number: '1', heading: '', words: '', force: 'mandatory' }],
      penalties: [],
    };
    expect(readRulebookContent(draft).ok).toBe(true);
    const refused = readPublishable(draft);
    expect(pointers(refused)).toEqual([
      '/clauses/0/heading',
      '/clauses/0/words',
      '/clauses/0/force',
    ]);
  });

  it.each([
    [{ kind: 'telepathy' }],
    [{ ...limit({ quantity: 'stroke', unit: 'in', per: 'engine', max: inches('3') }), max: 3 }],
    [{ ...limit({ quantity: 'stroke', unit: 'in', per: 'engine' }), quantity: 'mood' }],
    [
      {
        ...limit({ quantity: 'stroke', unit: 'in', per: 'engine' }),
        decisionRule: { kind: 'simple', probability: 0.9 },
      },
    ],
  ])('refuses the requirement %j', (requirement) => {
    const clause = { number: '1', heading: 'a', words: 'b', force: 'mandatory', requirement };
    expect(readRulebookContent({ clauses: [clause], penalties: [] }).ok).toBe(false);
  });

  it('has a schema to publish', () => {
    const schema = z.toJSONSchema(rulebookFile, { io: 'input' });
    expect(schema).toMatchObject({
      type: 'object',
      required: ['format', 'version', 'title', 'clauses', 'penalties'],
    });
  });
});

describe('what is stored', () => {
  const published: Edition = {
    id: 'e1',
    className: 'Street Stock',
    season: '2026',
    number: 12,
    clauses: [...TAPPET_RULE_SET.clauses],
    penalties: TAPPET_RULE_SET.penalties,
    inForceAt: '2026-03-01T06:00:00.000Z',
  };
  const amended: Bulletin = {
    id: 'b3',
    number: 3,
    season: '2026',
    edition: 12,
    title: 'Weights of lifters',
    reason: 'Asked by competitors',
    effective: { kind: 'safety' },
    publishedAt: '2026-04-01T00:00:00.000Z',
    changes: [
      {
        kind: 'add',
        clause: {
          number: '4.7',
          heading: 'Weight',
          words: 'Average of three.',
          force: 'mandatory',
          requirement: {
            kind: 'reference-average',
            quantity: 'lifter-weight',
            unit: 'g',
            per: 'lifter',
            n: 3,
            plus: { text: '1.0', unit: 'g' },
            minus: { text: '1.0', unit: 'g' },
            decisionRule: { kind: 'guarded-rejection', probability: 0.95 },
            comparison: { method: 'rounded', decimals: -1 },
          },
        },
      },
      {
        kind: 'add',
        clause: {
          number: '4.8',
          heading: 'Stroke',
          words: 'At most.',
          force: 'mandatory',
          requirement: limit({
            quantity: 'lifter-weight',
            unit: 'g',
            per: 'lifter',
            max: { text: '90.0', unit: 'g' },
            sample: { kind: 'some', count: 4 },
            twoSets: 'each',
          }),
        },
      },
    ],
  };
  const waiver: Waiver = {
    id: 'w1',
    number: 1,
    season: '2026',
    clause: '4.4',
    for: { kind: 'car', carNumber: '12J' },
    words: 'w',
    reason: 'r',
    fromAt: '2026-03-01T06:00:00.000Z',
    untilAt: '2027-03-01T06:00:00.000Z',
  };

  it('reads back as it was published', () => {
    expect(edition.parse(json(published))).toEqual(published);
    expect(bulletin.parse(json(amended))).toEqual(amended);
  });

  it('comes back from the canonical document, in which every number is text, to the same document', () => {
    const rules = findRulesInForce({
      editions: [published],
      bulletins: [amended],
      clarifications: [],
      waivers: [waiver],
      eventStartsAt: [],
      at: '2026-05-01T00:00:00.000Z',
    });
    if (rules === undefined) throw new Error('no rules');
    const text = canonicalize(rulesDocument(rules)) ?? '';
    const back = readRulesDocument(JSON.parse(text));
    expect(back).toEqual({ ok: true, value: rules });
    if (back.ok) expect(canonicalize(rulesDocument(back.value))).toBe(text);
  });

  it('is refused when it is something else', () => {
    expect(readRulesDocument({ document: 'tagwire/report' }).ok).toBe(false);
    expect(edition.safeParse({ ...published, inForceAt: '2026-03-01' }).success).toBe(false);
    expect(
      edition.safeParse({ ...published, inForceAt: '2026-03-01T06:00:00.000-06:00' }).success,
    ).toBe(false);
  });
});

describe('a moment as a person writes it', () => {
  it.each([
    ['2026-07-01', '2026-07-01T05:00:00.000Z'],
    ['2026-07-01T18:00', '2026-07-01T23:00:00.000Z'],
    ['2026-06-30T23:59:59', '2026-07-01T04:59:59.000Z'],
    // Twice that night: the later one, unless the instant itself is written.
    ['2026-11-01T01:30:00', '2026-11-01T07:30:00.000Z'],
    ['2026-11-01T06:30:00.000Z', '2026-11-01T06:30:00.000Z'],
    ['2026-03-08T02:30', '2026-03-08T08:30:00.000Z'],
  ])('%s', (written, utc) => {
    expect(readMoment(written, 'America/Chicago')?.toISOString()).toBe(utc);
  });

  it.each([
    '2026-02-30',
    '2026-07-01T24:00',
    '2026-07-01T18:60',
    '2026-07-01T18:00:60',
    '2026-13-01T00:00:00.000Z',
    '1 July',
    '',
  ])('"%s" is none', (written) => {
    expect(readMoment(written, 'America/Chicago')).toBeUndefined();
  });
});
