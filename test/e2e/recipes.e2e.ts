import type { Browser, Page } from "playwright-core";
import type { EnergyAnswer } from "@shared/contracts/energy";
import type { Loop, Point, Site } from "@shared/contracts/places";
import { keyboardOn, pointerOn, type Hands } from "./hands";
import { expectNoSeriousAxe } from "./harness/accessibility";
import { apiAs, type Api } from "./harness/api";
import { bootApplication, type Application } from "./harness/application";
import { launch, openPage, problemsOf, type Viewport } from "./harness/browser";
import { foundOrganisation, signIn } from "./harness/people";

let application: Application;
let browser: Browser;
let api: Api;

beforeAll(async () => {
  application = await bootApplication();
  await foundOrganisation(application);
  browser = await launch();
  api = await apiAs(application, "engineer");
}, 180_000);

afterAll(async () => {
  await browser?.close();
  await application?.stop();
}, 60_000);

/** A job's worker yields to everything else on the machine. */
const patience = { timeout: 60_000 };
const two = (value: number) => String(value).padStart(2, "0");

/**
 * Two hours of a steady logger on a day of March 2026: no order of dates, no clock.
 * One cell cannot be read. 28.8 m³/h, 6.90 → 12.80 °C with the meter in the return is 197.798 kW.
 */
function log(day: number, serial: string): Buffer {
  const rows = Array.from({ length: 25 }, (_, i) => {
    const at = `${two(day)}/03/2026 ${two(6 + Math.floor(i / 12))}:${two((i % 12) * 5)}`;
    return `${at},8.0,6.90,${i === 24 && day === 1 ? "12x" : "12.80"}`;
  });
  return Buffer.from(
    [`Serial number,${serial}`, "Time,Flow [L/s],Supply [°C],Return [°C]", ...rows, ""].join("\n"),
  );
}

async function siteWithTwoPoints(
  name: string,
): Promise<{ site: Site; loop: Loop; points: Point[] }> {
  const site = await api.post<Site>("/sites", { name, zone: "Europe/London", currency: "GBP" });
  const loop = await api.post<Loop>(`/sites/${site.id}/loops`, {
    tag: name === "North Yard" ? "CHW-1" : "CHW-2",
    name: "Chilled water",
    service: "chilled",
  });
  const points: Point[] = [];
  for (const code of ["East", "West"])
    points.push(
      await api.post<Point>(`/loops/${loop.id}/points`, {
        code,
        name: `${code} riser`,
        role: "riser",
        meterSide: "return",
        pipe: { kind: "table", tableId: "en-10255-medium", dn: 100 },
      }),
    );
  return { site, loop, points };
}

const button = (page: Page, name: string | RegExp) =>
  page.getByRole("button", { name, exact: true });

async function send(page: Page, name: string, buffer: Buffer): Promise<void> {
  const input = page.locator("input[type=file]");
  await input.waitFor({ state: "attached" });
  await input.setInputFiles({ name, mimeType: "text/csv", buffer });
}

/** Answers everything the first file asks, imports it and saves the answers. */
async function importAndSave(
  page: Page,
  hands: Hands,
  pointId: string,
  serial: string,
  name: string,
) {
  await page.goto(`${application.address}/logs/new?point=${pointId}`);
  await send(page, "first.csv", log(1, serial));
  await page.getByText("Comma", { exact: true }).first().waitFor(patience);
  await hands.press(button(page, "Next: columns and units"));
  await hands.press(button(page, /^Use day first/));
  await page.getByText("Day or month first?").waitFor({ state: "detached" });
  await hands.press(button(page, "Next: time"));
  const clock = page.getByRole("radio", { name: /^GMT all year/ });
  await hands.pick(clock);
  await page.waitForFunction(
    (element) => element?.getAttribute("aria-checked") === "true",
    await clock.elementHandle(),
  );
  await page.getByText("Choose the clock first").waitFor({ state: "detached" });
  await hands.press(button(page, "Next: checks"));
  const confirm = button(page, /^Import 25 rows$/);
  await confirm.waitFor(patience);
  await hands.press(confirm);
  await page.getByRole("heading", { name: /rows are in CHW/ }).waitFor(patience);
  const problems = page.getByRole("button", { name: /^Download every row with a problem/ });
  const [download] = await Promise.all([page.waitForEvent("download"), hands.press(problems)]);
  const csv = await streamText(await download.createReadStream());
  expect(csv).toContain('first.csv,27,"01/03/2026 08:00,8.0,6.90,12x",Return [°C],12x,');
  await expectNoSeriousAxe(page);

  await hands.press(button(page, "Save as recipe"));
  const field = page.getByLabel("Name", { exact: true });
  await field.waitFor();
  expect(await field.inputValue()).toBe(serial);
  await field.fill(name);
  await expectNoSeriousAxe(page);
  await hands.press(button(page, "Save"));
  await page.getByText(`${name} is saved.`, { exact: false }).waitFor();
}

async function streamText(stream: NodeJS.ReadableStream): Promise<string> {
  let text = "";
  for await (const chunk of stream) text += String(chunk);
  return text;
}

/** The next file of the logger asks nothing once it is read like the first. */
async function importLike(page: Page, hands: Hands, pointId: string, serial: string, name: string) {
  await page.goto(`${application.address}/logs/new?point=${pointId}`);
  await send(page, "second.csv", log(2, serial));
  const like = button(page, `Read like ${name}`);
  await like.waitFor(patience);
  await expectNoSeriousAxe(page);
  await hands.press(like);
  await page.getByText("Nothing in this file differs from the recipe.").waitFor(patience);
  await expectNoSeriousAxe(page);
  await hands.press(button(page, "Next: columns and units"));
  await hands.press(button(page, "Next: time"));
  await hands.press(button(page, "Next: checks"));
  const confirm = button(page, /^Import 25 rows$/);
  await confirm.waitFor(patience);
  await hands.press(confirm);
  await page.getByRole("heading", { name: /rows are in CHW/ }).waitFor(patience);
  const history = page.getByRole("list", { name: "What happened" });
  await history.getByText("Read like a recipe").waitFor();
  await history.getByText("Imported", { exact: true }).waitFor();
}

/** Two files find their points by name; the third has none, and one is chosen. */
async function importMany(
  page: Page,
  hands: Hands,
  of: {
    readonly siteName: string;
    readonly tag: string;
    readonly serial: string;
    readonly name: string;
  },
) {
  const { siteName, tag, serial, name } = of;
  await page.goto(`${application.address}/logs`);
  await hands.press(page.getByRole("link", { name: "Bring in many files" }));
  await hands.choose(page.getByLabel("Recipe", { exact: true }), name);
  await hands.choose(page.getByLabel("Site", { exact: true }), siteName);
  await expectNoSeriousAxe(page);
  await hands.press(button(page, "Choose files"));
  const input = page.locator("input[type=file]");
  await input.waitFor({ state: "attached" });
  const files = ["east 10.csv", "west 10.csv", "download.csv"];
  await input.setInputFiles(
    files.map((file, i) => ({ name: file, mimeType: "text/csv", buffer: log(10 + i, serial) })),
  );
  await button(page, "Import 2 files").waitFor(patience);
  await page.getByText("Which point is it?").waitFor();
  await expectNoSeriousAxe(page);
  await hands.choose(page.getByLabel("Point of download.csv"), `${tag} West West riser`);
  await hands.press(button(page, "Use this point"));
  const confirm = button(page, "Import 3 files");
  await confirm.waitFor(patience);
  await hands.press(confirm);
  await page.getByText("3 imported, 0 ready, 0 to look at").waitFor(patience);
  await expectNoSeriousAxe(page);
}

const ways: { viewport: Viewport; by: string; site: string; hands: (page: Page) => Hands }[] = [
  { viewport: "phone", by: "a finger", site: "North Yard", hands: pointerOn },
  { viewport: "wide", by: "the keyboard alone", site: "South Yard", hands: keyboardOn },
];

it.each(ways)(
  "answers are saved, taken over for the next file and for many at once, at $viewport by $by",
  async ({ viewport, site: siteName, hands: handsOn }) => {
    const { loop, points } = await siteWithTwoPoints(siteName);
    const [east, west] = points as [Point, Point];
    const page = await openPage(browser, { viewport });
    await signIn(page, application, "surveyor");
    const hands = handsOn(page);
    const serial = `LG-${loop.id}`;
    const name = `${siteName} logger`;
    await importAndSave(page, hands, east.id, serial, name);
    await importLike(page, hands, west.id, serial, name);
    await importMany(page, hands, { siteName, tag: loop.tag, serial, name });
    const energy = async (point: Point) =>
      (
        await api.get<EnergyAnswer>(
          `/points/${point.id}/energy?from=2026-03-01&to=2026-03-31&step=total`,
        )
      ).totals.cooling.energyKwh;
    // The unreadable cell costs the first file its last five minutes.
    expect(await energy(east)).toBeCloseTo((2 - 1 / 12 + 2) * 197.798, 1);
    expect(await energy(west)).toBeCloseTo((2 + 2 + 2) * 197.798, 1);
    expect(problemsOf(page)).toEqual([]);
    await page.context().close();
  },
  300_000,
);
