import type { Request, RequestHandler } from "express";
import type { Config } from "@server/config";
import { Denied } from "@server/http/errors";
import { bearerOf } from "./authenticate";
import { cookieName } from "./session-cookie";

export const guardHeader = "X-Loopwright-Request";

const safeMethods = new Set(["GET", "HEAD", "OPTIONS"]);

function isLoopback(origin: string): boolean {
  return /^http:\/\/(localhost|127\.0\.0\.1|\[::1\])(:\d+)?$/.test(origin);
}

function isOwnOrigin(origin: string, request: Request, config: Config): boolean {
  if (origin === new URL(config.publicUrl).origin) return true;
  if (origin === `${request.protocol}://${request.get("host") ?? ""}`) return true;
  // The client's development server passes requests on under its own port.
  return config.mode === "development" && isLoopback(origin);
}

/**
 * Keeps other web sites from acting with a visitor's session (CSRF). A request that changes
 * something must not come from another origin as far as the browser tells (Origin,
 * Sec-Fetch-Site), and with the session cookie it must carry a header that forms and foreign
 * scripts cannot send. A bearer token needs neither, because no browser adds it by itself.
 */
export function requestGuard(config: Config): RequestHandler {
  return (request, _response, next) => {
    if (safeMethods.has(request.method) || bearerOf(request) !== null) return next();
    const origin = request.get("origin");
    const site = request.get("sec-fetch-site");
    const foreign =
      (origin !== undefined && !isOwnOrigin(origin, request, config)) ||
      (site !== undefined && site !== "same-origin" && site !== "none");
    const withCookie = typeof request.cookies?.[cookieName] === "string";
    if (foreign || (withCookie && request.get(guardHeader) !== "1")) {
      return next(
        new Denied(
          "This request did not come from the application itself.",
          `Send the header ${guardHeader}: 1 from the application's own address, or use a bearer token.`,
          "foreign-request",
        ),
      );
    }
    return next();
  };
}
