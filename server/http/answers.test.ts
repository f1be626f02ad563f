import { gzipSync } from "node:zlib";
import { mkdtempSync, mkdirSync, rmSync, writeFileSync } from "node:fs";
import os from "node:os";
import path from "node:path";
import supertest from "supertest";
import { createApp } from "@server/app";
import { signedIn } from "@server/testing/factories";
import { testApp } from "@server/testing/test-app";

const app = testApp();

it("answers health from a real database", async () => {
  const answer = await app.anonymous.get("/api/v1/health").expect(200);
  expect(answer.body).toEqual({
    status: "ok",
    version: expect.any(String),
    now: "2026-03-02T09:00:00.000Z",
  });
});

it("answers an unknown API address with a problem document, not with the page", async () => {
  const answer = await app.anonymous.get("/api/v1/nothing-here").expect(404);
  expect(answer.headers["content-type"]).toMatch("application/problem+json");
  expect(answer.body).toMatchObject({ status: 404, code: "not-found" });
});

it("names every wrong field by pointer, unknown ones too", async () => {
  const admin = await signedIn(app, { role: "administrator" });
  const wrong = await admin.post("/members", { email: "no address" }).expect(422);
  const pointers = wrong.body.errors.map((error: { pointer: string }) => error.pointer);
  expect(pointers).toEqual(["/body/email", "/body/role"]);
  const surplus = await admin.delete("/session?everywhere=1").expect(422);
  expect(surplus.body.errors).toMatchObject([
    { pointer: "/query/everywhere", code: "unknown-field" },
  ]);
});

it("tells broken JSON apart from a fault of its own", async () => {
  const answer = await app.anonymous
    .post("/api/v1/session")
    .set("Content-Type", "application/json")
    .send('{"email":')
    .expect(422);
  expect(answer.body).toMatchObject({ code: "not-json" });
});

it("sends a strict content security policy", async () => {
  const { headers } = await app.anonymous.get("/api/v1/health");
  const policy = headers["content-security-policy"] ?? "";
  expect(policy).toContain("script-src 'self' 'wasm-unsafe-eval'");
  expect(policy).toContain("frame-ancestors 'none'");
  expect(headers["x-powered-by"]).toBeUndefined();
});

it("compresses API answers over 1 KB", async () => {
  const { headers } = await app.anonymous
    .get("/api/v1/openapi.json")
    .set("Accept-Encoding", "gzip");
  expect(headers["content-encoding"]).toBe("gzip");
});

describe("requests from elsewhere", () => {
  it("refuses a change with the cookie but without the application's header", async () => {
    const { cookie } = await signedIn(app);
    const answer = await app.anonymous.delete("/api/v1/session").set("Cookie", cookie).expect(403);
    expect(answer.body.code).toBe("foreign-request");
  });

  it.each([
    ["Origin", "https://elsewhere.example"],
    ["Origin", "null"],
    ["Sec-Fetch-Site", "cross-site"],
    ["Sec-Fetch-Site", "same-site"],
  ])("refuses a change when the browser says %s: %s", async (header, value) => {
    const agent = await signedIn(app);
    await agent.delete("/session").set(header, value).expect(403);
  });

  it("takes a change from its own address", async () => {
    const agent = await signedIn(app);
    await agent.delete("/session").set("Origin", app.config.publicUrl).expect(200);
  });
});

describe("the built client", () => {
  const folder = mkdtempSync(path.join(os.tmpdir(), "loopwright-dist-"));
  const script = "_expo/static/js/web/index-0123456789abcdef0123.js";
  const page = () => supertest(createApp(app.services, { clientFolder: folder }));
  beforeAll(() => {
    mkdirSync(path.join(folder, path.dirname(script)), { recursive: true });
    writeFileSync(path.join(folder, "index.html"), "<p>the page</p>");
    writeFileSync(path.join(folder, script), "run()");
    writeFileSync(path.join(folder, `${script}.gz`), gzipSync("run()"));
  });
  afterAll(() => rmSync(folder, { recursive: true, force: true }));

  it("gets the page for every screen, to be asked for again each time", async () => {
    const answer = await page().get("/sites/4/loops/7").expect(200);
    expect(answer.text).toBe("<p>the page</p>");
    expect(answer.headers["cache-control"]).toBe("no-cache");
  });

  it("gets a hashed file compressed and for good", async () => {
    const answer = await page().get(`/${script}`).set("Accept-Encoding", "gzip").expect(200);
    expect(answer.text).toBe("run()");
    expect(answer.headers).toMatchObject({
      "content-encoding": "gzip",
      "cache-control": "public, max-age=31536000, immutable",
      "content-type": expect.stringContaining("javascript"),
    });
    const plain = await page().get(`/${script}`).set("Accept-Encoding", "identity").expect(200);
    expect(plain.headers["content-encoding"]).toBeUndefined();
  });

  it("is told of a missing file instead of getting the page, and never leaves the folder", async () => {
    await page().get("/_expo/static/js/web/gone.js").expect(404);
    await page()
      .get("/..%2f..%2fetc%2fpasswd")
      .expect((answer) => {
        expect(answer.text).not.toContain("root:");
      });
  });
});
