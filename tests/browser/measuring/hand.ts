import type { Page } from 'playwright-core';
import type { Visitor } from '../../support/browser';

/** A hand at the keyboard and on the glass, which counts what it does. */
export class Hand {
  keys = 0;
  taps = 0;
  /** Keys of readings alone, Enter included. */
  readonly perReading: number[] = [];

  constructor(readonly page: Page) {}

  async press(...keys: readonly string[]): Promise<void> {
    for (const key of keys) {
      await this.page.keyboard.press(key);
      this.keys += 1;
    }
  }

  /** One number and Enter. */
  async read(digits: string): Promise<void> {
    const keys = [...digits, 'Enter'];
    await this.press(...keys);
    this.perReading.push(keys.length);
  }

  async tap(name: string | RegExp): Promise<void> {
    const exact = typeof name === 'string';
    await this.page.getByRole('button', { name, exact }).filter({ visible: true }).click();
    this.taps += 1;
  }

  report(title: string): void {
    const readings = this.perReading.length;
    const sum = this.perReading.reduce((a, b) => a + b, 0);
    console.log(
      `${title}: ${readings} readings, ${this.keys} keys (${sum} for the readings, at most ${Math.max(0, ...this.perReading)} each), ${this.taps} taps`,
    );
  }
}

/** Everything on this device has been acknowledged. */
export const allSent = async ({ page }: Visitor): Promise<void> => {
  await page.locator('.saved-line', { hasText: /^Sent/ }).waitFor();
};
