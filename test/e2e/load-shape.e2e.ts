import { mkdirSync, readFileSync } from "node:fs";
import path from "node:path";
import type { Browser, Page } from "playwright-core";
import type { Loop, Point, Site } from "@shared/contracts/places";
import { expectNoSeriousAxe } from "./harness/accessibility";
import { apiAs, type Api } from "./harness/api";
import { bootApplication, type Application } from "./harness/application";
import { launch, openPage, problemsOf, viewports, type OpenOptions } from "./harness/browser";
import { importMeans } from "./harness/imports";
import { foundOrganisation, signIn } from "./harness/people";
import { settle } from "./harness/screenshots";

const scenario = path.join(__dirname, "..", "fixtures", "scenarios", "S07");
const pictures = path.join(__dirname, "..", "..", "var", "screenshots");

let application: Application;
let browser: Browser;
let api: Api;
let site: Site;
let loop: Loop;

beforeAll(async () => {
  application = await bootApplication();
  browser = await launch();
  await foundOrganisation(application);
  api = await apiAs(application, "engineer");
  const place = { name: "Quay Works", zone: "UTC", currency: "GBP" };
  site = await api.post<Site>("/sites", place);
  loop = await api.post<Loop>(`/sites/${site.id}/loops`, {
    tag: "CHW-1B",
    name: "Ropewalk House chilled water",
    service: "chilled",
  });
  const point = await api.post<Point>(`/loops/${loop.id}/points`, {
    code: "P1",
    name: "Main",
    role: "main",
    meterSide: "return",
  });
  await importMeans(api, point.id, readFileSync(path.join(scenario, "week_B.csv")));
}, 300_000);

afterAll(async () => {
  await browser?.close();
  await application?.stop();
}, 60_000);

const loadView = "?from=2025-06-09&to=2025-06-15&view=load";

async function open(options: OpenOptions, search = loadView): Promise<Page> {
  const page = await openPage(browser, options);
  // Words of the sign-in screen are English; the language is chosen from the browser afterwards.
  await signIn(page, application, "engineer");
  await page.goto(`${application.address}/loops/${loop.id}${search}`);
  await settle(page);
  return page;
}

async function keep(page: Page, name: string): Promise<void> {
  mkdirSync(pictures, { recursive: true });
  await page.screenshot({ path: path.join(pictures, `${name}.png`), fullPage: true });
}

test("the load of a week says its peak, base and means, and asks for what it does not know", async () => {
  const page = await open({ viewport: "phone" });
  await page.getByRole("tab", { name: "Load", selected: true }).waitFor();
  // Peak of the week as the second program has it: 490.93 kW, load factor 0.434973.
  await page.getByText("Load factor 0.435").first().waitFor();
  expect(await page.getByText("Give the loop a design ΔT").count()).toBe(1);
  await page.getByRole("radio", { name: "15 min" }).click();
  await page.getByText("The log writes every 1 h").waitFor();
  expect(page.url()).toContain("window=15");
  await expectNoSeriousAxe(page);
  await keep(page, "load-bare-phone-light");
  expect(problemsOf(page)).toEqual([]);
  await page.context().close();
}, 120_000);

test("a pump is given in its form, and the excess flow gets its cost", async () => {
  await api.patch(`/loops/${loop.id}`, { designDeltaTK: 6, designFlowM3PerHour: 130 });
  const page = await open({ viewport: "wide" });
  await page.getByText("Say what the pump has to lift").waitFor();
  await page.getByRole("link", { name: "Add the pump" }).click();
  await page.getByRole("radio", { name: /^Yes/ }).click();
  const fields = [
    ["Head at no flow", "8"],
    ["Head at design flow", "26"],
    ["Design flow of the pump", "130"],
    ["Efficiency", "58"],
    ["Least flow of the plant", "20"],
    ["Price of electricity", "0.187"],
  ] as const;
  for (const [label, value] of fields) await page.getByLabel(label, { exact: true }).fill(value);
  await settle(page);
  await expectNoSeriousAxe(page);
  await keep(page, "pump-form-wide-light");
  await page.getByRole("button", { name: "Save changes" }).click();
  await page.waitForURL(/view=load/);
  await page.goto(`${application.address}/loops/${loop.id}${loadView}`);
  // The second program: 41.461 % and 47.809 at 0.187.
  await page.getByText("Excess flow: 41.5 percent").waitFor({ state: "attached" });
  await page.getByText("Its cost: 47.81 GBP").waitFor({ state: "attached" });
  expect(problemsOf(page)).toEqual([]);
  await page.context().close();
}, 120_000);

test("arrow keys walk down the curve, and its table has the same points", async () => {
  const page = await open({ viewport: "wide" });
  const chart = page.getByRole("group", { name: "Duration curve, CHW-1B" });
  await chart.focus();
  await page.keyboard.press("Home");
  await page.getByText(/490\.9\skW or more for 0\sh/).waitFor({
    state: "attached",
  });
  await page.keyboard.press("End");
  await page.getByText(/or more for 168\sh \(100\s%\)/).waitFor({ state: "attached" });
  await page.getByRole("radiogroup", { name: "Show the curve as" }).getByText("Table").click();
  await page.getByRole("table", { name: /^Duration curve/ }).waitFor();
  expect(page.url()).toContain("curve=table");
  await expectNoSeriousAxe(page);
  await page.context().close();
}, 120_000);

test.each(
  (["light", "dark"] as const).flatMap((theme) =>
    (Object.keys(viewports) as (keyof typeof viewports)[]).map((size) => [theme, size] as const),
  ),
)(
  "the view is without serious faults in %s on a %s screen",
  async (theme, viewport) => {
    const page = await open({ viewport, theme });
    await page.getByText("Its cost: 47.81 GBP").waitFor({ state: "attached" });
    await page.getByRole("group", { name: "Duration curve, CHW-1B" }).focus();
    for (let step = 0; step < 30; step++) await page.keyboard.press("ArrowRight");
    await expectNoSeriousAxe(page);
    await keep(page, `load-${viewport}-${theme}`);
    const overflow = await page.evaluate(
      () => document.documentElement.scrollWidth - document.documentElement.clientWidth,
    );
    expect(overflow).toBeLessThanOrEqual(0);
    await page.context().close();
  },
  120_000,
);

test("occupied hours are set on the site, and the view stops calling them assumed", async () => {
  const page = await open({ viewport: "wide" });
  await page.getByRole("link", { name: "Set the hours" }).click();
  await page.getByRole("button", { name: "Sat", exact: true }).click();
  await page.getByLabel("To", { exact: true }).selectOption("20:30");
  await settle(page);
  await expectNoSeriousAxe(page);
  await keep(page, "site-hours-wide-light");
  await page.getByRole("button", { name: "Save changes" }).click();
  await page.waitForURL(/\/sites\/\d+$/);
  await page.goto(`${application.address}/loops/${loop.id}${loadView}`);
  await page.getByText("Occupied: Mon to Sat, 07:00 to 20:30, UTC time.").waitFor();
  expect(await page.getByText("Assumed").count()).toBe(0);
  await page.context().close();
}, 120_000);
