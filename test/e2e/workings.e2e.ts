import type { Browser, Page } from "playwright-core";
import type { Loop, Site } from "@shared/contracts/places";
import { readDemoAccounts, type DemoAccount } from "@server/start-up/demo-people";
import { expectNoSeriousAxe } from "./harness/accessibility";
import { bootApplication, type Application } from "./harness/application";
import { launch, openPage, problemsOf, type OpenOptions, type Viewport } from "./harness/browser";
import { settle } from "./harness/screenshots";

let application: Application;
let browser: Browser;
let account: DemoAccount | undefined;

beforeAll(async () => {
  application = await bootApplication({ demo: true });
  browser = await launch();
  account = (await readDemoAccounts(application.dataFolder)).find(
    ({ role }) => role === "engineer",
  );
}, 300_000);

afterAll(async () => {
  await browser?.close();
  await application?.stop();
}, 60_000);

/** The demo's Ropewalk House loop, opened by its engineer. */
async function loopPage(options: OpenOptions): Promise<Page> {
  const page = await openPage(browser, options);
  await page.goto(`${application.address}/sign-in`);
  await page.getByLabel("Email").fill(account?.email ?? "");
  await page.getByLabel("Password", { exact: true }).fill(account?.password ?? "");
  await page.getByRole("button", { name: "Sign in", exact: true }).click();
  await page.waitForURL((url) => !url.pathname.startsWith("/sign-in"));
  const read = async <Answer>(path: string): Promise<Answer> =>
    (await (await page.request.get(`${application.address}/api/v1${path}`)).json()) as Answer;
  const site = (await read<{ items: Site[] }>("/sites")).items[0];
  const loops = await read<{ items: Loop[] }>(`/sites/${site?.id}/loops`);
  const loop = loops.items.find(({ tag }) => tag === "CHW-1B");
  await page.goto(`${application.address}/loops/${loop?.id}`);
  await energyOf(page).waitFor();
  await settle(page);
  return page;
}

const energyOf = (page: Page) =>
  page.getByRole("button", {
    name: /^Cooling energy.*: [\d,]+ plus or minus [\d,]+ kilowatt hours, show workings$/,
  });
const heading = (page: Page) => page.getByRole("heading", { name: "Where the ± comes from" });

it("opens a figure's workings by keyboard, and Escape gives the focus back", async () => {
  const page = await loopPage({ viewport: "wide" });
  const figure = energyOf(page);
  await figure.focus();
  await page.keyboard.press("Enter");
  await heading(page).waitFor();
  expect(new URL(page.url()).searchParams.get("workings")).toBe("energy");
  const drawer = page.getByRole("complementary", { name: "Workings" });
  expect(await drawer.evaluate((box) => box.contains(document.activeElement))).toBe(true);
  await expectNoSeriousAxe(page);
  await page.keyboard.press("Escape");
  await heading(page).waitFor({ state: "hidden" });
  expect(await figure.evaluate((box) => box === document.activeElement)).toBe(true);
  expect(problemsOf(page)).toEqual([]);
  await page.context().close();
}, 120_000);

it("fills a phone's screen, and hands out a page as PDF", async () => {
  const page = await loopPage({ viewport: "phone", theme: "dark" });
  await energyOf(page).click();
  const sheet = page.getByRole("dialog", { name: "Workings" });
  await heading(page).waitFor();
  await expectNoSeriousAxe(page);
  const saved = page.waitForEvent("download");
  await sheet.getByRole("button", { name: "Send the workings" }).click();
  await page.getByRole("menuitem", { name: "PDF, A4" }).click();
  const answer = await page.request.get((await saved).url());
  expect(answer.headers()["content-type"]).toBe("application/pdf");
  expect((await answer.body()).subarray(0, 5).toString("latin1")).toBe("%PDF-");
  await page.context().close();
}, 120_000);

it.each(["wide", "phone"] satisfies Viewport[])(
  "Back closes them on a %s screen and keeps page and focus, and Escape after it stays on the page",
  async (viewport) => {
    const page = await loopPage({ viewport });
    const figure = energyOf(page);
    const address = page.url();
    for (const leave of [() => page.goBack(), () => page.keyboard.press("Escape")]) {
      await figure.focus();
      await page.keyboard.press("Enter");
      await heading(page).waitFor();
      await leave();
      await heading(page).waitFor({ state: "hidden" });
      await settle(page);
      expect(await figure.evaluate((box) => box === document.activeElement)).toBe(true);
      expect(page.url()).toBe(address);
    }
    await page.context().close();
  },
  120_000,
);
