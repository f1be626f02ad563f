import type { Browser, Page } from "playwright-core";
import type { ImportDetail } from "@shared/contracts/imports";
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
let loop: Loop;

const patience = { timeout: 30_000 };

beforeAll(async () => {
  application = await bootApplication();
  await foundOrganisation(application);
  browser = await launch();
  api = await apiAs(application, "engineer");
  site = await api.post<Site>("/sites", { name: "Weighbridge Yard", zone: "UTC", currency: "GBP" });
  loop = await api.post<Loop>(`/sites/${site.id}/loops`, {
    tag: "CHW-7",
    name: "Chilled water",
    service: "chilled",
  });
}, 180_000);

afterAll(async () => {
  await browser?.close();
  await application?.stop();
}, 60_000);

const newPoint = (code: string, name: string, pipe?: object): Promise<Point> =>
  api.post<Point>(`/loops/${loop.id}/points`, {
    code,
    name,
    role: "main",
    meterSide: "return",
    ...(pipe && { pipe }),
  });

/** Quarter-hours of a winter morning; every row differs. */
function logOf(header: string, row: (i: number) => string, rows = 12): Buffer {
  const lines = Array.from({ length: rows }, (_, i) => {
    const at = new Date(Date.UTC(2026, 0, 12, 6) + i * 900_000).toISOString();
    return `${at};${row(i)}`;
  });
  return Buffer.from([`Time (UTC);${header}`, ...lines, ""].join("\n"));
}

async function uploaded(point: Point, name: string, bytes: Buffer): Promise<ImportDetail> {
  const { id } = await api.post<ImportDetail>(`/points/${point.id}/imports`);
  await api.upload(`/imports/${id}/files`, [{ name, bytes }]);
  for (;;) {
    const now = await api.get<ImportDetail>(`/imports/${id}`);
    if (now.state === "asking" || now.state === "ready") return now;
    await new Promise((resolve) => setTimeout(resolve, 100));
  }
}

async function openColumns(detail: ImportDetail, viewport: Viewport): Promise<Page> {
  const page = await openPage(browser, { viewport });
  await signIn(page, application, "engineer");
  await page.goto(`${application.address}/logs/${detail.id}?step=columns`);
  return page;
}

test("a file of two points is used for one, then for the other without another upload", async () => {
  const north = await newPoint("P-N", "North riser");
  await newPoint("P-S", "South riser");
  const detail = await uploaded(
    north,
    "both.csv",
    logOf(
      "North flow m³/h;North supply °C;North return °C;South flow m³/h;South supply °C;South return °C",
      (i) => [20 + i, "6.5", "12.0", 40 + i, "7.0", "11.5"].join(";"),
    ),
  );
  const page = await openColumns(detail, "wide");
  await page.getByText("Which columns belong to North riser?").waitFor(patience);
  await expectNoSeriousAxe(page);
  await keepScreenshots(page, "import-two-points");
  await page.getByRole("button", { name: "Use “north”" }).click();
  await page.getByLabel("Loop", { exact: true }).selectOption({ label: "CHW-7 Chilled water" });
  await page
    .getByRole("combobox", { name: "Metering point" })
    .selectOption({ label: "P-S South riser" });
  await page.getByRole("button", { name: "Open its import" }).click();
  await page.getByText("This file is also read for North riser on CHW-7.").waitFor(patience);
  expect(new URL(page.url()).pathname).not.toContain(`/logs/${detail.id}`);
  await expectNoSeriousAxe(page);
  await keepScreenshots(page, "import-also-for-another");
  expect(problemsOf(page)).toEqual([]);
  await page.context().close();
}, 180_000);

test("water speed waits for the pipe, and companions stand under the loop's chart", async () => {
  const bare = await newPoint("P-V", "Bare riser");
  const waiting = await uploaded(
    bare,
    "speed.csv",
    logOf("Velocity (m/s)", (i) => (1 + i / 100).toFixed(2)),
  );
  const page = await openColumns(waiting, "phone");
  await page.getByText("Water speed needs the pipe").waitFor(patience);
  await expectNoSeriousAxe(page);
  await keepScreenshots(page, "import-speed-without-pipe");

  const point = await newPoint("P-W", "Measured riser", {
    kind: "table",
    tableId: "en-10255-medium",
    dn: 100,
  });
  const detail = await uploaded(
    point,
    "speed.csv",
    logOf("Velocity (m/s);Supply °C;Return °C;Outdoor °C", (i) =>
      [(1 + i / 100).toFixed(2), "6.5", "12.0", (3 + i / 4).toFixed(1)].join(";"),
    ),
  );
  expect(detail.files[0]?.questions).toEqual([]);
  for (;;) {
    const { state } = await api.get<ImportDetail>(`/imports/${detail.id}`);
    if (state === "ready") await api.post(`/imports/${detail.id}/confirm`);
    if (state === "imported") break;
    await new Promise((resolve) => setTimeout(resolve, 200));
  }
  await page.goto(
    `${application.address}/loops/${loop.id}?point=${point.id}&from=2026-01-12&to=2026-01-12`,
  );
  await page.getByText("Logged beside the readings").waitFor(patience);
  await page.getByRole("button", { name: "Outdoor temperature" }).click();
  await page.getByText(/Outdoor temperature from 3\.0\s°C to 5\.8\s°C/).waitFor(patience);
  await page.getByText("Logged beside the readings").scrollIntoViewIfNeeded();
  await keepScreenshots(page, "loop-companions");
  expect(problemsOf(page)).toEqual([]);
  await page.context().close();
}, 180_000);
