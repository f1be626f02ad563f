import express, { Router, type Request, type RequestHandler, type Response } from "express";
import { rateLimit } from "express-rate-limit";
import { scoped } from "@server/database/scoped";
import type { Actor } from "@server/policies/actor";
import { authenticate } from "@server/security/authenticate";
import type { Services } from "@server/services";
import type { Context, PublicContext } from "./context";
import type { CallLimit, Endpoint } from "./define-endpoint";
import { Denied, NotSignedIn, RateLimited } from "./errors";
import { FileAnswer } from "./file-answer";
import { sendFileAnswer } from "./send-file-answer";

const parseJson = express.json({ limit: "1mb", strict: true });

/** One router for all endpoints: limit → who → may they → body → input → handler → answer. */
export function mountEndpoints(endpoints: readonly Endpoint[], services: Services): Router {
  const router = Router({ caseSensitive: true, strict: true });
  for (const endpoint of endpoints) {
    const { contract, limit } = endpoint;
    const handlers: RequestHandler[] = [serve(endpoint, services)];
    if (limit) handlers.unshift(limiter(limit));
    router[contract.method](contract.path, ...handlers);
  }
  return router;
}

function serve(endpoint: Endpoint, services: Services): RequestHandler {
  return async (request, response) => {
    const actor = await authenticate(request, services);
    if (!endpoint.policy.allows(actor)) throw actor === null ? new NotSignedIn() : new Denied();
    await receiveBody(endpoint, request, response);
    const context = contextOf(request, response, actor, services);
    const answer = await endpoint.run(context, {
      params: request.params,
      query: request.query,
      body: request.body ?? {},
    });
    await sendAnswer(endpoint, response, answer, services);
  };
}

function contextOf(
  request: Request,
  response: Response,
  actor: Actor | null,
  services: Services,
): PublicContext | Context {
  const { config, database, clock } = services;
  const log = request.log ?? services.log;
  const base = { config, database, clock, log, services, request, response };
  return actor === null
    ? { ...base, actor }
    : { ...base, actor, scope: scoped(actor.organisationId) };
}

/** Only after the policy: nobody may make the server read a body they have no right to send. */
async function receiveBody(endpoint: Endpoint, request: Request, response: Response) {
  const receive = endpoint.contract.bodyKind === "json" ? parseJson : endpoint.receive;
  if (receive === undefined)
    throw new Error(`${endpoint.contract.operationId} takes files but has no receive handler`);
  await new Promise<void>((resolve, reject) => {
    receive(request, response, (error?: unknown) => {
      if (error) reject(error);
      else resolve();
    });
  });
}

async function sendAnswer(
  endpoint: Endpoint,
  response: Response,
  answer: unknown,
  services: Services,
): Promise<void> {
  const { contract } = endpoint;
  response.set("Cache-Control", "no-store");
  if (answer instanceof FileAnswer) {
    if (contract.answerKind === "json")
      throw new Error(`${contract.operationId} promises JSON but answered with a file`);
    await sendFileAnswer(response, answer);
    return;
  }
  // A wrong answer must fail where it is made, not in a browser; production trusts the tests.
  const checked = services.config.mode === "production" ? answer : contract.answer.parse(answer);
  response.status(endpoint.status).json(checked);
}

function limiter({ perAddress, minutes, onlyFailures }: CallLimit): RequestHandler {
  return rateLimit({
    windowMs: minutes * 60_000,
    limit: perAddress,
    skipSuccessfulRequests: onlyFailures ?? false,
    standardHeaders: "draft-8",
    legacyHeaders: false,
    handler: (_request, _response, next) => next(new RateLimited(minutes * 60)),
  });
}
