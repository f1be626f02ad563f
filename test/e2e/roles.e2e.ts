import type { Browser, Page } from "playwright-core";
import type { ImportSummary } from "@shared/contracts/imports";
import type { Role } from "@shared/contracts/people";
import type { Loop, Site } from "@shared/contracts/places";
import { readDemoAccounts, type DemoAccount } from "@server/start-up/demo-people";
import { expectNoSeriousAxe } from "./harness/accessibility";
import { bootApplication, type Application } from "./harness/application";
import { launch, openPage, problemsOf, type Theme } from "./harness/browser";
import { settle } from "./harness/screenshots";

let application: Application;
let browser: Browser;
let accounts: DemoAccount[];
/** Addresses inside the demo that the screens are opened at. */
let at: { site: string; loop: string; points: string; import: string };

beforeAll(async () => {
  application = await bootApplication({ demo: true });
  browser = await launch();
  accounts = await readDemoAccounts(application.dataFolder);
  const page = await signedInAs("engineer");
  const read = async <Answer>(path: string): Promise<Answer> => {
    const answer = await page.request.get(`${application.address}/api/v1${path}`);
    return (await answer.json()) as Answer;
  };
  const site = (await read<{ items: Site[] }>("/sites")).items[0];
  const loops = await read<{ items: Loop[] }>(`/sites/${site?.id}/loops`);
  const loop = loops.items.find(({ tag }) => tag === "CHW-1B");
  const done = await read<{ items: ImportSummary[] }>("/imports");
  at = {
    site: `/sites/${site?.id}`,
    loop: `/loops/${loop?.id}`,
    points: `/sites/${site?.id}/loops/${loop?.id}/points`,
    import: `/logs/${done.items[0]?.id}`,
  };
  await page.context().close();
}, 300_000);

afterAll(async () => {
  await browser?.close();
  await application?.stop();
}, 60_000);

async function signedInAs(role: Role, theme: Theme = "light"): Promise<Page> {
  const account = accounts.find((one) => one.role === role);
  const page = await openPage(browser, { theme });
  await page.goto(`${application.address}/sign-in`);
  await page.getByLabel("Email").fill(account?.email ?? "");
  await page.getByLabel("Password", { exact: true }).fill(account?.password ?? "");
  await page.getByRole("button", { name: "Sign in", exact: true }).click();
  await page.waitForURL((url) => !url.pathname.startsWith("/sign-in"));
  return page;
}

async function open(page: Page, path: string): Promise<void> {
  await page.goto(`${application.address}${path}`);
  await page.getByRole("navigation", { name: "Main" }).waitFor();
  await settle(page);
}

/** Whether somebody finds a control of this name on the page, be it a button or a link. */
async function offers(page: Page, name: string | RegExp): Promise<boolean> {
  const found = page.getByRole("button", { name }).or(page.getByRole("link", { name }));
  return (await found.count()) > 0;
}

/** Who may do what, as the product promises it; nothing of this is read from its code. */
const roles: { role: Role; navigation: string[]; may: string[] }[] = [
  {
    role: "administrator",
    navigation: ["Today", "Sites", "Logs", "Compare", "Kit", "Settings"],
    may: ["add sites", "add points", "import", "add instruments", "manage members", "make tokens"],
  },
  {
    role: "engineer",
    navigation: ["Today", "Sites", "Logs", "Compare", "Kit", "Settings"],
    may: ["add sites", "add points", "import", "add instruments"],
  },
  {
    role: "surveyor",
    navigation: ["Today", "Sites", "Logs", "Compare", "Kit", "Settings"],
    may: ["add points", "import", "add instruments"],
  },
  { role: "billingClerk", navigation: ["Today", "Sites", "Settings"], may: [] },
];

const actions: { may: string; path: () => string; control: string | RegExp }[] = [
  { may: "add sites", path: () => "/sites", control: "Add a site" },
  { may: "add points", path: () => at.points, control: "Add a metering point" },
  { may: "import", path: () => "/logs", control: "Import a log" },
  { may: "import", path: () => at.points, control: /^Import/ },
  { may: "add instruments", path: () => "/kit", control: "Add an instrument" },
  { may: "manage members", path: () => "/settings", control: /^Members/ },
  { may: "make tokens", path: () => "/settings", control: /^Access tokens/ },
];

it.each(roles)(
  "the demo's $role sees the navigation and the actions of the role, and no other",
  async ({ role, navigation, may }) => {
    const page = await signedInAs(role);
    await open(page, "/");
    const links = page.getByRole("navigation", { name: "Main" }).getByRole("link");
    expect(await links.allInnerTexts()).toEqual(navigation);
    await open(page, "/sites");
    await page.getByText("Harbour Court Works").first().waitFor();
    for (const action of actions) {
      await open(page, action.path());
      const seen = `${action.may}: ${await offers(page, action.control)}`;
      expect(seen).toBe(`${action.may}: ${may.includes(action.may)}`);
    }
    expect(problemsOf(page)).toEqual([]);
    await page.context().close();
  },
  120_000,
);

it("the demo's tenant contact sees no site, wherever they look for one", async () => {
  const page = await signedInAs("tenantContact");
  await open(page, "/");
  const links = page.getByRole("navigation", { name: "Main" }).getByRole("link");
  expect(await links.allInnerTexts()).toEqual(["Settings"]);
  for (const path of ["/", "/sites", at.site, at.loop, at.points, "/logs", at.import]) {
    await open(page, path);
    const seen = await page.getByRole("main").innerText();
    expect(seen).not.toMatch(/CHW-|LTHW-|Ropewalk|Chandlery|Net Loft|\d\s*[kM]Wh/);
  }
  await page.context().close();
}, 120_000);

const screens: { name: string; path: () => string }[] = [
  { name: "Today", path: () => "/" },
  { name: "Sites", path: () => "/sites" },
  { name: "a site", path: () => at.site },
  { name: "a loop", path: () => at.loop },
  { name: "metering points", path: () => at.points },
  { name: "Logs", path: () => "/logs" },
  { name: "an import's result", path: () => at.import },
  { name: "Settings", path: () => "/settings" },
  { name: "Members", path: () => "/settings/members" },
];

it.each(["light", "dark"] satisfies Theme[])(
  "axe finds nothing serious on any main screen in %s",
  async (theme) => {
    const page = await signedInAs("administrator", theme);
    const found: string[] = [];
    for (const { name, path } of screens) {
      await open(page, path());
      try {
        await expectNoSeriousAxe(page);
      } catch (error) {
        found.push(`${name}: ${error instanceof Error ? error.message : String(error)}`);
      }
    }
    // Together, so that one screen does not hide what is wrong on the next.
    expect(found).toEqual([]);
    expect(problemsOf(page)).toEqual([]);
    await page.context().close();
  },
  240_000,
);
