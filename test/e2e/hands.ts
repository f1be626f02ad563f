import type { Locator, Page } from "playwright-core";

/** How somebody works a screen: with a pointer or finger, or with the keyboard alone. */
export interface Hands {
  /** Presses a button or follows a link. */
  press(target: Locator): Promise<void>;
  /** Picks one of a group of radio tiles. */
  pick(target: Locator): Promise<void>;
  /** Chooses from a list by the words of the option. */
  choose(list: Locator, words: string): Promise<void>;
}

/** A mouse or a finger. */
export function pointerOn(): Hands {
  return {
    press: (target) => target.click(),
    pick: (target) => target.click(),
    async choose(list, words) {
      await list.selectOption({ label: words });
    },
  };
}

/** More stops than any screen has: past these, the target is out of the keyboard's reach. */
const mostStops = 200;

/** Tab, Space, Enter, arrows and letters; fails where the Tab key never reaches the target. */
export function keyboardOn(page: Page): Hands {
  const isFocused = (target: Locator) =>
    target.evaluate((element) => element === document.activeElement);

  async function tabTo(target: Locator): Promise<void> {
    await target.waitFor();
    for (let stop = 0; stop < mostStops; stop++) {
      if (await isFocused(target)) return;
      await page.keyboard.press("Tab");
    }
    throw new Error(`Tab does not reach ${String(target)}`);
  }

  return {
    async press(target) {
      await tabTo(target);
      await page.keyboard.press("Enter");
    },
    async pick(target) {
      const group = target.locator("xpath=ancestor::*[@role='radiogroup'][1]");
      await tabTo(group.locator("[role=radio][tabindex='0']"));
      for (let step = 0; step < 8 && !(await isFocused(target)); step++)
        await page.keyboard.press("ArrowDown");
      if ((await target.getAttribute("aria-checked")) !== "true")
        await page.keyboard.press("Space");
    },
    async choose(list, words) {
      await tabTo(list);
      const option = list.locator("option").filter({ hasText: words });
      const place = await option.evaluate((found) => (found as HTMLOptionElement).index);
      for (let step = 0; step < place; step++) await page.keyboard.press("ArrowDown");
    },
  };
}
