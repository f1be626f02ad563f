import type { Browser, Page } from "playwright-core";
import type { BathCheck, Installation, Instrument } from "@shared/contracts/evidence";
import type { Loop, Point, Site } from "@shared/contracts/places";
import { keyboardOn, pointerOn, type Hands } from "./hands";
import { expectNoSeriousAxe } from "./harness/accessibility";
import { apiAs, type Api } from "./harness/api";
import { bootApplication, type Application } from "./harness/application";
import { launch, openPage, problemsOf } from "./harness/browser";
import { foundOrganisation, signIn } from "./harness/people";
import { keepScreenshots } from "./harness/screenshots";

let application: Application;
let browser: Browser;
let api: Api;
let site: Site;
let loop: Loop;
let point: Point;

const readings = Array.from({ length: 10 }, (_, at) => ({
  firstC: 4.11 + (at % 2) / 100,
  secondC: 4 + (at % 2) / 100,
}));

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
  loop = await api.post<Loop>(`/sites/${site.id}/loops`, {
    tag: "CHW-7",
    name: "North Hall",
    service: "chilled",
    gaugePressureMPa: 0.298675,
  });
  point = await api.post<Point>(`/loops/${loop.id}/points`, {
    code: "CHW-7-P1",
    name: "Main",
    role: "main",
    meterSide: "return",
  });
  const meter = await api.post<Instrument>("/instruments", {
    kind: "flowMeter",
    serial: "50417",
    label: "FM-05",
    range: "DN 50 to 300",
  });
  const dueOn = new Date(Date.now() + 12 * 86_400_000).toISOString().slice(0, 10);
  await api.post(`/instruments/${meter.id}/certificates`, {
    number: "TC-3381",
    issuedOn: "2026-01-10",
    dueOn,
    expanded: 1,
  });
  for (const serial of ["T-1", "T-2"])
    await api.post<Instrument>("/instruments", { kind: "probe", serial, probeClass: "A" });
}, 180_000);

afterAll(async () => {
  await browser?.close();
  await application?.stop();
}, 60_000);

const evidence = () =>
  `${application.address}/sites/${site.id}/loops/${loop.id}/points/${point.id}/evidence`;

async function says(page: Page, text: string | RegExp): Promise<void> {
  await page.getByRole("main").getByText(text).first().waitFor({ timeout: 20_000 });
}

/** A text field, by its label, as somebody types into it. */
async function type(page: Page, label: string, text: string): Promise<void> {
  await page.getByLabel(label, { exact: true }).fill(text);
}

async function fillS01(page: Page, hands: Hands): Promise<void> {
  await type(page, "Start day", "2026-02-20");
  await type(page, "Start time", "09:00");
  await type(page, "Around the pipe", "359.1");
  await type(page, "Wall readings", "5.62 5.71 5.66 5.69");
  await type(page, "Bore entered in the meter", "102.26");
  await type(page, "Straight before the meter", "0.92");
  await type(page, "Straight after the meter", "0.61");
  await hands.choose(page.getByLabel("Nearest fitting before it"), "one bend");
  await hands.choose(page.getByRole("combobox", { name: "Flow meter" }), "50417, FM-05");
  await type(page, "Flow it shows now", "8");
  await hands.pick(page.getByRole("radio", { name: /Yes, proven/ }));
  await type(page, "Reading at zero", "0.012");
  await type(page, "Sound speed displayed", "1449");
  await type(page, "Fluid temperature", "11.2");
}

describe("the evidence of S01 at a desk", () => {
  it("says bore, straight run, zero and sound speed as they are typed, keeps the draft and the versions", async () => {
    const page = await openPage(browser);
    await signIn(page, application, "surveyor");
    await page.goto(evidence());
    await says(page, "Nothing recorded yet");
    await expectNoSeriousAxe(page);
    await page.getByRole("link", { name: "Record an installation" }).first().click();
    await says(page, "From when");
    await fillS01(page, pointerOn());
    await says(page, "102.9651");
    await says(page, "1.3837 %");
    await says(page, "8.1107");
    await says(page, /8\.935\sD/);
    await says(page, "0.09992");
    await says(page, /Sound speed 1,?449\sm\/s fits: −0\.21\s%/);
    await says(page, /Indicative – not for billing/);
    const scale = page.getByRole("link", { name: "Put the flow right by the bore" });
    expect(await scale.getAttribute("href")).toContain(
      "corrections?propose=scaleByBore&entered=102.26&true=102.9651",
    );
    await expectNoSeriousAxe(page);
    await type(page, "Sound speed displayed", "1389");
    await says(page, /−4\.34\s%.*Stop, and check bore, fluid, air and spacing/);
    await page.reload();
    await says(page, "Not saved yet.");
    await says(page, /−4\.34\s%/);
    await keepScreenshots(page, "evidence-form");
    await type(page, "Sound speed displayed", "1449");
    await page.getByRole("button", { name: "Record it" }).click();
    await says(page, "What was looked at");
    await expectNoSeriousAxe(page);
    await keepScreenshots(page, "evidence");

    await page.getByRole("link", { name: "Correct", exact: true }).click();
    await says(page, "Correct the installation");
    await type(page, "Straight after the meter", "0.4");
    await page.getByRole("button", { name: "Save the correction" }).click();
    await says(page, "Say why.");
    await type(page, "Why it is corrected", "Measured again with a tape");
    await page.getByRole("button", { name: "Save the correction" }).click();
    await says(page, "Superseded");
    await says(page, /3\.885\sD after the meter is short of 5\sD/);
    await page.getByRole("link", { name: /version 1/ }).click();
    await says(page, "This version no longer stands.");
    const { items } = await api.get<{ items: Installation[] }>(
      `/points/${point.id}/installations?superseded=true`,
    );
    expect(items.map(({ version }) => version)).toEqual([2, 1]);
    expect(problemsOf(page)).toEqual([]);
  }, 240_000);

  it("a check in one bath is pasted with the keyboard and shows in the kit", async () => {
    const page = await openPage(browser, { viewport: "phone" });
    await signIn(page, application, "surveyor");
    await page.goto(`${application.address}/kit`);
    await says(page, "FM-05");
    await says(page, /12 days left|11 days left/);
    await expectNoSeriousAxe(page);
    await keepScreenshots(page, "kit");
    const hands = keyboardOn(page);
    await hands.press(page.getByRole("link", { name: "Same-bath checks" }));
    await hands.press(page.getByRole("link", { name: "Add a check" }).first());
    await says(page, "Both probes in one stirred bath");
    await hands.choose(page.getByLabel("First probe", { exact: true }), "T-1");
    await hands.choose(page.getByLabel("Second probe", { exact: true }), "T-2");
    const lines = readings.map(({ firstC, secondC }) => `${firstC}\t${secondC}`).join("\n");
    await type(page, "Readings", lines.replace(/\./g, ","));
    await says(page, /0\.1100\sK/);
    await says(page, /10 pairs, mean difference 0\.110\sK/);
    await expectNoSeriousAxe(page);
    await keepScreenshots(page, "bath-check-form");
    await hands.press(page.getByRole("button", { name: "Save the check" }));
    await page.getByRole("heading", { name: /^Check of/ }).waitFor({ timeout: 20_000 });
    const { items } = await api.get<{ items: BathCheck[] }>("/bath-checks");
    expect(items.map(({ firstSerial, secondSerial }) => [firstSerial, secondSerial])).toEqual([
      ["T-1", "T-2"],
    ]);
    await page.goto(`${application.address}/kit`);
    await page.getByRole("link", { name: "FM-05" }).click();
    await says(page, "Where it has been");
    // The phone's bar lies over what has not been scrolled to; axe takes that for a small target.
    await page
      .getByRole("link", { name: /CHW-7/ })
      .evaluate((row) => row.scrollIntoView({ block: "center" }));
    await expectNoSeriousAxe(page);
    await keepScreenshots(page, "instrument");
    expect(problemsOf(page)).toEqual([]);
  }, 240_000);

  it("a billing clerk reads and is offered nothing to change; a tenant contact sees neither", async () => {
    const page = await openPage(browser);
    await signIn(page, application, "billingClerk");
    await page.goto(`${application.address}/kit`);
    await says(page, "FM-05");
    expect(await page.getByRole("link", { name: "Add an instrument" }).count()).toBe(0);
    await page.goto(evidence());
    await says(page, "What was looked at");
    expect(await page.getByRole("link", { name: "Record an installation" }).count()).toBe(0);
    const tenant = await openPage(browser);
    await signIn(tenant, application, "tenantContact");
    await tenant.goto(`${application.address}/kit`);
    await says(tenant, /The kit is open to/);
  }, 120_000);
});
