import path from "node:path";
import compression from "compression";
import cookieParser from "cookie-parser";
import express, { type Express, type RequestHandler } from "express";
import { answerErrors } from "./http/answer-errors";
import { clientFiles } from "./http/client-files";
import { NotFound } from "./http/errors";
import { mountEndpoints } from "./http/mount-endpoints";
import { requestLog } from "./http/request-log";
import { securityHeaders } from "./http/security-headers";
import { endpoints } from "./routes";
import { requestGuard } from "./security/request-guard";
import type { Services } from "./services";

const clientFolder = path.join(__dirname, "..", "dist");

/** The whole HTTP side; listening is main's business, so that tests need no port. */
export function createApp(services: Services, options: { clientFolder?: string } = {}): Express {
  const { config, log } = services;
  const app = express();
  app.disable("x-powered-by");
  // A proxy on the same machine may tell the caller's address; nobody else may.
  app.set("trust proxy", "loopback");
  app.use(requestLog(log));
  app.use(securityHeaders(config));
  app.use(compression({ level: 1, threshold: 1024 }));
  app.use("/api/v1", cookieParser(), requestGuard(config), mountEndpoints(endpoints, services));
  app.use("/api", unknownAddress);
  app.use(clientFiles(options.clientFolder ?? clientFolder));
  app.use(answerErrors(log));
  return app;
}

const unknownAddress: RequestHandler = () => {
  throw new NotFound("address in the API");
};
