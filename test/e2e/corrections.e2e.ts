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

const week = path.join(__dirname, "..", "fixtures", "scenarios", "S07", "week_B.csv");
const pictures = path.join(__dirname, "..", "..", "var", "screenshots");

let application: Application;
let browser: Browser;
let api: Api;
let place: string;

/** A week of hourly means without Friday from 8 to 12 o'clock, brought in as a person would. */
async function importWeek(pointId: string): Promise<void> {
  const lines = readFileSync(week, "utf8").split(/\r?\n/);
  const kept = lines.filter((line) => !/^2025-06-13T(08|09|10|11)/.test(line));
  expect(lines.length - kept.length).toBe(4);
  await importMeans(api, pointId, Buffer.from(kept.join("\n")));
}

beforeAll(async () => {
  application = await bootApplication();
  browser = await launch();
  await foundOrganisation(application);
  api = await apiAs(application, "engineer");
  const site = await api.post<Site>("/sites", {
    name: "Quay Works",
    zone: "Europe/London",
    currency: "GBP",
  });
  const loop = await api.post<Loop>(`/sites/${site.id}/loops`, {
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
  await importWeek(point.id);
  place = `/sites/${site.id}/loops/${loop.id}/points/${point.id}/corrections`;
}, 300_000);

afterAll(async () => {
  await browser?.close();
  await application?.stop();
}, 60_000);

async function open(options: OpenOptions, search = ""): Promise<Page> {
  const page = await openPage(browser, options);
  await signIn(page, application, "engineer");
  await page.goto(`${application.address}${place}${search}`);
  await settle(page);
  return page;
}

async function keep(page: Page, name: string): Promise<void> {
  mkdirSync(pictures, { recursive: true });
  await page.screenshot({ path: path.join(pictures, `${name}.png`), fullPage: true });
}

test("a bore from the evidence is proposed, weighed, applied and withdrawn, by keyboard too", async () => {
  const page = await open(
    { viewport: "phone" },
    "?propose=scaleByBore&entered=102.26&true=102.9651",
  );
  const sheet = page.getByRole("dialog", { name: "Propose a correction" });
  await sheet.getByText("Flow × 1.0138").waitFor();
  await sheet.getByRole("button", { name: "Work out the effect" }).click();
  await sheet.getByText("This is needed.").first().waitFor();
  await sheet.getByLabel("Reason").fill("Wall measured at four places");
  await expectNoSeriousAxe(page);
  await keep(page, "correction-form-phone-light");
  await sheet.getByLabel("Reason").press("Enter");
  const card = page.getByRole("article", { name: "Correct the bore" });
  await card.getByText("Proposed", { exact: true }).first().waitFor();
  await card.getByText(/^\+477\.2\skWh \(from/).waitFor();
  await keep(page, "correction-proposed-phone-light");
  await expectNoSeriousAxe(page);
  await card.getByRole("button", { name: "Apply: Correct the bore" }).click();
  await card.getByText("Applied", { exact: true }).first().waitFor();
  await card.getByRole("button", { name: "Withdraw: Correct the bore" }).click();
  await page.getByRole("dialog").getByLabel("Reason").fill("The plate says otherwise");
  await page.getByRole("dialog").getByRole("button", { name: "Withdraw" }).click();
  await card.getByText("The plate says otherwise").waitFor();
  expect(problemsOf(page)).toEqual([]);
  await page.context().close();
}, 120_000);

test("each result stays, with its cause, and an earlier one opens with its days", async () => {
  const page = await open({ viewport: "wide" }, "?tab=results");
  const table = page.getByRole("table", { name: "Results" });
  await table.getByText("Correction withdrawn").waitFor();
  await table.getByText("Correction applied").waitFor();
  await keep(page, "results-wide-light");
  await expectNoSeriousAxe(page);
  await table
    .getByRole("row")
    .filter({ hasText: "Correction applied" })
    .getByRole("button")
    .click();
  const sheet = page.getByRole("dialog", { name: "Result" });
  await sheet.getByText(/week B\.csv \(164 rows/).waitFor();
  await sheet.getByRole("table", { name: "By day" }).waitFor();
  await expectNoSeriousAxe(page);
  await keep(page, "result-wide-light");
  expect(problemsOf(page)).toEqual([]);
  await page.context().close();
}, 120_000);

test("a gap is filled by like days, approved, and named filled", async () => {
  const page = await open({ viewport: "phone" }, "?tab=fills");
  await page.getByRole("button", { name: /^Fill Fri 13 Jun/ }).click();
  const sheet = page.getByRole("dialog", { name: "Fill a gap" });
  await sheet.getByRole("radio", { name: /^Like days/ }).click();
  await sheet.getByLabel("Reason").fill("The logger was flat");
  await expectNoSeriousAxe(page);
  await keep(page, "fill-form-phone-light");
  await sheet.getByRole("button", { name: "Propose the fill" }).click();
  await page.getByText(/10 Jun.*11 Jun.*12 Jun/).waitFor();
  await page.getByRole("button", { name: /^Approve the fill/ }).click();
  await page.getByText("Approved", { exact: true }).first().waitFor();
  await page.getByText(/^Filled, /).waitFor();
  expect(problemsOf(page)).toEqual([]);
  await page.context().close();
}, 120_000);

test.each(
  (["light", "dark"] as const).flatMap((theme) =>
    (Object.keys(viewports) as (keyof typeof viewports)[]).flatMap((size) =>
      (["corrections", "fills", "results"] as const).map((tab) => [tab, theme, size] as const),
    ),
  ),
)(
  "the tab %s is without serious faults in %s on a %s screen",
  async (tab, theme, viewport) => {
    const page = await open({ viewport, theme }, `?tab=${tab}`);
    await expectNoSeriousAxe(page);
    await keep(page, `corrections-${tab}-${viewport}-${theme}`);
    const overflow = await page.evaluate(
      () => document.documentElement.scrollWidth - document.documentElement.clientWidth,
    );
    expect(overflow).toBeLessThanOrEqual(0);
    expect(problemsOf(page)).toEqual([]);
    await page.context().close();
  },
  120_000,
);
