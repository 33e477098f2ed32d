import type { Locator, Page } from 'playwright-core';

/** A hand at a phone that counts what it does. */
export interface Hand {
  readonly taps: () => number;
  readonly keys: () => number;
  readonly photographs: () => number;
  readonly tap: (target: Locator) => Promise<void>;
  /** One tap into the field, then a key each letter. */
  readonly type: (target: Locator, text: string) => Promise<void>;
  /** One tap opens the camera; its shutter and "use it" are two more. */
  readonly photograph: (
    page: Page,
    target: Locator,
    picture: { readonly name: string; readonly mimeType: string; readonly buffer: Buffer },
  ) => Promise<void>;
}

export const newHand = (): Hand => {
  let taps = 0;
  let keys = 0;
  let photographs = 0;
  const tap = async (target: Locator) => {
    taps += 1;
    await target.tap();
  };
  return {
    taps: () => taps,
    keys: () => keys,
    photographs: () => photographs,
    tap,
    type: async (target, text) => {
      await tap(target);
      keys += text.length;
      await target.pressSequentially(text);
    },
    photograph: async (page, target, picture) => {
      const [chooser] = await Promise.all([page.waitForEvent('filechooser'), tap(target)]);
      taps += 2;
      photographs += 1;
      await chooser.setFiles(picture);
    },
  };
};
