import { readFileSync } from "node:fs";
import path from "node:path";
import type { Browser } from "playwright-core";
import type { Loop, Point, Site } from "@shared/contracts/places";
import { expectNoSeriousAxe } from "./harness/accessibility";
import { apiAs, type Api } from "./harness/api";
import { bootApplication, type Application } from "./harness/application";
import { launch, openPage, problemsOf, type Viewport } from "./harness/browser";
import { foundOrganisation, signIn } from "./harness/people";
import { keepScreenshots } from "./harness/screenshots";

let application: Application;
let browser: Browser;
let api: Api;
let site: Site;

const autumn = readFileSync(path.join(__dirname, "../fixtures/scenarios/S06/autumn.csv"));

beforeAll(async () => {
  application = await bootApplication();
  await foundOrganisation(application);
  browser = await launch();
  api = await apiAs(application, "engineer");
  site = await api.post<Site>("/sites", {
    name: "Ostrel Yard",
    zone: "Europe/Paris",
    currency: "EUR",
  });
}, 180_000);

afterAll(async () => {
  await browser?.close();
  await application?.stop();
}, 60_000);

async function newPoint(tag: string): Promise<{ loop: Loop; point: Point }> {
  const loop = await api.post<Loop>(`/sites/${site.id}/loops`, {
    tag,
    name: "Heating",
    service: "hot",
  });
  const point = await api.post<Point>(`/loops/${loop.id}/points`, {
    code: `${tag}-P1`,
    name: "Main",
    role: "main",
    meterSide: "return",
  });
  return { loop, point };
}

const patience = { timeout: 60_000 };
const sizes: readonly (readonly [Viewport, string])[] = [
  ["phone", "HW-1"],
  ["wide", "HW-2"],
];

it.each(sizes)(
  "a meter's autumn day of interval means is imported at %s size with every quarter-hour",
  async (viewport, tag) => {
    const { loop } = await newPoint(tag);
    const page = await openPage(browser, { viewport });
    await signIn(page, application, "surveyor");
    const button = (name: string | RegExp) => page.getByRole("button", { name });
    await page.goto(`${application.address}/logs`);
    await page.getByRole("link", { name: "Import a log" }).first().click();
    await page.getByLabel("Loop", { exact: true }).selectOption({ label: `${tag} Heating` });
    await button("Next: file").click();
    const input = page.locator("input[type=file]");
    await input.waitFor({ state: "attached" });
    await input.setInputFiles([{ name: "autumn.csv", mimeType: "text/csv", buffer: autumn }]);
    await page.getByText("Semicolon").first().waitFor(patience);
    await button("Next: columns and units").click();

    const asked = page.getByRole("heading", { name: "Means of which step?" });
    await asked.waitFor();
    // One group asks; the usual one below it comes with the answer.
    const question = page.getByRole("radiogroup", { name: "What does each row hold?" });
    await expectNoSeriousAxe(page);
    await keepScreenshots(page, `meter-columns-asking-${viewport}`);
    await question.getByRole("radio", { name: /^The mean of the step that starts then/ }).click();
    await asked.waitFor({ state: "detached" });
    await keepScreenshots(page, `meter-columns-${viewport}`);
    await button("Next: time").click();
    const local = page.getByRole("radio", { name: /^Paris local time/ });
    await local.click();
    await page.waitForFunction(
      (element) => element?.getAttribute("aria-checked") === "true",
      await local.elementHandle(),
    );
    await button("Next: checks").click();
    const confirm = button("Import 100 rows");
    await confirm.waitFor(patience);
    await expectNoSeriousAxe(page);
    await keepScreenshots(page, `meter-checks-${viewport}`);
    await confirm.click();
    await page.getByRole("heading", { name: new RegExp(`rows are in ${tag}`) }).waitFor(patience);
    await expectNoSeriousAxe(page);
    await keepScreenshots(page, `meter-result-${viewport}`);
    const main = page.getByRole("main");
    expect(await main.innerText()).toMatch(/4[.,]211/);

    await page.goto(`${application.address}/loops/${loop.id}?from=2025-10-26&to=2025-10-26`);
    await page.getByText("Not part of a meter’s power").first().waitFor(patience);
    await expectNoSeriousAxe(page);
    await keepScreenshots(page, `meter-loop-${viewport}`);
    await page.getByRole("heading", { name: "Power of the meter" }).waitFor();
    expect(problemsOf(page)).toEqual([]);
    await page.context().close();
  },
  180_000,
);
