import { mkdirSync } from "node:fs";
import path from "node:path";
import type { Browser, Page } from "playwright-core";
import type { MeterComparison } from "@shared/contracts/meter-comparisons";
import type { Role } from "@shared/contracts/people";
import type { Loop, Site } from "@shared/contracts/places";
import { meterComparisonBody as s04 } from "@server/testing/comparison-factories";
import { keyboardOn } from "./hands";
import { expectNoSeriousAxe } from "./harness/accessibility";
import { apiAs, type Api } from "./harness/api";
import { bootApplication, type Application } from "./harness/application";
import { launch, openPage, problemsOf, viewports, type OpenOptions } from "./harness/browser";
import { foundOrganisation, signIn } from "./harness/people";
import { settle } from "./harness/screenshots";

const pictures = path.join(__dirname, "..", "..", "var", "screenshots");

let application: Application;
let browser: Browser;
let api: Api;
let site: Site;

beforeAll(async () => {
  application = await bootApplication();
  browser = await launch();
  await foundOrganisation(application);
  api = await apiAs(application, "engineer");
  site = await api.post<Site>("/sites", {
    name: "Ostrel Yard",
    zone: "Europe/Paris",
    currency: "EUR",
  });
  const loop = await api.post<Loop>(`/sites/${site.id}/loops`, {
    tag: "CHW-1",
    name: "Chilled water",
    service: "chilled",
  });
  await api.post(`/loops/${loop.id}/points`, {
    code: "P1",
    name: "Main",
    role: "main",
    meterSide: "return",
  });
}, 300_000);

afterAll(async () => {
  await browser?.close();
  await application?.stop();
}, 60_000);

async function open(to: string, options: OpenOptions = {}, role: Role = "engineer"): Promise<Page> {
  const page = await openPage(browser, options);
  await signIn(page, application, role);
  await page.goto(`${application.address}${to}`);
  await settle(page);
  return page;
}

async function keep(page: Page, name: string): Promise<void> {
  mkdirSync(pictures, { recursive: true });
  await page.screenshot({ path: path.join(pictures, `${name}.png`), fullPage: true });
}

async function fill(page: Page, fields: readonly (readonly [label: string, text: string])[]) {
  for (const [label, text] of fields) await page.getByLabel(label, { exact: true }).fill(text);
}

const group = (page: Page, name: string) => page.getByRole("group", { name, exact: true });

/** S04 typed in by hand: the portable as an energy, the permanent meter as register reads. */
async function typeS04(page: Page): Promise<void> {
  await fill(page, [
    ["Name", s04.title],
    ["From, day", s04.from],
    ["To, day", s04.to],
  ]);
  const first = group(page, "Meter in question");
  await first.getByRole("radio", { name: /^Typed energy/ }).click();
  await first.getByLabel("What it is of").fill("Portable");
  await first.getByLabel("Energy", { exact: true }).fill("2511.6");
  await first.getByLabel("± of energy (k = 2)").fill("5.6");
  const second = group(page, "Compared with");
  await second.getByLabel("Serial").fill("HM-2041");
  await second.getByLabel("Energy register: Opening read").fill("184632");
  await second.getByLabel("Energy register: Closing read").fill("187059");
  await second.getByLabel("Class", { exact: true }).selectOption("2");
  await second.getByLabel("Mean flow, of permanent flow").fill("0.42");
  await second.getByLabel("Mean ΔT", { exact: true }).fill("18.4");
}

test("S04 is typed on a phone: the verdict comes as one types, turns, and the outage is kept apart", async () => {
  const page = await open("/compare", { viewport: "phone" });
  await page.getByText("No meters compared yet").waitFor();
  await expectNoSeriousAxe(page);
  await keep(page, "compare-empty-phone-light");
  await page.getByRole("link", { name: "Compare two meters" }).click();
  const result = page.getByRole("region", { name: "Result" });
  await result.getByText("– the period").waitFor();
  await typeS04(page);
  await result.getByText("They agree within what each claims").waitFor();
  await result.getByText("0.48", { exact: true }).waitFor();
  await result.getByText("3.49 % of HM-2041").waitFor();
  await result.getByText("Class 2, at 0.42 of the permanent flow and 18.4 K").waitFor();
  for (const limit of ["± 2.05 %", "± 0.99 %", "± 0.66 %", "± 3.70 %"])
    await result.getByText(limit.replace(/ /g, "\u00A0")).waitFor();
  expect(await result.getByText("±\u00A04.27\u00A0%").count()).toBe(2);

  const energy = group(page, "Meter in question").getByLabel("Energy", { exact: true });
  await energy.fill("2781.0");
  await result.getByText("They do not agree: find out why before using either").waitFor();
  await result.getByText("1.89", { exact: true }).waitFor();
  await energy.fill("2511.6");
  await result.getByText("They agree within what each claims").waitFor();

  await page
    .getByRole("checkbox", { name: "The portable stood in while a meter was away" })
    .click();
  await fill(page, [
    ["Outage", "80"],
    ["Covered by the portable", "61.25"],
    ["Energy the portable measured", "2093.7"],
    ["Degree-hours covered", "820.5"],
    ["Degree-hours missing", "251"],
  ]);
  await result.getByText("23.4 % of it is estimated.").waitFor();
  await result.getByText("Substituted (portable)").waitFor();
  await result.getByText("Estimated (degree-hour)").waitFor();
  await result
    .getByText(/^640\.5/)
    .first()
    .waitFor({ state: "attached" });
  await result.getByText("Nobody has agreed yet that substituted energy may be billed.").waitFor();
  await settle(page);
  await keep(page, "compare-form-phone-light");
  // The whole form at once: pinned buttons lie over nothing that axe would then call too small.
  await page.setViewportSize({ width: viewports.phone.width, height: 5000 });
  await expectNoSeriousAxe(page);
  await page.setViewportSize(viewports.phone);

  await page.getByRole("button", { name: "Save comparison" }).click();
  await page.waitForURL(/\/compare\/meters\/\d+$/);
  await page.getByText("They agree within what each claims").waitFor();
  expect(problemsOf(page)).toEqual([]);
  await page.context().close();
}, 180_000);

test("a register that fell is refused in words, and taken once its digits are given", async () => {
  const page = await open("/compare/meters/new", { viewport: "wide" });
  await typeS04(page);
  const second = group(page, "Compared with");
  await second.getByLabel("Energy register: Opening read").fill("99640");
  await second.getByLabel("Energy register: Closing read").fill("2067");
  const result = page.getByRole("region", { name: "Result" });
  await result.getByText("The closing read is below the opening one.").waitFor();
  await second.getByRole("checkbox", { name: "It passed its highest read in between" }).click();
  await second.getByText("Give the digits before the decimal mark.").waitFor();
  await second.getByLabel("Energy register: Digits before the decimal mark").fill("5");
  await result.getByText("They agree within what each claims").waitFor();
  await result.getByText("A register was taken to have rolled over once, as stated.").waitFor();
  await expectNoSeriousAxe(page);
  await keep(page, "compare-form-wide-light");
  const first = group(page, "Meter in question");
  await first.getByRole("radio", { name: /^Metering point/ }).click();
  await first.getByLabel("Metering point", { exact: true }).selectOption({
    label: "CHW-1, P1 Main",
  });
  await first.getByText("This point has no energy in the period.").waitFor();
  expect(await first.getByRole("radio", { name: /^Evidence of the point/ }).isChecked()).toBe(true);
  await page.context().close();
}, 120_000);

test("the keyboard alone opens a comparison and withdraws it with a reason", async () => {
  const saved = await api.post<MeterComparison>(`/sites/${site.id}/meter-comparisons`, {
    ...s04,
    title: "To be withdrawn",
  });
  const page = await open("/compare");
  const hands = keyboardOn(page);
  await hands.press(page.getByRole("link", { name: "To be withdrawn" }));
  await page.waitForURL(new RegExp(`/compare/meters/${saved.id}$`));
  await hands.press(page.getByRole("button", { name: "Withdraw" }));
  const dialog = page.getByRole("dialog", { name: "Withdraw" });
  await dialog.getByLabel("Reason").fill("Reads of another meter");
  await hands.press(dialog.getByRole("button", { name: "Withdraw" }));
  await page.getByText("Reads of another meter").waitFor();
  expect(await page.getByRole("button", { name: "Withdraw" }).count()).toBe(0);
  await page.goto(`${application.address}/compare`);
  await settle(page);
  expect(await page.getByText("To be withdrawn").count()).toBe(0);
  await page.getByRole("checkbox", { name: "Show corrected and withdrawn" }).click();
  await page.getByText("To be withdrawn").waitFor();
  await page.context().close();
}, 120_000);

test("a correction starts from what was asked and stands in its place", async () => {
  const first = await api.post<MeterComparison>(`/sites/${site.id}/meter-comparisons`, s04);
  const page = await open(`/compare/meters/${first.id}`);
  await page.getByRole("link", { name: "Correct" }).click();
  const energy = group(page, "Meter in question").getByLabel("Energy", { exact: true });
  expect(await energy.inputValue()).toBe("2511.6");
  await energy.fill("2781");
  await page.getByText("They do not agree: find out why before using either").waitFor();
  await page.getByRole("button", { name: "Save comparison" }).click();
  await page.getByText("It replaces an earlier one.").waitFor();
  await page.getByRole("link", { name: "Open that" }).click();
  await page.getByText("A later comparison stands in its place.").waitFor();
  await page.context().close();
}, 120_000);

test("a surveyor works one out without keeping it, a tenant contact sees none", async () => {
  const surveyor = await open("/compare/meters/new", {}, "surveyor");
  await typeS04(surveyor);
  await surveyor.getByText("They agree within what each claims").waitFor();
  expect(await surveyor.getByRole("button", { name: "Save comparison" }).count()).toBe(0);
  await surveyor.context().close();
  const tenant = await open("/compare", {}, "tenantContact");
  await tenant.getByText("Comparisons are open to engineers").waitFor();
  await tenant.context().close();
}, 120_000);

test.each(
  (["light", "dark"] as const).flatMap((theme) =>
    (Object.keys(viewports) as (keyof typeof viewports)[]).map((size) => [theme, size] as const),
  ),
)(
  "a saved comparison and the list are without serious faults in %s on a %s screen",
  async (theme, viewport) => {
    const typed = {
      kind: "typed",
      expandedPercent: 3,
      volumePercent: 2,
      deltaTPercent: 2,
    } as const;
    const saved = await api.post<MeterComparison>(`/sites/${site.id}/meter-comparisons`, {
      ...s04,
      title: "Errors that cancel",
      first: { ...typed, name: "Portable", energyKwh: 2450, volumeM3: 130, deltaTK: 16.4 },
      second: {
        ...s04.second,
        volume: { opening: 1000, closing: 1114.2, digits: 5 },
        deltaTK: 18.4,
      },
      standIn: { ...s04.standIn, coveredPercent: 5.6, estimatePercent: 20, consentBy: "R. Achter" },
    });
    for (const [name, to] of [
      ["compare-saved", `/compare/meters/${saved.id}`],
      ["compare-list", "/compare"],
    ] as const) {
      const page = await open(to, { viewport, theme });
      await page
        .getByText(name === "compare-saved" ? "Their errors cancel." : "Errors that cancel")
        .first()
        .waitFor();
      await expectNoSeriousAxe(page);
      await keep(page, `${name}-${viewport}-${theme}`);
      const overflow = await page.evaluate(
        () => document.documentElement.scrollWidth - document.documentElement.clientWidth,
      );
      expect(overflow).toBeLessThanOrEqual(0);
      expect(problemsOf(page)).toEqual([]);
      await page.context().close();
    }
  },
  120_000,
);

test("German screens say the same", async () => {
  await (await apiAs(application, "billingClerk")).patch("/account", { language: "de" });
  const page = await open("/compare", { viewport: "phone" }, "billingClerk");
  await page.getByRole("link", { name: "Errors that cancel" }).first().click();
  await page.getByText("Sie stimmen im Rahmen ihrer Angaben überein").waitFor();
  await page.getByText("Ihre Fehler heben sich auf.").waitFor();
  await keep(page, "compare-saved-phone-de");
  await page.context().close();
}, 120_000);
