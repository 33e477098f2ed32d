import pg from 'pg';
import { describe, expect, it } from 'vitest';
import { ROUTES } from '@/http/route-table';
import { journey } from '../support/browser';
import { demoParameters, pathOf } from '../support/demo-routes';
import { readProduct } from '../support/product';

/** Who stands in a room; the public is nobody. */
const PEOPLE: readonly (readonly [prefix: string, person: string | null])[] = [
  ['/paddock', 'Wren Halloway'],
  ['/barn', 'Oona Brannick'],
  ['/crib', 'Marit Quell'],
  ['/office/series/new', 'Ada Thornmere'],
  ['/office/record', 'Ada Thornmere'],
  ['/office', 'Ilse Törnkvist'],
  ['/panel', 'Tamsin Orrick'],
  ['/series/[slug]/rulebooks/[class]/ask', 'Wren Halloway'],
  ['/', null],
];

/** Public pages that may ship a script. */
const SCRIPTED = ['/verify', '/bench', '/series/[slug]/events/[event]/draw'];

/** No pages: answers for programs, downloads, and where only a redirect or an error stands. */
const isPage = (route: string): boolean =>
  !route.startsWith('/api/') &&
  !/\.(xml|pdf|json|csv|md|svg)$/.test(route) &&
  !['/404', '/500', '/enter', '/sign-out', '/sign-in/provider', '/sign-in/return'].includes(
    route,
  ) &&
  !route.includes('[token]') &&
  !route.includes('[question]');

const personOf = (route: string) =>
  PEOPLE.find(([prefix]) => route.startsWith(prefix))?.[1] ?? null;

const rooms = [...new Set(Object.keys(ROUTES).filter(isPage).map(personOf))];

describe.each(rooms)('pages of %s', (person) => {
  it.each([
    { width: 360, height: 780 },
    { width: 1280, height: 900 },
  ])(
    'are sound at $width px: accessible, within the width, no error, no foreign script',
    async (viewport) => {
      const client = new pg.Client({ connectionString: readProduct().superuserUrl });
      await client.connect();
      const parameters = await demoParameters(client).finally(() => client.end());
      await journey(
        `every page of ${person ?? 'the public'} ${viewport.width}`,
        async ({ enter }) => {
          const visitor = await enter({ viewport });
          if (person !== null) await visitor.signInAs(person);
          for (const route of Object.keys(ROUTES).filter(isPage)) {
            if (personOf(route) !== person) continue;
            await visitor.open(pathOf(route, parameters));
            await visitor.page.waitForLoadState('networkidle');
            expect([route, await visitor.page.locator('h1').count()]).toEqual([route, 1]);
            await visitor.expectNoSidewaysScroll();
            await visitor.expectAccessible();
            await visitor.shot(`${viewport.width}${route.replace(/[^a-z]+/g, '-')}`);
            const scripts = await visitor.page.locator('script').count();
            if (person === null && !SCRIPTED.includes(route))
              expect([route, scripts]).toEqual([route, 0]);
          }
        },
      );
    },
  );
});
