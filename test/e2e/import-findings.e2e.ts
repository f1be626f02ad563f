import type { Browser, Page } from "playwright-core";
import type { Correction } from "@shared/contracts/corrections";
import type { EnergyAnswer } from "@shared/contracts/energy";
import type { ImportDetail } from "@shared/contracts/imports";
import type { Loop, Point, Site } from "@shared/contracts/places";
import type { ReadingSegment } from "@shared/domain/readings/reading-columns";
import { cleanSeries, withValues } from "@test/generators/clean-series";
import { logOf } from "@test/generators/defective-log";
import { keyboardOn, pointerOn, type Hands } from "./hands";
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

const DAY = 96;
const patience = { timeout: 60_000 };

/** Probes on the wrong pipes, two spikes, a probe that stands still and a flow meter set anew. */
function defectiveLog(): { text: string; clean: ReadingSegment } {
  const clean = cleanSeries({ rows: 6 * DAY });
  const spikes = [DAY + 40, DAY + 60];
  const stuckFrom = 2 * DAY + 36;
  const held = clean.columns.returnC![stuckFrom]!;
  const setAt = 3 * DAY + 48;
  const flow = withValues(clean, "flowM3PerHour", (value, row) =>
    spikes.includes(row) ? value * 12 : row >= setAt ? value * 1.4 : value,
  );
  const stuck = withValues(flow, "returnC", (value, row) =>
    row >= stuckFrom && row < stuckFrom + 36 ? held : value,
  );
  const { supplyC, returnC } = stuck.columns;
  const columns = { ...stuck.columns, supplyC: returnC, returnC: supplyC };
  return { text: logOf({ columns }), clean };
}

const { text, clean } = defectiveLog();

beforeAll(async () => {
  application = await bootApplication();
  await foundOrganisation(application);
  browser = await launch();
  api = await apiAs(application, "engineer");
  site = await api.post<Site>("/sites", { name: "Ropewalk", zone: "UTC", currency: "GBP" });
}, 180_000);

afterAll(async () => {
  await browser?.close();
  await application?.stop();
}, 60_000);

async function checkedImport(tag: string): Promise<{ point: Point; id: string }> {
  const loop = await api.post<Loop>(`/sites/${site.id}/loops`, {
    tag,
    name: "Chilled water",
    service: "chilled",
    gaugePressureMPa: 0.3,
  });
  const point = await api.post<Point>(`/loops/${loop.id}/points`, {
    code: `${tag}-P1`,
    name: "Main",
    role: "main",
    meterSide: "return",
    pipe: { kind: "table", tableId: "en-10255-medium", dn: 100 },
  });
  const { id } = await api.post<ImportDetail>(`/points/${point.id}/imports`);
  const bytes = Buffer.from(text);
  await api.upload(`/imports/${id}/files`, [{ name: "ropewalk.csv", bytes }]);
  return { point, id };
}

/** The energy at the side of the Checks step. */
async function shownKwh(page: Page): Promise<number> {
  const list = page.getByRole("list", { name: "Energy with these choices" });
  const row = await list
    .getByRole("listitem")
    .filter({ hasText: /cooling/i })
    .first()
    .innerText();
  return Number(/([\d,.]+)\s*kWh/.exec(row)?.[1]?.replace(/,/g, ""));
}

async function storedKwh(point: Point): Promise<number | null> {
  const from = new Date(clean.columns.instantMs[0]!).toISOString().slice(0, 10);
  const to = new Date(clean.columns.instantMs.at(-1)!).toISOString().slice(0, 10);
  const { totals } = await api.get<EnergyAnswer>(
    `/points/${point.id}/energy?from=${from}&to=${to}&step=total`,
  );
  return totals.cooling.energyKwh;
}

async function settleAndUndo(
  page: Page,
  hands: Hands,
  { point, id }: { point: Point; id: string },
) {
  const question = (words: RegExp) => page.getByRole("radiogroup", { name: words });
  const again = page.getByText("Checking again with your choices");
  const pick = async (group: RegExp, words: RegExp) => {
    const tile = question(group).getByRole("radio", { name: words });
    await hands.pick(tile);
    // Chosen once the server has it; from then on its check runs.
    await page.waitForFunction(
      (element) => element?.getAttribute("aria-checked") === "true",
      await tile.elementHandle(),
    );
    await again.waitFor({ state: "hidden", ...patience });
  };

  await page.goto(`${application.address}/logs/${id}?step=checks`);
  await question(/Supply and return look swapped/).waitFor(patience);
  await expectNoSeriousAxe(page);
  // The stopping one comes first, has no default and holds the button.
  const first = page.getByRole("main").getByRole("heading", { level: 3 }).first();
  expect(await first.innerText()).toBe("Supply and return look swapped");
  const swap = question(/Supply and return look swapped/);
  expect(await swap.getByRole("radio", { checked: true }).count()).toBe(0);
  await page.getByText("Settle what stops the import first").waitFor();
  const worth = /([\d,]+)\skWh more/.exec(await swap.innerText())?.[1];
  expect(Number(worth?.replace(/,/g, ""))).toBeGreaterThan(100);
  const swappedAtFirst = await shownKwh(page);

  await pick(/swapped/, /Swap: the probes/);
  const swapped = await shownKwh(page);
  expect(swapped).toBeGreaterThan(swappedAtFirst + 100);
  await pick(/Flow: 2 spikes/, /Leave out/);
  const withoutSpikes = await shownKwh(page);
  expect(withoutSpikes).toBeLessThan(swapped);
  await hands.press(page.getByRole("button", { name: "Choose which" }).first());
  const spans = page.getByRole("group", { name: /Flow: 2 spikes/ }).getByRole("checkbox");
  expect(await spans.count()).toBe(2);
  await hands.press(spans.first());
  await page.getByText("1 of 2 left out").waitFor(patience);
  await again.waitFor({ state: "hidden", ...patience });
  expect(await shownKwh(page)).toBeGreaterThan(withoutSpikes);
  await hands.press(spans.first());
  await page.getByText("2 of 2 left out").waitFor(patience);
  await again.waitFor({ state: "hidden", ...patience });
  await pick(/stands still/, /Leave out/);
  await pick(/steps to another level/, /Part the readings there/);
  await expectNoSeriousAxe(page);
  const promised = await shownKwh(page);

  await hands.press(page.getByRole("button", { name: /^Import [\d,]+ rows$/ }));
  await page.getByRole("heading", { name: /rows are in/ }).waitFor(patience);
  const listed = page.getByRole("list", { name: "4 corrections made" }).getByRole("listitem");
  await listed.first().waitFor();
  expect(await listed.count()).toBe(4);
  await expectNoSeriousAxe(page);
  expect(Math.round((await storedKwh(point)) ?? NaN)).toBe(Math.round(promised));
  const made = await api.get<{ items: Correction[] }>(`/points/${point.id}/corrections`);
  expect(made.items.map(({ change }) => change.kind).sort()).toEqual([
    "exclude",
    "exclude",
    "split",
    "swapSides",
  ]);
  expect(made.items.every(({ importId, state }) => importId === id && state === "applied")).toBe(
    true,
  );

  await hands.press(page.getByRole("button", { name: /^Undo/ }).first());
  const dialog = page.getByRole("alertdialog");
  await hands.press(dialog.getByRole("button", { name: "Undo the import" }));
  await page.getByText("This import was undone").first().waitFor(patience);
  expect(await storedKwh(point)).toBeNull();
  const after = await api.get<{ items: Correction[] }>(`/points/${point.id}/corrections`);
  expect(after.items.map(({ state }) => state)).toEqual(Array(4).fill("withdrawn"));
}

const ways: { viewport: Viewport; by: string; tag: string; hands: (page: Page) => Hands }[] = [
  { viewport: "phone", by: "a finger", tag: "CHW-4", hands: pointerOn },
  { viewport: "wide", by: "the keyboard alone", tag: "CHW-5", hands: keyboardOn },
];

it.each(ways)(
  "what readings show is settled at $viewport by $by, with its energy, and undone",
  async ({ viewport, tag, hands }) => {
    const started = await checkedImport(tag);
    const page = await openPage(browser, { viewport });
    await signIn(page, application, "engineer");
    await settleAndUndo(page, hands(page), started);
    expect(problemsOf(page)).toEqual([]);
    await page.context().close();
  },
  240_000,
);

it("is drawn at both sizes, light and dark", async () => {
  const { id } = await checkedImport("CHW-6");
  const page = await openPage(browser, { viewport: "wide" });
  await signIn(page, application, "engineer");
  await page.goto(`${application.address}/logs/${id}?step=checks`);
  await page.getByRole("radiogroup", { name: /swapped/ }).waitFor(patience);
  expect(await keepScreenshots(page, "import-findings")).toHaveLength(4);
  await page.context().close();
}, 120_000);
