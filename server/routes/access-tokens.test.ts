import { AccessToken } from "@server/models/access-token";
import { signedIn, type Agent } from "@server/testing/factories";
import { testApp } from "@server/testing/test-app";

const app = testApp();

let admin: Agent;
beforeEach(async () => {
  admin = await signedIn(app, { role: "administrator" });
});

const withToken = (secret: string) => ({
  get: (path: string) =>
    app.anonymous.get(`/api/v1${path}`).set("Authorization", `Bearer ${secret}`),
  post: (path: string, body: object) =>
    app.anonymous.post(`/api/v1${path}`).set("Authorization", `Bearer ${secret}`).send(body),
});

async function makeToken(expiresInDays: number | null = null) {
  const { body } = await admin.post("/access-tokens", { name: "meter sync", expiresInDays });
  return body as { id: string; secret: string };
}

it("shows a token's secret once and keeps only its hash", async () => {
  const { id, secret } = await makeToken();
  expect(secret).toMatch(/^lw_[\w-]{43}$/);
  const list = await admin.get("/access-tokens").expect(200);
  expect(list.body.items).toMatchObject([{ id, name: "meter sync", expiresAt: null }]);
  const rows = await AccessToken.findAll({ raw: true });
  expect(JSON.stringify([list.body, rows])).not.toContain(secret);
});

it("lets a script act as its maker, changes included, without cookie or header", async () => {
  const { secret } = await makeToken();
  const script = withToken(secret);
  expect((await script.get("/session").expect(200)).body.role).toBe("administrator");
  await script.post("/members", { email: "by-script@example.org", role: "engineer" }).expect(201);
  const { body } = await admin.get("/access-tokens");
  expect(body.items[0].lastUsedAt).toBe(app.clock.date().toISOString());
});

it("does not let a token make tokens or change the account", async () => {
  const script = withToken((await makeToken()).secret);
  await script.post("/access-tokens", { name: "another", expiresInDays: null }).expect(403);
  await script
    .post("/account/password", { currentPassword: "x", newPassword: "a long enough one" })
    .expect(403);
});

it("refuses a token that is revoked, expired, unknown, or whose maker was disabled", async () => {
  const revoked = await makeToken();
  await admin.delete(`/access-tokens/${revoked.id}`).expect(200);
  await withToken(revoked.secret).get("/session").expect(401);
  await admin.delete(`/access-tokens/${revoked.id}`).expect(404);

  const shortLived = await makeToken(1);
  await withToken(shortLived.secret).get("/session").expect(200);
  app.clock.advance({ days: 1 });
  await withToken(shortLived.secret).get("/session").expect(401);
  await withToken("lw_unknown").get("/health").expect(401);

  const orphaned = await makeToken();
  await admin.membership.update({ state: "disabled" });
  await withToken(orphaned.secret).get("/session").expect(401);
});
