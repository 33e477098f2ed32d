import type { Locator, Page } from 'playwright-core';

/** The demo's own season on the page of seasons and classes, whatever seasons other journeys opened. */
export const runningSeason = (page: Page): Locator =>
  page.locator('section', { has: page.getByRole('heading', { name: /^Season \d{4}$/ }) });
