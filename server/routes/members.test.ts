import { Membership } from "@server/models/membership";
import { person, signedIn, testPassword, type Agent } from "@server/testing/factories";
import { lastLetterTo, secretSentTo } from "@server/testing/outbox";
import { testApp } from "@server/testing/test-app";

const app = testApp();

const accept = (secret: string, given: object = {}) =>
  app.anonymous
    .post("/api/v1/invitations/accept")
    .send({ secret, name: "Nele Brandt", password: "a password of her own", ...given });

let admin: Agent;
beforeEach(async () => {
  admin = await signedIn(app, { role: "administrator", name: "Ada Admin" });
});

let invitations = 0;
async function invite(by: Agent = admin): Promise<{ id: string; email: string; secret: string }> {
  invitations += 1;
  const email = `invited-${invitations}@example.org`;
  const answer = await by.post("/members", { email, role: "surveyor" }).expect(201);
  return { id: answer.body.id, email, secret: await secretSentTo(email) };
}

it("invites by letter; the link shows what it is for, and accepting it signs in", async () => {
  const { id, email, secret } = await invite();
  const shown = await app.anonymous.post("/api/v1/invitations/read").send({ secret }).expect(200);
  expect(shown.body).toMatchObject({ email, role: "surveyor", hasAccount: false });
  expect((await lastLetterTo(email)).bodyText).toContain("Ada Admin");
  const accepted = await accept(secret).expect(200);
  expect(accepted.body).toMatchObject({
    account: { email, name: "Nele Brandt" },
    role: "surveyor",
  });
  const cookie = (accepted.headers["set-cookie"] as unknown as string[])[0] ?? "";
  await app.anonymous.get("/api/v1/session").set("Cookie", cookie).expect(200);
  const { body } = await admin.get("/members").expect(200);
  expect(body.items).toContainEqual(
    expect.objectContaining({ id, name: "Nele Brandt", state: "active", isSelf: false }),
  );
});

it("takes a link once, for seven days, and not after another was sent or it was withdrawn", async () => {
  const used = await invite();
  await accept(used.secret).expect(200);
  await accept(used.secret, { name: "Somebody Else" }).expect(410);

  const resent = await invite();
  await admin.post(`/members/${resent.id}/invitation`).expect(200);
  await accept(resent.secret).expect(410);
  await accept(await secretSentTo(resent.email)).expect(200);

  const withdrawn = await invite();
  await admin.delete(`/members/${withdrawn.id}`).expect(200);
  await accept(withdrawn.secret).expect(410);

  const late = await invite();
  app.clock.advance({ days: 7 });
  await accept(late.secret).expect(410);
});

it("asks somebody with an account elsewhere for its password, which stays", async () => {
  const { account } = await person(app);
  await admin.post("/members", { email: account.email, role: "engineer" }).expect(201);
  const secret = await secretSentTo(account.email);
  await accept(secret, { password: "not that password" }).expect(422);
  const accepted = await accept(secret, { password: testPassword }).expect(200);
  expect(accepted.body.account).toMatchObject({ id: account.id, name: account.name });
});

it("refuses a second invitation, and lets somebody removed come back as themselves", async () => {
  const { id, email, secret } = await invite();
  const twice = await admin.post("/members", { email, role: "engineer" }).expect(409);
  expect(twice.body.code).toBe("already-invited");
  await accept(secret).expect(200);
  const member = await admin.post("/members", { email, role: "engineer" }).expect(409);
  expect(member.body.code).toBe("already-member");
  await admin.delete(`/members/${id}`).expect(200);
  const back = await admin.post("/members", { email, role: "engineer" }).expect(201);
  expect(back.body).toMatchObject({ id, role: "engineer", state: "invited", name: null });
});

it("ends a disabled member's session at once, and lets them in again when enabled", async () => {
  const surveyor = await signedIn(app, {
    role: "surveyor",
    organisationId: admin.organisationId,
  });
  const path = `/members/${surveyor.membership.id}`;
  await admin.patch(path, { state: "disabled" }).expect(200);
  await surveyor.get("/session").expect(401);
  const signIn = () =>
    app.anonymous
      .post("/api/v1/session")
      .send({ email: surveyor.account.email, password: testPassword });
  await signIn().expect(401);
  await admin.patch(path, { state: "active", role: "engineer" }).expect(200);
  expect((await signIn().expect(200)).body.role).toBe("engineer");
});

it("keeps the last active administrator, whichever way they would go", async () => {
  const path = `/members/${admin.membership.id}`;
  for (const attempt of [
    admin.patch(path, { role: "engineer" }),
    admin.patch(path, { state: "disabled" }),
    admin.delete(path),
  ])
    expect((await attempt.expect(409)).body.code).toBe("last-administrator");
});

it("keeps one of two administrators who remove each other at the same moment", async () => {
  const { organisationId } = admin;
  const other = await signedIn(app, { role: "administrator", organisationId });
  const answers = await Promise.all([
    admin.delete(`/members/${other.membership.id}`),
    other.delete(`/members/${admin.membership.id}`),
  ]);
  expect(answers.filter(({ status }) => status === 200)).toHaveLength(1);
  const left = await Membership.count({ where: { organisationId, state: "active" } });
  expect(left).toBe(1);
});

it("pages through the members and holds nobody back or twice", async () => {
  const { organisationId } = admin;
  for (let count = 0; count < 4; count += 1) await person(app, { organisationId });
  const seen: string[] = [];
  let cursor: string | null = null;
  do {
    const query: string = cursor === null ? "" : `&cursor=${cursor}`;
    const { body } = await admin.get(`/members?limit=2${query}`).expect(200);
    seen.push(...body.items.map((member: { id: string }) => member.id));
    cursor = body.nextCursor;
  } while (cursor !== null);
  expect(seen).toHaveLength(5);
  expect(new Set(seen).size).toBe(5);
});

it("writes letters in the inviter's language, with names that cannot break the page", async () => {
  await admin.patch("/account", { language: "de", name: "<b>Ada</b>" }).expect(200);
  const { email } = await invite();
  const letter = await lastLetterTo(email);
  expect(letter.subject).toMatch(/^Einladung zu /);
  expect(letter.bodyHtml).toContain("&lt;b&gt;Ada&lt;/b&gt;");
});
