import type { Visitor } from '../../support/browser';

/** What the journey is about; new names at every run, so that it can be walked again over the same data. */
export interface Story {
  readonly series: string;
  readonly className: string;
  readonly car: string;
  readonly engine: string;
  readonly casting: string;
  readonly newcomer: { readonly name: string; readonly email: string };
  readonly event: string;
}

export const OFFICIAL = 'Ilse Törnkvist';
export const CHIEF = 'Marit Quell';
export const INSPECTOR = 'Oona Brannick';
export const RIVAL = 'Perrin Oakhurst';
export const WITNESS = 'Fenn Ostrava';

export const DESK = { viewport: { width: 1280, height: 800 } };
export const PHONE = { viewport: { width: 390, height: 844 }, touch: true };
export const SMALL = { viewport: { width: 360, height: 740 }, touch: true };
export const TABLET = { viewport: { width: 1180, height: 820 }, touch: true };

export const newStory = (): Story => {
  const stamp = Date.now().toString(36);
  return {
    series: 'corran-valley',
    className: `Street Eight Evening ${stamp}`,
    car: '73',
    engine: `HB-${stamp}`.toUpperCase(),
    casting: '41-7799',
    newcomer: { name: 'Hale Bracken', email: `hale.bracken.${stamp}@example.org` },
    event: `Evening trial ${stamp}`,
  };
};

/** The screen as its person has it: sound for everybody, nothing sticking out, a picture kept. */
export const look = async (visitor: Visitor, name: string): Promise<void> => {
  await visitor.shot(`thread-${name}`);
  await visitor.expectNoSidewaysScroll();
  await visitor.expectAccessible();
};

/** Follows a link of a mail as its reader would, in this browser. */
export const follow = async ({ page }: Visitor, links: readonly string[]): Promise<void> => {
  const [link] = links;
  if (link === undefined) throw new Error('The mail has no link.');
  await page.goto(link);
};

/** The path of the page, for coming back to it. */
export const here = ({ page }: Visitor): string => new URL(page.url()).pathname;
