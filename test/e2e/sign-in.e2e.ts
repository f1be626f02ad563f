import type { Browser } from "playwright-core";
import { expectNoSeriousAxe } from "./harness/accessibility";
import { bootApplication, type Application } from "./harness/application";
import { launch, openPage, problemsOf } from "./harness/browser";
import { emailOf, foundOrganisation, signIn } from "./harness/people";
import { keepScreenshots } from "./harness/screenshots";

let application: Application;
let browser: Browser;

beforeAll(async () => {
  application = await bootApplication();
  await foundOrganisation(application);
  browser = await launch();
}, 180_000);

afterAll(async () => {
  await browser?.close();
  await application?.stop();
}, 60_000);

describe("sign-in", () => {
  it("keeps a stranger out and says the same for a wrong name and a wrong password", async () => {
    const page = await openPage(browser, { viewport: "phone" });
    await page.goto(`${application.address}/sign-in`);
    const answers: (string | null)[] = [];
    for (const email of [emailOf("engineer"), "nobody@e2e.example"]) {
      await page.getByLabel("Email").fill(email);
      await page.getByLabel("Password", { exact: true }).fill("not the password");
      await page.getByRole("button", { name: "Sign in", exact: true }).click();
      const alert = page.getByRole("alert").first();
      await alert.waitFor();
      answers.push(await alert.textContent());
      await page.reload();
    }
    expect(answers[0]).toBeTruthy();
    expect(answers[1]).toBe(answers[0]);
    await page.context().close();
  });

  it("lets a surveyor in at both sizes, with nothing serious for axe and no error", async () => {
    for (const viewport of ["phone", "wide"] as const) {
      const page = await openPage(browser, { viewport });
      await page.goto(`${application.address}/sign-in`);
      await page.getByRole("heading", { name: "Loopwright" }).waitFor();
      await expectNoSeriousAxe(page);
      if (viewport === "wide") await keepScreenshots(page, "sign-in");
      await signIn(page, application, "surveyor");
      await page.getByRole("heading", { level: 1 }).waitFor();
      await expectNoSeriousAxe(page);
      expect(problemsOf(page)).toEqual([]);
      await page.context().close();
    }
  });
});
