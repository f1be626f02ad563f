import { OutboxMail } from "@server/models/outbox-mail";
import { PasswordReset } from "@server/models/password-reset";
import { person, sessionOf, testPassword } from "@server/testing/factories";
import { lastLetterTo, secretSentTo } from "@server/testing/outbox";
import { testApp } from "@server/testing/test-app";

const app = testApp();
const newPassword = "supply first, return after";

const post = (path: string, body: object) => app.anonymous.post(`/api/v1${path}`).send(body);
const signIn = (email: string, password: string) => post("/session", { email, password });
const askReset = (email: string) => post("/password-resets", { email });
const reset = (secret: string, password = newPassword) =>
  post("/password-resets/use", { secret, newPassword: password });

it("changes a password after proving the current one, and ends the other sessions", async () => {
  const who = await person(app);
  const [here, elsewhere] = [await sessionOf(app, who), await sessionOf(app, who)];
  const wrong = await here
    .post("/account/password", { currentPassword: "something else", newPassword })
    .expect(422);
  expect(wrong.body.errors).toMatchObject([
    { pointer: "/body/currentPassword", code: "wrong-password" },
  ]);
  await here.post("/account/password", { currentPassword: testPassword, newPassword }).expect(200);
  await here.get("/session").expect(200);
  await elsewhere.get("/session").expect(401);
  await signIn(who.account.email, testPassword).expect(401);
  await signIn(who.account.email, newPassword).expect(200);
  expect((await lastLetterTo(who.account.email)).kind).toBe("password-changed");
});

it("refuses a password that is short, or longer than bcrypt reads", async () => {
  const agent = await sessionOf(app, await person(app));
  for (const bad of ["eleven char", "ü".repeat(37)])
    await agent
      .post("/account/password", { currentPassword: testPassword, newPassword: bad })
      .expect(422);
});

it("answers a request for a reset alike for known and unknown addresses", async () => {
  const { account } = await person(app);
  const [known, unknown] = [await askReset(account.email), await askReset("who@example.org")];
  expect([known.status, known.body]).toEqual([unknown.status, unknown.body]);
  expect(await OutboxMail.count({ where: { toAddress: account.email } })).toBe(1);
  expect(await OutboxMail.count({ where: { toAddress: "who@example.org" } })).toBe(0);
});

it("sets a new password by the link once, and ends every session", async () => {
  const who = await person(app);
  const agent = await sessionOf(app, who);
  await askReset(who.account.email);
  const secret = await secretSentTo(who.account.email);
  await reset(secret).expect(200);
  await agent.get("/session").expect(401);
  await signIn(who.account.email, newPassword).expect(200);
  const again = await reset(secret).expect(410);
  expect(again.body.code).toBe("link-not-valid");
});

it("lets only one of two uses at the same moment through", async () => {
  const { account } = await person(app);
  await askReset(account.email);
  const secret = await secretSentTo(account.email);
  const answers = await Promise.all([
    reset(secret, "the first of the two passwords"),
    reset(secret, "the other of the two passwords"),
  ]);
  expect(answers.map(({ status }) => status).sort()).toEqual([200, 410]);
});

it("keeps a link for an hour only, and no secret in the database", async () => {
  const { account } = await person(app);
  await askReset(account.email);
  const secret = await secretSentTo(account.email);
  const rows = await PasswordReset.findAll({ raw: true });
  expect(JSON.stringify(rows)).not.toContain(secret);
  app.clock.advance({ minutes: 60 });
  await reset(secret).expect(410);
});

it("sends one person three letters an hour at most", async () => {
  const { account } = await person(app);
  await Promise.all([askReset(account.email), askReset(account.email)]);
  await askReset(account.email);
  await askReset(account.email);
  await askReset(account.email);
  expect(await OutboxMail.count({ where: { toAddress: account.email } })).toBe(3);
});
