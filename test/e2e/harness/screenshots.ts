import { mkdirSync } from "node:fs";
import path from "node:path";
import type { Page } from "playwright-core";
import { viewports, type Theme, type Viewport } from "./browser";

const folder = path.join(__dirname, "..", "..", "..", "var", "screenshots");

/** Waits until fonts are in and nothing is being fetched, so that two pictures agree. */
export async function settle(page: Page): Promise<void> {
  await page.waitForLoadState("networkidle");
  await page.evaluate(async () => {
    await document.fonts.ready;
  });
}

/**
 * Keeps pictures of the page at both sizes and in both themes in var/screenshots, named
 * <name>-<size>-<theme>.png, to be laid beside the drawings.
 */
export async function keepScreenshots(page: Page, name: string): Promise<string[]> {
  mkdirSync(folder, { recursive: true });
  const before = page.viewportSize();
  const kept: string[] = [];
  for (const size of Object.keys(viewports) as Viewport[]) {
    for (const theme of ["light", "dark"] satisfies Theme[]) {
      await page.setViewportSize(viewports[size]);
      await page.emulateMedia({ colorScheme: theme });
      await settle(page);
      const file = path.join(folder, `${name}-${size}-${theme}.png`);
      await page.screenshot({ path: file });
      kept.push(file);
    }
  }
  if (before) await page.setViewportSize(before);
  return kept;
}
