import { rm, stat } from "node:fs/promises";
import path from "node:path";
import supertest from "supertest";
import { createApp } from "@server/app";
import { Account } from "@server/models/account";
import { testApp } from "@server/testing/test-app";
import { ensureDemoPeople, readDemoAccounts } from "./demo-people";

const app = testApp();

const signIn = (email: string, password: string) =>
  app.anonymous.post("/api/v1/session").send({ email, password });

it("makes one account a role, once, with passwords for this machine's owner only", async () => {
  const first = await ensureDemoPeople(app.services);
  const accounts = await readDemoAccounts(app.config.dataDir);
  expect(accounts.map(({ role }) => role).sort()).toEqual(
    ["administrator", "billingClerk", "engineer", "surveyor", "tenantContact"].sort(),
  );
  const file = path.join(app.config.dataDir, "demo-accounts.json");
  expect((await stat(file)).mode & 0o777).toBe(0o600);
  for (const { email, password, role } of accounts)
    expect((await signIn(email, password).expect(200)).body.role).toBe(role);
  expect((await ensureDemoPeople(app.services)).id).toBe(first.id);
  expect(await Account.count()).toBe(5);
  expect(await readDemoAccounts(app.config.dataDir)).toEqual(accounts);

  await rm(file);
  await ensureDemoPeople(app.services);
  const [renewed] = await readDemoAccounts(app.config.dataDir);
  await signIn(accounts[0]?.email ?? "", accounts[0]?.password ?? "").expect(401);
  await signIn(renewed?.email ?? "", renewed?.password ?? "").expect(200);
});

it("neither makes nor admits demo accounts in production", async () => {
  await ensureDemoPeople(app.services);
  const [account] = await readDemoAccounts(app.config.dataDir);
  const open = await signIn(account?.email ?? "", account?.password ?? "").expect(200);
  const production = { ...app.services, config: { ...app.config, mode: "production" as const } };
  await expect(ensureDemoPeople(production)).rejects.toThrow(/production/);
  const served = supertest(createApp(production));
  await served
    .post("/api/v1/session")
    .send({ email: account?.email, password: account?.password })
    .expect(401);
  const cookie = (open.headers["set-cookie"] as unknown as string[])[0] ?? "";
  await served.get("/api/v1/session").set("Cookie", cookie).expect(401);
});
