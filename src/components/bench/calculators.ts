/** The open calculators, in the order of the page's list. */
export const calculators = [
  {
    slug: 'clearance',
    name: 'Clearance',
    purpose:
      'Lifter-bore clearance from bore and lifter readings, with form, drift and uncertainty.',
  },
  {
    slug: 'decision',
    name: 'Decision',
    purpose: 'A measured value and its uncertainty against a limit, by the class’s decision rule.',
  },
  {
    slug: 'uncertainty',
    name: 'Uncertainty',
    purpose: 'A budget added up line by line, with effective degrees of freedom and k.',
  },
  {
    slug: 'displacement',
    name: 'Displacement',
    purpose: 'Swept volume from bore, stroke and cylinders, rounded up where the rule says so.',
  },
  {
    slug: 'compression',
    name: 'Compression',
    purpose: 'Static compression ratio from the chamber’s parts.',
  },
  {
    slug: 'cam',
    name: 'Cam',
    purpose:
      'Durations, centrelines and overlap from valve events or a lift table; lift at the valve.',
  },
  {
    slug: 'temperature',
    name: 'Temperature',
    purpose: 'A length read warm or cold, brought to 20 °C.',
  },
  {
    slug: 'sizes',
    name: 'Springs, holes, weights',
    purpose: 'Spring rate, area of a restrictor or port, shares of the car’s weight.',
  },
] as const;

export type CalculatorSlug = (typeof calculators)[number]['slug'];

export const benchNav = (current?: CalculatorSlug) => [
  { name: 'All calculators', href: '/bench' },
  ...calculators.map(({ slug, name }) => ({
    name,
    href: `/bench/${slug}`,
    current: slug === current,
  })),
];
