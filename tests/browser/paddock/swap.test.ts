import { randomUUID } from 'node:crypto';
import pg from 'pg';
import sharp from 'sharp';
import { expect, test } from 'vitest';
import { journey, type Visitor } from '../../support/browser';
import { readProduct } from '../../support/product';
import { eventually } from '../../support/wait';
import { look, OFFICIAL, PHONE } from '../thread/story';
import { newHand } from './hand';
import { openClass, send } from './weekly-class';

const MINUTES = 60_000;
const SECONDS = { tap: 2, key: 0.4, photograph: 20 };

/** An event of this evening with one car in it. Gives the entry's id. */
const enterSwapNight = async (
  official: Visitor,
  one: (sql: string, values?: unknown[]) => Promise<string>,
  about: {
    readonly stamp: string;
    readonly classId: string;
    readonly who: string;
    readonly car: string;
  },
): Promise<string> => {
  const { stamp, classId, who, car } = about;
  const seriesId = await one("select id from public.series where slug = 'corran-valley'");
  const [eventId, entryId] = [randomUUID(), randomUUID()];
  await send(official, `/api/events/${seriesId}`, {
    act: randomUUID(),
    id: eventId,
    seasonId: await one('select season_id from public.class where id = $1', [classId]),
    slug: `swap-${stamp}`,
    name: `Swap night ${stamp}`,
    track: 'Quarrel Fen Oval',
    zone: 'America/Chicago',
    startsAt: new Date(Date.now() - 3_600_000).toISOString(),
    endsAt: new Date(Date.now() + 3 * 3_600_000).toISOString(),
    protestMinutes: 30,
  });
  const { email } = readProduct().people.find(({ name }) => name === who) ?? { email: '' };
  await send(official, `/api/events/${seriesId}/${eventId}/entries`, {
    act: randomUUID(),
    entries: [
      {
        id: entryId,
        classId,
        carNumber: car,
        competitorName: who,
        competitorEmail: email,
        engineReference: `YK-${car}`,
        position: null,
      },
    ],
  });
  return entryId;
};

test(
  'a race-night engine swap from a phone: car, engine, seal, one photograph; officials see it at once',
  async () => {
    const client = new pg.Client({ connectionString: readProduct().superuserUrl });
    await client.connect();
    const one = async (sql: string, values: unknown[] = []) =>
      Object.values((await client.query<Record<string, string>>(sql, values)).rows[0] ?? {})[0] ??
      '';
    try {
      await journey('engine swap', async ({ enter }) => {
        const stamp = Date.now().toString(36);
        const official = await enter();
        await official.signInAs(OFFICIAL);
        const spare = `S-${stamp.slice(-4)}`.toUpperCase();
        const className = `Swap Eight ${stamp}`;
        const classId = await openClass(official, className);
        // This class wants the rest in two days.
        await official.open('/office/series/corran-valley');
        await official.page
          .getByText(`Engine swaps: the rest is due in 3 days, ${className}`)
          .click();
        await official.page
          .getByLabel(`Days until the rest of the paperwork is due, ${className}`)
          .fill('2');
        await official.page
          .getByRole('button', { name: new RegExp(`^Set the days ?, ${className}$`) })
          .click();
        await official.page
          .getByText(`Engine swaps: the rest is due in 2 days, ${className}`)
          .waitFor();
        await look(official, 'swap-days');
        const entryId = await enterSwapNight(official, one, {
          stamp,
          classId,
          who: 'Ysolde Kerrigan',
          car: '61',
        });

        const competitor = await enter(PHONE);
        await competitor.signInAs('Ysolde Kerrigan');
        const { page } = competitor;
        await competitor.open('/paddock');
        const hand = newHand();
        await hand.tap(page.getByRole('link', { name: 'Swap an engine at the track' }));
        await page.locator('[data-ready="yes"]').waitFor();
        await hand.tap(page.getByLabel(new RegExp(`Swap night ${stamp}`)));
        await hand.tap(page.getByLabel('One that is not here yet'));
        await hand.type(page.getByLabel('Your name for it'), spare);
        await hand.type(page.getByLabel('Seal number'), '0418');
        const buffer = await sharp({
          create: { width: 1600, height: 1200, channels: 3, background: '#5a6a72' },
        })
          .jpeg()
          .toBuffer();
        await hand.photograph(page, page.getByLabel('Photograph: the seal and the car number'), {
          name: 'seal.jpg',
          mimeType: 'image/jpeg',
          buffer,
        });
        await look(competitor, 'swap');
        await hand.tap(page.getByRole('button', { name: 'Swap the engine of car 61' }));
        const inTwoDays = () => new Date(Date.now() + 2 * 86_400_000).toISOString().slice(0, 10);
        const earliest = inTwoDays();
        await page.getByText('The officials see it now.').waitFor();
        const due = /due by ([\d-]+)\./.exec((await page.locator('main').textContent()) ?? '')?.[1];
        expect([earliest, inTwoDays()]).toContain(due);

        await official.open('/office/paperwork');
        const row = official.page.getByRole('row', { name: new RegExp(spare) });
        await row.waitFor();
        expect(await row.textContent()).toContain('0418');
        await page.getByText('The photograph is with them.').waitFor();
        await look(competitor, 'swapped');
        await official.page.reload();
        await row.getByRole('link', { name: /See it/ }).waitFor();
        await look(official, 'swaps-to-check');
        expect(
          await eventually('the entry', () =>
            one('select engine_reference from public.entry where id = $1', [entryId]),
          ),
        ).toBe(spare);

        const [taps, keys] = [hand.taps(), hand.keys()];
        const seconds =
          taps * SECONDS.tap + keys * SECONDS.key + hand.photographs() * SECONDS.photograph;
        console.info(
          `Engine swap: ${taps} taps, ${keys} keys, ${hand.photographs()} photograph; by ${JSON.stringify(SECONDS)} s about ${Math.round(seconds)} s.`,
        );
        expect(taps).toBeLessThanOrEqual(10);
        expect(keys).toBeLessThanOrEqual(20);
        expect(seconds).toBeLessThan(90);

        await page.getByRole('link', { name: 'Go on with the rest' }).tap();
        await page.getByText(/of 8 answered/).waitFor();
        // What the swap said is filled in.
        expect(await page.locator('main').textContent()).toContain('0418');
        await competitor.open('/paddock');
        await page.getByText(/went into car 61; the rest of its paperwork is due\./).waitFor();
        const rows = page.getByRole('table', { name: 'Paperwork' }).getByRole('row');
        expect(await rows.nth(1).textContent()).toContain('Rest due by');
        expect(await rows.filter({ hasText: spare }).textContent()).toContain('Rest due by');
        await look(competitor, 'paddock-rest-due');
      });
    } finally {
      await client.end();
    }
  },
  5 * MINUTES,
);

test(
  'a photograph that waited a day on the phone is sent all the same, from the paddock, and counts for its swap',
  async () => {
    const client = new pg.Client({ connectionString: readProduct().superuserUrl });
    await client.connect();
    const one = async (sql: string, values: unknown[] = []) =>
      Object.values((await client.query<Record<string, string>>(sql, values)).rows[0] ?? {})[0] ??
      '';
    try {
      await journey('late photograph', async ({ enter }) => {
        const stamp = Date.now().toString(36);
        const official = await enter();
        await official.signInAs(OFFICIAL);
        const spare = `L-${stamp.slice(-4)}`.toUpperCase();
        const classId = await openClass(official, `Late Eight ${stamp}`);
        await enterSwapNight(official, one, { stamp, classId, who: 'Ysolde Kerrigan', car: '62' });

        const competitor = await enter(PHONE);
        await competitor.signInAs('Ysolde Kerrigan');
        const { page } = competitor;
        // The announcement gets through, the bytes do not.
        competitor.expectRefusal({ url: /uploads/, status: 'offline' });
        const store = (url: URL) => url.pathname.includes('/uploads/');
        await page
          .context()
          .route(store, (route) =>
            route.request().method() === 'PUT' ? route.abort() : route.continue(),
          );
        await competitor.open('/paddock/swap');
        await page.locator('[data-ready="yes"]').waitFor();
        await page.getByLabel(new RegExp(`Swap night ${stamp}`)).tap();
        await page.getByLabel('One that is not here yet').tap();
        await page.getByLabel('Your name for it').fill(spare);
        await page.getByLabel('Seal number').fill('0419');
        const buffer = await sharp({
          create: { width: 800, height: 600, channels: 3, background: '#6a5a72' },
        })
          .jpeg()
          .toBuffer();
        await page
          .getByLabel('Photograph: the seal and the car number')
          .setInputFiles({ name: 'seal.jpg', mimeType: 'image/jpeg', buffer });
        await Promise.all([
          page.waitForResponse((answer) => answer.url().endsWith('/files') && answer.ok()),
          page.getByRole('button', { name: 'Swap the engine of car 62' }).tap(),
        ]);
        await page.getByText('The officials see it now.').waitFor();

        await page.clock.setSystemTime(Date.now() + 26 * 3_600_000);
        await competitor.open('/paddock');
        await page.getByText(/It waited on this phone since/).waitFor();
        await look(competitor, 'late-photograph');
        await page.context().unroute(store);
        await page.reload();
        await page.getByText('The photograph is with them.').waitFor();
        await official.open('/office/paperwork');
        await official.page
          .getByRole('row', { name: new RegExp(spare) })
          .getByRole('link', { name: /See it/ })
          .waitFor();
      });
    } finally {
      await client.end();
    }
  },
  5 * MINUTES,
);
