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
