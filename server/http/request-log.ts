import type { RequestHandler } from "express";
import type { Logger } from "pino";
import pinoHttp from "pino-http";

/**
 * A line a request: faults as errors, refusals as info, the rest only for who asks for debug, so that
 * a terminal stays readable. What gives access is never written down.
 */
export function requestLog(log: Logger): RequestHandler {
  return pinoHttp({
    logger: log,
    redact: ["req.headers.authorization", "req.headers.cookie", "res.headers['set-cookie']"],
    customLogLevel: (_request, response, error) => {
      if (error || response.statusCode >= 500) return "error";
      return response.statusCode >= 400 ? "info" : "debug";
    },
  });
}
