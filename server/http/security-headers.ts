import type { RequestHandler } from "express";
import helmet from "helmet";
import type { Config } from "@server/config";

/**
 * Headers that keep a flaw small. Scripts only from our own files, plus WebAssembly for the charts;
 * inline styles because React Native Web writes its style sheet at run time.
 */
export function securityHeaders(config: Config): RequestHandler {
  const secure = new URL(config.publicUrl).protocol === "https:";
  return helmet({
    contentSecurityPolicy: {
      useDefaults: false,
      directives: {
        defaultSrc: ["'self'"],
        scriptSrc: ["'self'", "'wasm-unsafe-eval'"],
        styleSrc: ["'self'", "'unsafe-inline'"],
        imgSrc: ["'self'", "data:", "blob:"],
        fontSrc: ["'self'"],
        connectSrc: ["'self'"],
        workerSrc: ["'self'"],
        objectSrc: ["'none'"],
        baseUri: ["'self'"],
        formAction: ["'self'"],
        frameAncestors: ["'none'"],
        // On plain http it would turn every request into one that nothing answers.
        ...(secure ? { upgradeInsecureRequests: [] } : {}),
      },
    },
    strictTransportSecurity: secure ? { maxAge: 31_536_000 } : false,
    referrerPolicy: { policy: "same-origin" },
  }) as RequestHandler;
}
