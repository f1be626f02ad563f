import express from "express";
import { pino } from "pino";
import { ConnectionRefusedError } from "sequelize";
import supertest from "supertest";
import { answerErrors } from "./answer-errors";

/** An app whose only address fails with the error. */
function failingWith(error: unknown) {
  const app = express();
  app.get("/", () => {
    throw error;
  });
  app.use(answerErrors(pino({ level: "silent" })));
  return supertest(app).get("/");
}

it("shows nothing of an error that was not foreseen", async () => {
  const answer = await failingWith(new Error("SELECT secret FROM cellar")).expect(500);
  expect(answer.body.code).toBe("internal");
  expect(answer.text).not.toContain("cellar");
});

it("asks to come back when the database is away", async () => {
  const answer = await failingWith(new ConnectionRefusedError(new Error("refused"))).expect(503);
  expect(answer.body.code).toBe("database-unavailable");
  expect(answer.headers["retry-after"]).toBe("5");
});
