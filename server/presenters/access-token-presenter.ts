import type { z } from "zod";
import type { accessToken } from "@shared/contracts/people";
import { instantText, instantTextOrNull } from "@server/database/conversions";
import type { AccessToken } from "@server/models/access-token";

/** Never the secret: it is shown once, by the endpoint that makes it. */
export function presentAccessToken(token: AccessToken): z.infer<typeof accessToken> {
  return {
    id: token.id,
    name: token.name,
    createdAt: instantText(token.createdAt),
    expiresAt: instantTextOrNull(token.expiresAt ?? null),
    lastUsedAt: instantTextOrNull(token.lastUsedAt ?? null),
  };
}
