import { createSecretKey, type KeyObject } from "node:crypto";
import type { CookieOptions, Response } from "express";
import jwt from "jsonwebtoken";
import { z } from "zod";
import type { Config } from "@server/config";

export const cookieName = "loopwright_session";

const claims = z.object({ sid: z.string().regex(/^[0-9a-f]{32}$/) });

let opened: { readonly secret: string; readonly key: KeyObject } | undefined;

/** Given as text, the secret is first tried as a public key, for every cookie that is read. */
function keyOf({ sessionSecret: secret }: Config): KeyObject {
  if (opened?.secret !== secret) opened = { secret, key: createSecretKey(Buffer.from(secret)) };
  return opened.key;
}

function options(config: Config): CookieOptions {
  return {
    httpOnly: true,
    sameSite: "lax",
    secure: config.mode === "production",
    path: "/",
  };
}

/**
 * Hands the browser the session: a signed JWT that only names the session's row, so it tells a
 * thief nothing and dies with the row. Page scripts cannot read it.
 */
export function giveSessionCookie(
  response: Response,
  config: Config,
  session: { id: string; expiresAt: Date },
): void {
  response.cookie(cookieName, signSession(config, session), {
    ...options(config),
    expires: session.expiresAt,
  });
}

export function signSession(config: Config, session: { id: string; expiresAt: Date }): string {
  return jwt.sign(
    { sid: session.id, exp: Math.floor(session.expiresAt.getTime() / 1000) },
    keyOf(config),
    { algorithm: "HS256" },
  );
}

export function takeSessionCookie(response: Response, config: Config): void {
  response.clearCookie(cookieName, options(config));
}

/** The session's id in a cookie of ours; null when it is forged, damaged or out of date. */
export function readSessionCookie(cookie: string, config: Config, now: number): string | null {
  try {
    const payload = jwt.verify(cookie, keyOf(config), {
      algorithms: ["HS256"],
      clockTimestamp: Math.floor(now / 1000),
    });
    return claims.parse(payload).sid;
  } catch (error) {
    if (error instanceof jwt.JsonWebTokenError || error instanceof z.ZodError) return null;
    throw error;
  }
}
