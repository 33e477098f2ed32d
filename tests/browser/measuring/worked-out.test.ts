import { randomBytes } from 'node:crypto';
import { beforeAll, expect, test } from 'vitest';
import { ENGINE_RULE_SET } from '@/domain/rulebook/rule-sets/engine';
import { inches, limit } from '@/domain/rulebook/rule-sets/rule-set';
import { TAPPET_RULE_SET } from '@/domain/rulebook/rule-sets/tappet';
import { journey, type Visitor } from '../../support/browser';
import { addGauge, keptOf, openEngine, openSheet, sheetReady } from './engine';
import { allSent, Hand } from './hand';

const MINUTES = 60_000;
const LANDSCAPE = { viewport: { width: 1180, height: 820 }, touch: true };
const PORTRAIT = { viewport: { width: 820, height: 1180 }, touch: true };

/** Codes of this run alone: the demo's register is everybody's. */
const tag = randomBytes(2).toString('hex').toUpperCase();
const certificate = (text: string, unit: string) => ({
  number: `C-${tag}`,
  expandedUncertainty: { text, unit },
  coverageFactor: '2',
});

beforeAll(async () => {
  await addGauge(`ZB-${tag}`, {
    kind: 'other',
    name: 'Burette, 100 cc',
    division: { text: '0.1', unit: 'cc' },
    certificate: certificate('0.1', 'cc'),
  });
  await addGauge(`ZR-${tag}`, {
    kind: 'other',
    name: 'Rocker stand',
    division: { text: '0.001', unit: '1' },
    certificate: certificate('0.002', '1'),
  });
  await addGauge(`ZW-${tag}`, {
    kind: 'scale',
    name: 'Bench scale',
    division: { text: '0.1', unit: 'g' },
    certificate: certificate('0.1', 'g'),
  });
});

const bore = ({ page }: Visitor, name: string) =>
  page
    .getByRole('button', { name: new RegExp(`^${name},`) })
    .filter({ visible: true })
    .first();

/** Goes to a part that has no button of its own, and reads one number there, written with its point. */
const readPart = async (visitor: Visitor, hand: Hand, part: string, text: string) => {
  const { page } = visitor;
  await page.getByLabel('What else is read').selectOption(part);
  await page.locator('.cells').waitFor();
  await hand.read(text);
  await page.locator('.cells', { hasText: text.replace('-', '−') }).waitFor();
};

const gaugeFor = async (visitor: Visitor, hand: Hand, part: string, code: string) => {
  const { page } = visitor;
  await page.getByLabel('What else is read').selectOption(part);
  await hand.tap('More');
  await hand.tap(/^Set up/);
  const choice = page.locator('#own-gauge');
  await choice.selectOption({
    label: (await choice.locator('option', { hasText: code }).textContent()) ?? '',
  });
  await hand.tap('Back');
  await hand.tap('Back');
};

const findings = async (visitor: Visitor, id: string) => {
  await allSent(visitor);
  await visitor.open(`/barn/inspections/${id}`);
};

test('a compression ratio is worked out from seven numbers read on the sheet', {
  timeout: 5 * MINUTES,
}, async () => {
  const clauses = ENGINE_RULE_SET.clauses.flatMap((clause) =>
    clause.number === '3.2' && clause.requirement?.kind === 'limit'
      ? [
          {
            ...clause,
            requirement: {
              ...clause.requirement,
              sample: { kind: 'some' as const, count: 1 },
              fitRatio: '0',
            },
          },
        ]
      : [],
  );
  const { id, path } = await openEngine(clauses);
  await journey('compression ratio', async ({ enter }) => {
    const visitor = await enter(LANDSCAPE);
    await openSheet(visitor, path);
    const hand = new Hand(visitor.page);
    await bore(visitor, '1 exhaust').click();
    await gaugeFor(visitor, hand, 'chamber-volume', `ZB-${tag}`);
    await gaugeFor(visitor, hand, 'piston-volume', `ZB-${tag}`);
    const read = {
      'cylinder-bore': '4.0000',
      stroke: '3.4800',
      'chamber-volume': '64.0',
      'piston-volume': '5.0',
      'deck-clearance': '0.0100',
      'gasket-bore': '4.1000',
      'gasket-thickness': '0.0400',
    };
    for (const [part, text] of Object.entries(read)) {
      await bore(visitor, '1 exhaust').click();
      await readPart(visitor, hand, part, text);
    }
    await visitor.shot('compression-ratio');
    await findings(visitor, id);
    // By hand: (swept + clearance) ÷ clearance, an inch being 2.54 cm.
    const disc = (diameter: number, height: number) =>
      (Math.PI / 4) * diameter ** 2 * height * 2.54 ** 3;
    const clearance = 64 + 5 + disc(4, 0.01) + disc(4.1, 0.04);
    const ratio = (disc(4, 3.48) + clearance) / clearance;
    expect(ratio.toFixed(2)).toBe('9.99');
    const { page } = visitor;
    await page.getByText(new RegExp(`Cylinder 1: ${ratio.toFixed(2)}\\d* ± .*: within`)).waitFor();
    expect((await keptOf(id)).readings).toHaveLength(7);
    await visitor.shot('compression-ratio-report');
    await visitor.expectAccessible();
  });
});

test('a valve lift is worked out from lobe lift and rocker ratio, less the lash of the rule', {
  timeout: 4 * MINUTES,
}, async () => {
  const clause = {
    number: '3.6',
    heading: 'Valve lift',
    words: 'Valve lift at the retainer, at a lash of 0.010 in, is at most 0.4500 in.',
    force: 'mandatory' as const,
    requirement: limit({
      quantity: 'valve-lift',
      unit: 'in',
      per: 'bore',
      datum: 'at the retainer',
      lash: inches('0.010'),
      checkingLifter: 'solid',
      max: inches('0.4500'),
      sample: { kind: 'some', count: 1 },
    }),
  };
  const { id, path } = await openEngine([clause]);
  await journey('valve lift', async ({ enter }) => {
    const visitor = await enter(PORTRAIT);
    await openSheet(visitor, path);
    const hand = new Hand(visitor.page);
    await bore(visitor, '1 exhaust').click();
    await gaugeFor(visitor, hand, 'rocker-ratio', `ZR-${tag}`);
    await readPart(visitor, hand, 'lobe-lift', '0.3100');
    await bore(visitor, '1 exhaust').click();
    await readPart(visitor, hand, 'rocker-ratio', '1.500');
    await findings(visitor, id);
    // 0.3100 × 1.500 − 0.010 = 0.4550.
    const { page } = visitor;
    await page.getByText(/Bore 1 exhaust: 0\.4550* in ± .*at most 0\.4500 in.*: outside/).waitFor();
    expect((await keptOf(id)).readings.map(({ quantity }) => quantity)).toEqual([
      'lobe-lift',
      'rocker-ratio',
    ]);
  });
});

test('parts are held against the mean of reference parts that were read on their own sheet', {
  timeout: 4 * MINUTES,
}, async () => {
  const clause = {
    number: '3.7',
    heading: 'Lifter weight',
    words: 'A lifter weighs as three reference lifters do on average, not more than 1.0 g off.',
    force: 'mandatory' as const,
    requirement: {
      kind: 'reference-average' as const,
      quantity: 'lifter-weight' as const,
      unit: 'g',
      per: 'lifter' as const,
      n: 3,
      plus: { text: '1.0', unit: 'g' },
      minus: { text: '1.0', unit: 'g' },
      decisionRule: { kind: 'guarded-rejection' as const },
      comparison: { method: 'absolute' as const },
    },
  };
  const { id, path } = await openEngine([clause]);
  await journey('reference parts', async ({ enter }) => {
    const visitor = await enter(LANDSCAPE);
    await openSheet(visitor, path);
    const { page } = visitor;
    const hand = new Hand(page);
    await bore(visitor, '1 exhaust').click();
    await gaugeFor(visitor, hand, 'lifter-weight', `ZW-${tag}`);
    await page.getByLabel('What else is read').selectOption('reference lifter-weight');
    for (const text of ['90.1', '90.2', '90.3']) {
      await hand.read(text);
      await page.locator('.cells', { hasText: text }).waitFor();
    }
    await visitor.shot('reference-parts');
    await visitor.expectAccessible();
    for (const [name, text] of [
      ['1 exhaust', '90.4'],
      ['3 exhaust', '91.9'],
    ] as const) {
      await page.getByLabel('What else is read').selectOption('lifter-weight');
      await bore(visitor, name).click();
      await hand.read(text);
      await bore(visitor, name).click();
      await page.locator('.cells', { hasText: text }).waitFor();
    }
    await findings(visitor, id);
    await page.getByText('Numbers, each with its uncertainty').waitFor();
    const sentence = page.getByText(/of 16 outside/);
    await sentence.first().waitFor();
    const kept = await keptOf(id);
    expect(kept.readings.map(({ value }) => value)).toEqual([
      '90.1',
      '90.2',
      '90.3',
      '90.4',
      '91.9',
    ]);
    const source = (await page.locator('main').textContent()) ?? '';
    expect(source).toContain('1 of 16 outside');
    expect(source).toContain('1 of 16 within');
    expect(source).toMatch(/Bore 3 exhaust: 91\.9\d* g ± .*mean of 3 reference parts: outside/);
    await visitor.shot('reference-parts-report');
  });
});

test('a hot block is held, and its bores are read again once it has settled', {
  timeout: 5 * MINUTES,
}, async () => {
  const { id, path } = await openEngine(
    TAPPET_RULE_SET.clauses.flatMap((clause) =>
      clause.number === '4.6' ? [{ ...clause, force: 'mandatory' as const }] : [],
    ),
  );
  await journey('hot block', async ({ enter }) => {
    const visitor = await enter(LANDSCAPE);
    await openSheet(visitor, path);
    const { page } = visitor;
    const hand = new Hand(page);
    const warm = async (block: string) => {
      await hand.tap('More');
      await hand.tap(/^Set up/);
      await page.getByLabel('How much').selectOption('full');
      await page.getByLabel('Block, with its unit').fill(block);
      await page.getByLabel('Lifters', { exact: true }).fill('20 °C');
      await page.getByLabel('Lifters', { exact: true }).blur();
      await hand.tap('Back');
      await hand.tap('Back');
    };
    await bore(visitor, '1 exhaust').click();
    await warm('61 °C');
    await page.getByRole('button', { name: 'Lifter', exact: true }).click();
    for (let cell = 0; cell < 4; cell += 1) await hand.read('8423');
    await bore(visitor, '1 exhaust').click();
    await page.getByRole('button', { name: 'Bore', exact: true }).click();
    await hand.press('0', 'Enter');
    for (const digits of ['2', '1', '2', '1']) await hand.read(digits);
    await page.getByRole('button', { name: 'Take the closing zero' }).click();
    await hand.press('0', 'Enter');
    await page.getByText('The zero held').waitFor();
    await hand.press('Enter');
    await bore(visitor, '1 exhaust').click();
    const advice = page.getByText(
      /hold the parts and measure again|Hold the parts and measure again/,
    );
    await advice.first().waitFor();
    await visitor.shot('hot-block');
    await allSent(visitor);

    // Held, by an act with its reason; the sheet says so by itself.
    const other = await enter(PORTRAIT);
    await openSheet(other, path);
    await visitor.open(`/barn/inspections/${id}`);
    await page.getByText('Hold, stop, put off, refused').click();
    await page.getByLabel('Why, in words').fill('The block is at 61 °C.');
    await page.getByRole('button', { name: 'Hold: parts are hot' }).click();
    await page
      .getByText(/^held until parts have settled/i)
      .first()
      .waitFor();
    const held = other.page.locator('.bar-cell', { hasText: '2, held' });
    await held.waitFor();
    await other.shot('held-on-the-sheet');
    await page.getByRole('button', { name: 'Take it up again' }).click();
    await held.waitFor({ state: 'detached' });

    await visitor.open(path);
    await sheetReady(page);
    await bore(visitor, '1 exhaust').click();
    await page.getByRole('button', { name: 'Bore', exact: true }).click();
    await warm('22 °C');
    await hand.tap('More');
    await hand.tap('Settled: read 1 hot bore again');
    await page.getByRole('button', { name: 'Enter opening zero' }).waitFor();
    await hand.press('0', 'Enter');
    for (const digits of ['-2', '-1', '-2', '-1']) await hand.read(digits);
    await page.getByRole('button', { name: 'Take the closing zero' }).click();
    await hand.press('0', 'Enter');
    await page.getByText('The zero held').waitFor();
    await hand.press('Enter');
    await bore(visitor, '1 exhaust').click();
    await page.getByText('What the uncertainty is made of').first().waitFor();
    expect(await advice.count()).toBe(0);
    await allSent(visitor);
    const kept = await keptOf(id);
    expect(kept.remarks).toEqual({ strike: 4 });
    expect(kept.readings.every(({ standing }) => standing === 'accepted')).toBe(true);
    await visitor.open(`/barn/inspections/${id}`);
    await page.getByText('All of them, in taking order').click();
    expect(await page.getByRole('row', { name: /struck: part hot, not settled/i }).count()).toBe(4);
  });
});
