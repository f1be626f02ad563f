import supertest from "supertest";
import { createApp } from "@server/app";
import { AuditEvent } from "@server/models/audit-event";
import { person, sessionOf, signedIn, testPassword, type Person } from "@server/testing/factories";
import { testApp } from "@server/testing/test-app";
import { failuresAllowed } from "@server/security/sign-in-limit";

const app = testApp();

const signIn = (email: string, password: string) =>
  app.anonymous.post("/api/v1/session").send({ email, password });

function cookieOf(answer: { headers: Record<string, unknown> }): string {
  const [cookie] = answer.headers["set-cookie"] as string[];
  return cookie ?? "";
}

it("signs in with a cookie that page scripts cannot read, and says what the role may do", async () => {
  const { account } = await person(app, { role: "surveyor" });
  const answer = await signIn(account.email.toUpperCase(), testPassword).expect(200);
  expect(cookieOf(answer)).toMatch(/; HttpOnly/);
  expect(cookieOf(answer)).toMatch(/; SameSite=Lax/);
  expect(answer.body).toMatchObject({
    account: { id: account.id, email: account.email },
    role: "surveyor",
    can: { editPoints: true, editSites: false, importLogs: true, manageMembers: false },
  });
  const again = await app.anonymous.get("/api/v1/session").set("Cookie", cookieOf(answer));
  expect(again.body).toEqual(answer.body);
});

it("keeps the cookie to encrypted connections in production", async () => {
  const { account } = await person(app);
  const config = { ...app.config, mode: "production" as const };
  const answer = await supertest(createApp({ ...app.services, config }))
    .post("/api/v1/session")
    .send({ email: account.email, password: testPassword })
    .expect(200);
  expect(cookieOf(answer)).toMatch(/; Secure/);
});

it("answers a wrong name and a wrong password alike", async () => {
  const { account } = await person(app);
  const wrongPassword = await signIn(account.email, "not the password").expect(401);
  const wrongName = await signIn("nobody@example.org", "not the password").expect(401);
  expect(wrongName.body).toEqual(wrongPassword.body);
  expect(wrongName.body.code).toBe("wrong-credentials");
});

it("refuses further attempts on an address, known or not, until the window has passed", async () => {
  const { account } = await person(app);
  for (const email of [account.email, "unknown@example.org"]) {
    for (let attempt = 1; attempt <= failuresAllowed; attempt += 1)
      await signIn(email, "not the password").expect(401);
    const answer = await signIn(email, testPassword).expect(429);
    expect(Number(answer.headers["retry-after"])).toBeGreaterThan(600);
  }
  app.clock.advance({ minutes: 15 });
  await signIn(account.email, testPassword).expect(200);
});

it("refuses an address on the network that keeps failing", async () => {
  const attempt = (email: string) => signIn(email, "x").set("X-Forwarded-For", "203.0.113.9");
  // Refused before any password is looked at, which keeps the test short; they count all the same.
  for (let count = 1; count <= 50; count += 1) await attempt("no address").expect(422);
  await attempt("guess@example.org").expect(429);
});

it("signs out at once, and everywhere when asked", async () => {
  const who: Person = await person(app);
  const [first, second, third] = [
    await sessionOf(app, who),
    await sessionOf(app, who),
    await sessionOf(app, who),
  ];
  await first.delete("/session").expect(200);
  await first.get("/session").expect(401);
  await second.get("/session").expect(200);
  await second.delete("/sessions").expect(200);
  await second.get("/session").expect(401);
  await third.get("/session").expect(401);
});

it("takes no forged, expired or disabled session", async () => {
  const agent = await signedIn(app);
  const [name, token] = agent.cookie.split("=");
  const [header, , signature] = (token ?? "").split(".");
  const claims = Buffer.from(JSON.stringify({ sid: agent.sessionId })).toString("base64url");
  await app.anonymous
    .get("/api/v1/session")
    .set("Cookie", `${name}=${header}.${claims}.${signature}`)
    .expect(401);
  await agent.membership.update({ state: "disabled" });
  await agent.get("/session").expect(401);
  const other = await signedIn(app);
  app.clock.advance({ days: 31 });
  await other.get("/session").expect(401);
});

it("changes name, language and units of the account", async () => {
  const agent = await signedIn(app);
  const changed = await agent.patch("/account", { language: "de", unitSystem: "inchPound" });
  expect(changed.body.account).toMatchObject({ language: "de", unitSystem: "inchPound" });
  const cleared = await agent.patch("/account", { unitSystem: null }).expect(200);
  expect(cleared.body.account).toMatchObject({ language: "de", unitSystem: null });
});

it("records who came, went and was refused, in a trail that cannot be changed", async () => {
  const { account } = await person(app);
  await signIn(account.email, "not the password");
  await signIn(account.email, testPassword);
  const events = await AuditEvent.findAll({ where: { accountId: account.id }, order: ["id"] });
  expect(events.map((event) => event.kind)).toEqual(["sign-in-refused", "signed-in"]);
  const [first] = events;
  await expect(first?.update({ kind: "nothing" })).rejects.toThrow(/never changed/);
  await expect(first?.destroy()).rejects.toThrow(/never changed/);
  await expect(AuditEvent.destroy({ where: {} })).rejects.toThrow(/never changed/);
});
