import AxeBuilder from "@axe-core/playwright";
import type { Page } from "playwright-core";

/**
 * Fails when axe finds anything serious or critical on the page as it stands.
 * Rules: axe-core's WCAG 2.2 A and AA set.
 */
export async function expectNoSeriousAxe(page: Page): Promise<void> {
  const { violations } = await new AxeBuilder({ page })
    .withTags(["wcag2a", "wcag2aa", "wcag21a", "wcag21aa", "wcag22aa"])
    .analyze();
  const serious = violations
    .filter(({ impact }) => impact === "serious" || impact === "critical")
    .map(({ id, nodes }) => `${id}: ${nodes.map((node) => node.html).join(" | ")}`);
  expect(serious).toEqual([]);
}
