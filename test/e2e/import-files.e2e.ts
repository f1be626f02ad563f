import { readFileSync } from "node:fs";
import path from "node:path";
import { gzipSync } from "node:zlib";
import type { Browser, Page } from "playwright-core";
import type { Loop, Point, Site } from "@shared/contracts/places";
import { STYLE, workbookOf, zipOf } from "@test/generators/archives";
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

/** A job's worker yields to everything else on the machine. */
const patience = { timeout: 60_000 };
const fixedWidth = readFileSync(
  path.join(__dirname, "..", "fixtures", "log-files", "ok", "fixed-width-blank-cells.txt"),
);

beforeAll(async () => {
  application = await bootApplication();
  await foundOrganisation(application);
  browser = await launch();
  api = await apiAs(application, "engineer");
  site = await api.post<Site>("/sites", {
    name: "Weighbridge Yard",
    zone: "Europe/London",
    currency: "GBP",
  });
  await api.post("/instruments", { kind: "flowMeter", serial: "FM 50417" });
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
    gaugePressureMPa: 0.4,
  });
  return api.post<Point>(`/loops/${loop.id}/points`, {
    code: `${tag}-P1`,
    name: "Main",
    role: "main",
    meterSide: "return",
    pipe: { kind: "table", tableId: "en-10255-medium", dn: 100 },
  });
}

/** A log of dates as spreadsheets keep them, the sheet's row 4 being the first reading. */
async function workbook(): Promise<Buffer> {
  const firstDay = Date.UTC(2026, 4, 18) / 86_400_000 + 25_569;
  const rows = Array.from({ length: 60 }, (_, i) => [
    { raw: String(firstDay + 10 / 24 + i / 1440), style: STYLE.dateTime },
    28.8,
    6.9,
    12.8,
  ]);
  return workbookOf({
    sheets: {
      Log: {
        rows: [
          ["Serial number", "FM-50417"],
          ["Pipe inside diameter", "77.9 mm"],
          ["Time UTC", "Flow m³/h", "Supply °C", "Return °C"],
          ...rows,
        ],
      },
      Remarks: { rows: [["Pump 2 ran all day"]] },
    },
  });
}

async function openWizard(page: Page, point: Point): Promise<void> {
  await page.goto(`${application.address}/logs/new?point=${point.id}`);
  await page.locator("input[type=file]").waitFor({ state: "attached" });
}

async function give(page: Page, name: string, buffer: Buffer): Promise<void> {
  const file = { name, mimeType: "application/octet-stream", buffer };
  await page.locator("input[type=file]").setInputFiles([file]);
  // While one is on its way no other is taken.
  await page.getByText(/^Uploading/).waitFor({ state: "hidden", ...patience });
}

const sizes: { viewport: Viewport; tag: string }[] = [
  { viewport: "phone", tag: "CHW-5" },
  { viewport: "wide", tag: "CHW-6" },
];

it.each(sizes)(
  "a workbook at $viewport shows its sheet, its proofs and a bore that is not the pipe's",
  async ({ viewport, tag }) => {
    const point = await newPoint(tag);
    const page = await openPage(browser, { viewport });
    await signIn(page, application, "surveyor");
    await openWizard(page, point);
    await give(page, "July.xlsx", await workbook());
    await page.getByText(/^Sheet Log of July\.xlsx/).waitFor(patience);
    const read = page.getByRole("list", { name: /^What was read from/ });
    await read.waitFor();
    expect(await read.innerText()).toMatch(
      /Times written\s+Year, month, day\s+Proved by line 4: 2026-05-18T10:00:00/,
    );
    expect(await read.innerText()).not.toContain("Separator");
    const facts = page.getByRole("list", { name: /says about the measurement/ });
    expect(await facts.innerText()).toMatch(/Bore\s+77\.9 mm\s+Recorded: 105\.3 mm/);
    await page.getByText("July.xlsx – Remarks (no times in it)").waitFor();
    await expectNoSeriousAxe(page);
    if (viewport === "wide") await keepScreenshots(page, "import-file-workbook");

    const wizard = new URL(page.url());
    wizard.searchParams.set("step", "checks");
    const opened = page.getByRole("link", { name: "Take over into the evidence" });
    await opened.click();
    await page.getByText("Filled in from the log file.").waitFor();
    await expectNoSeriousAxe(page);
    expect(await page.getByRole("main").innerText()).toContain("FM 50417");

    await page.goto(wizard.href);
    const differ = page.getByRole("list", { name: "The file does not fit the record" });
    await differ.waitFor(patience);
    expect(await differ.innerText()).toMatch(/Bore\s+77\.9 mm\s+Recorded: 105\.3 mm/);
    await expectNoSeriousAxe(page);
    if (viewport === "wide") await keepScreenshots(page, "import-checks-facts");
    expect(problemsOf(page)).toEqual([]);
    await page.context().close();
  },
  180_000,
);

it.each(sizes)(
  "fixed columns, an archive and refused files are understood at $viewport without help",
  async ({ viewport, tag }) => {
    const point = await newPoint(`${tag}B`);
    const page = await openPage(browser, { viewport });
    await signIn(page, application, "surveyor");
    await openWizard(page, point);
    await give(page, "logger.txt", fixedWidth);
    await page.getByText("Fixed width").waitFor(patience);
    await expectNoSeriousAxe(page);

    await page.getByRole("button", { name: "Change separator or encoding of logger.txt" }).click();
    const places = page.getByLabel("Columns begin at");
    await places.waitFor();
    await expectNoSeriousAxe(page);
    const found = await places.inputValue();
    await places.fill("9, 5");
    await page.getByRole("button", { name: "Read again" }).click();
    await page.getByText("Give at least two places in rising order").waitFor();
    await page.getByLabel("Separator").selectOption({ label: "Space" });
    await page
      .getByRole("list", { name: /^What was read/ })
      .getByText("Space")
      .waitFor(patience);
    await page.getByRole("button", { name: "Change separator or encoding of logger.txt" }).click();
    await page.getByLabel("Separator").selectOption({ label: "Fixed width" });
    const read = page.getByRole("list", { name: /^What was read/ });
    await read.getByText("Fixed width").waitFor(patience);
    await page.getByRole("button", { name: "Change separator or encoding of logger.txt" }).click();
    expect(await page.getByLabel("Columns begin at").inputValue()).toBe(found);

    if (viewport === "wide") await keepScreenshots(page, "import-file-fixed");

    const log = "Time,Flow m3/h\n2026-05-18T10:00:00Z,6.70\n2026-05-18T10:01:00Z,6.71\n";
    await give(page, "visit.zip", await zipOf({ "visit/flow.csv": log, "photo.jpg": "x" }));
    await page.getByText(/^visit\/flow\.csv in visit\.zip/).waitFor(patience);
    await page.getByText("photo.jpg (no text)").waitFor();
    const whole = gzipSync(log.repeat(50));
    await give(page, "cut.csv.gz", whole.subarray(0, whole.length - 20));
    await page.getByText("This file is damaged").first().waitFor(patience);
    await expectNoSeriousAxe(page);
    if (viewport === "wide") await keepScreenshots(page, "import-file-refused");
    await give(page, "old.xls", Buffer.from("x"));
    await page.getByText(/is a spreadsheet of a kind that is not read here/).waitFor();
    expect(problemsOf(page)).toEqual([]);
    await page.context().close();
  },
  180_000,
);
