import type { Browser, Page } from "playwright-core";
import type { EnergyAnswer } from "@shared/contracts/energy";
import type { Loop, Point, Site } from "@shared/contracts/places";
import { independentCoolingKwh } from "@test/api/independent-energy";
import { writeTwoFileLog } from "@test/generators/two-file-log";
import { keyboardOn, pointerOn, type Hands } from "./hands";
import { expectNoSeriousAxe } from "./harness/accessibility";
import { apiAs, type Api } from "./harness/api";
import { bootApplication, type Application } from "./harness/application";
import { launch, openPage, problemsOf, type Viewport } from "./harness/browser";
import { foundOrganisation, signIn } from "./harness/people";

let application: Application;
let browser: Browser;
let api: Api;
let site: Site;

const days = 3;
const log = writeTwoFileLog({ seed: 43, days });
const gaugePressureMPa = 0.4;

// From the files' own numbers, by another water library: a US gallon is 3.785411784 L (NIST SP 811).
const celsius = (fahrenheit: Float64Array) => fahrenheit.map((value) => (value - 32) / 1.8);
const { instantMs } = log.temperature;
const expectedKwh = independentCoolingKwh(
  {
    flow: {
      instantMs: log.flow.instantMs,
      values: log.flow.flowGpm.map((gpm) => gpm * 0.003785411784 * 60),
    },
    flowStepMs: 60_000,
    supply: { instantMs, values: celsius(log.temperature.supplyF) },
    return: { instantMs, values: celsius(log.temperature.returnF) },
    temperatureStepMs: 300_000,
  },
  gaugePressureMPa + 0.101325,
);

beforeAll(async () => {
  application = await bootApplication();
  await foundOrganisation(application);
  browser = await launch();
  api = await apiAs(application, "engineer");
  const zone = log.choices.siteZone;
  site = await api.post<Site>("/sites", { name: "Weighbridge Yard", zone, currency: "GBP" });
}, 180_000);

afterAll(async () => {
  await browser?.close();
  await application?.stop();
}, 60_000);

async function newPoint(tag: string): Promise<Point> {
  const loop = await api.post<Loop>(`/sites/${site.id}/loops`, {
    tag,
    name: "Chilled water",
    service: "chilled",
    gaugePressureMPa,
  });
  return api.post<Point>(`/loops/${loop.id}/points`, {
    code: `${tag}-P1`,
    name: "Main",
    role: "main",
    meterSide: "return",
    pipe: { kind: "table", tableId: "en-10255-medium", dn: 100 },
  });
}

/** A job's worker yields to everything else on the machine. */
const patience = { timeout: 60_000 };

/**
 * The energy of the file's days added up, as a person reads them off the bars: the headline stops
 * where its ± does, which is coarser than what is checked here.
 */
async function energyOfDays(page: Page): Promise<number> {
  const text = await page.getByRole("main").innerText();
  const bars = /\bTable\b([\s\S]+?)kWh a day/.exec(text)?.[1];
  if (bars === undefined) throw new Error(`no days with their kWh in:\n${text}`);
  // Thousands are grouped, which the days of the month under the bars are not.
  const energies = bars.match(/\d{1,3},\d{3}/g) ?? [];
  return energies.reduce((sum, energy) => sum + Number(energy.replace(/,/g, "")), 0);
}

/** Every step of the wizard, with axe on each; answers the energy the last one shows. */
async function importTwoFiles(page: Page, hands: Hands, tag: string) {
  const button = (name: string | RegExp) => page.getByRole("button", { name });
  const heading = (name: RegExp) => page.getByRole("heading", { name });
  await page.goto(`${application.address}/logs`);
  await hands.press(page.getByRole("link", { name: "Import a log" }).first());
  await hands.choose(page.getByLabel("Loop", { exact: true }), `${tag} Chilled water`);
  await expectNoSeriousAxe(page);
  await hands.press(button("Next: file"));

  const input = page.locator("input[type=file]");
  await input.waitFor({ state: "attached" });
  await expectNoSeriousAxe(page);
  await input.setInputFiles(
    [log.flowFile, log.temperatureFile].map(({ name, bytes }) => ({
      name,
      mimeType: "text/csv",
      buffer: Buffer.from(bytes),
    })),
  );
  await page.getByText("Semicolon").nth(1).waitFor(patience);
  await expectNoSeriousAxe(page);
  await hands.press(button("Next: columns and units"));

  await page.getByText(log.temperatureFile.name).first().waitFor();
  await expectNoSeriousAxe(page);
  await hands.press(button("Next: time"));

  for (const { name } of [log.flowFile, log.temperatureFile]) {
    const clock = page.getByRole("radiogroup", { name: `Clock of ${name}` });
    const local = clock.getByRole("radio", { name: /^London local time/ });
    await hands.pick(local);
    await page.waitForFunction(
      (element) => element?.getAttribute("aria-checked") === "true",
      await local.elementHandle(),
    );
  }
  await expectNoSeriousAxe(page);
  await hands.press(button("Next: checks"));

  const confirm = button(/^Import [\d,]+ rows$/);
  await confirm.waitFor(patience);
  await expectNoSeriousAxe(page);
  const checks = await page.getByRole("main").innerText();
  for (const { repeats, moved } of [log.defects.flow, log.defects.temperature]) {
    expect(checks).toContain(`${repeats} rows repeat others`);
    expect(checks).toContain(`${moved} rows are out of order`);
  }
  for (const { sentinels } of [log.defects.flow, log.defects.temperature])
    for (const [token, count] of Object.entries(sentinels))
      expect(checks).toContain(`${token}: ${count}`);
  await hands.press(confirm);

  await heading(new RegExp(`rows are in ${tag}`)).waitFor(patience);
  await expectNoSeriousAxe(page);
  await page.getByText("Cooling energy in this file").first().waitFor();
  return energyOfDays(page);
}

const ways: { viewport: Viewport; by: string; tag: string; hands: (page: Page) => Hands }[] = [
  { viewport: "phone", by: "a finger", tag: "CHW-8", hands: pointerOn },
  { viewport: "wide", by: "the keyboard alone", tag: "CHW-9", hands: keyboardOn },
];

it.each(ways)(
  "a two-file log of gpm and °F full of defects is imported at $viewport by $by to the right energy",
  async ({ viewport, tag, hands }) => {
    const point = await newPoint(tag);
    const page = await openPage(browser, { viewport });
    await signIn(page, application, "surveyor");
    const shownKwh = await importTwoFiles(page, hands(page), tag);
    expect(Math.abs(shownKwh / expectedKwh - 1)).toBeLessThan(5e-4);
    // What is stored is as near: a figure of few digits must not be what makes the test pass.
    const { totals } = await api.get<EnergyAnswer>(
      `/points/${point.id}/energy?from=2026-05-11&to=2026-05-15&step=total`,
    );
    expect(Math.abs((totals.cooling.energyKwh ?? NaN) / expectedKwh - 1)).toBeLessThan(5e-4);
    expect(totals.heating.energyKwh).toBe(0);
    expect(problemsOf(page)).toEqual([]);
    await page.context().close();
  },
  180_000,
);
