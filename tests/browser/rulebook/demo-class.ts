import type { Written } from './steps';

const LIMIT = 'A limit on a measured or derived quantity';

/** The demo class, every kind of requirement in it; its valve lift still lacks the datum. */
export const CLAUSES: readonly (Written & { readonly under?: string })[] = [
  { heading: 'Engine', words: 'What holds for the engine.' },
  {
    under: '1',
    heading: 'Displacement',
    words: 'Displacement is at most 362.0 cubic inches.',
    kind: LIMIT,
    fill: async (page) => {
      await page.getByLabel('Quantity').selectOption({ label: 'Displacement' });
      await page.getByRole('textbox', { name: 'At most', exact: true }).fill('362.0');
    },
  },
  { heading: 'Tappets', words: 'What holds for the tappets.' },
  {
    under: '2',
    heading: 'Type',
    words: 'Tappets are flat.',
    kind: 'A listed choice',
    fill: async (page) => {
      await page.getByLabel(/^Question/).fill('Which type are the tappets?');
      await page.getByLabel('Key', { exact: true }).first().fill('tappet-type');
      await page.getByRole('button', { name: 'Add an option' }).click();
      await page.getByLabel('Option 1', { exact: true }).fill('Flat');
      await page.getByRole('button', { name: 'Add an option' }).click();
      await page.getByLabel('Option 2', { exact: true }).fill('Roller');
      await page.getByRole('checkbox', { name: 'Flat' }).check();
    },
  },
  {
    under: '2',
    heading: 'Body size',
    words: 'The body measures 0.842 in, 0.0006 in over and 0.0004 in under.',
    kind: LIMIT,
    fill: async (page) => {
      await page.getByLabel('Which figure counts').selectOption('mean');
      await page.getByLabel('Stated as').selectOption('nominal');
      await page.getByLabel('Nominal', { exact: true }).fill('0.8420');
      await page.getByLabel('Over, at most', { exact: true }).fill('0.0006');
      await page.getByLabel('Under, at most', { exact: true }).fill('0.0004');
    },
  },
  {
    under: '2',
    heading: 'Bushed bores',
    words: 'Bores are not bushed.',
    kind: 'Yes or no',
    fill: async (page) => {
      await page.getByLabel(/^Question/).fill('Is the lifter bore bushed?');
      await page.getByLabel('Key', { exact: true }).first().fill('bore-bushed');
      await page.getByLabel('Once for').selectOption('bore');
      await page.getByLabel('The answer that complies').selectOption('no');
    },
  },
  {
    under: '2',
    heading: 'Valve lift',
    words: 'Valve lift at the retainer is at most 0.4800 in.',
    kind: LIMIT,
    fill: async (page) => {
      await page.getByLabel('Quantity').selectOption({ label: 'Valve lift' });
      await page.getByLabel('Lash', { exact: true }).fill('0.000');
      await page.getByLabel('Checking lifter').selectOption('solid');
      await page.getByRole('textbox', { name: 'At most', exact: true }).fill('0.4800');
    },
  },
  { heading: 'Evidence', words: 'What is shown and how it is checked.' },
  {
    under: '3',
    heading: 'Block casting',
    words: 'The block casting number is as declared.',
    kind: 'Must match the paperwork',
    fill: async (page) => {
      await page.getByLabel(/^Question/).fill('Which casting number has the block?');
      await page.getByRole('button', { name: 'Take which-casting-number-has-the-block' }).click();
    },
  },
  {
    under: '3',
    heading: 'Bore plug',
    words: 'A plug of 0.8450 in does not enter a lifter bore.',
    kind: 'Go or no-go gauge',
    fill: async (page) => {
      await page.getByLabel('Size', { exact: true }).fill('0.8450');
      await page.getByLabel('Where it is offered').fill('each lifter bore');
      await page.getByLabel('Once for').selectOption('bore');
      await page.getByLabel('Key', { exact: true }).fill('bore-plug');
    },
  },
  {
    under: '3',
    heading: 'Reference lifters',
    words: 'Bodies are within 0.0005 in of the mean of three reference lifters.',
    kind: 'Compared with the average of reference parts',
    fill: async (page) => {
      await page.getByLabel('Which figure counts').selectOption('mean');
      await page.getByLabel('At least how many parts').fill('3');
      await page.getByLabel('Over, at most', { exact: true }).fill('0.0005');
      await page.getByLabel('Under, at most', { exact: true }).fill('0.0005');
    },
  },
  {
    under: '3',
    heading: 'Racked lifters',
    words: 'A photograph shows the lifters racked by bore.',
    kind: 'A required photograph',
    fill: async (page) => {
      await page
        .getByLabel('What must be visible')
        .fill('the lifters racked by bore\nthe car number');
      await page.getByLabel('Key', { exact: true }).fill('lifters-racked');
    },
  },
  {
    under: '3',
    heading: 'Build sheet',
    words: 'A build sheet is handed in.',
    kind: 'A required sheet',
    fill: async (page) => {
      await page.getByLabel('Which sheet').selectOption('engine');
      await page.getByLabel('Its name').fill('Build sheet');
      await page.getByLabel('Key', { exact: true }).fill('build-sheet');
    },
  },
  {
    under: '3',
    heading: 'Seals',
    words: 'Two seals sit on the intake.',
    kind: 'Seals',
    fill: async (page) => {
      await page.getByLabel('Where they sit').fill('intake bolts');
      await page.getByLabel('How many').fill('2');
      await page.getByLabel('Key', { exact: true }).fill('intake-seals');
    },
  },
  {
    under: '3',
    heading: 'Workmanship',
    words: 'Work is done as is usual in the trade. Leans on the body size.',
    fill: async (page) => {
      await page.getByLabel('Force').selectOption('judged');
      await page.getByLabel('Row of the penalty schedule').selectOption('A');
      const refs = page.getByLabel('Leans on clauses');
      await refs.fill('2.2');
      await refs.press('Tab');
      await page.getByRole('button', { name: 'Add a definition' }).click();
      await page.getByLabel('Term', { exact: true }).fill('usual');
      await page.getByLabel('Meaning', { exact: true }).fill('what most builders do');
    },
  },
];
