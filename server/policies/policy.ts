import type { Context, PublicContext } from "@server/http/context";
import type { Actor } from "./actor";
import { can, type AbilityName } from "./can";

/**
 * Who gets as far as an endpoint's handler. It is asked before the input is looked at, so a refused
 * caller learns nothing from validation. What hangs on a record is asked again inside the handler.
 */
export interface Policy<C extends PublicContext> {
  /** "everyone", "signedIn" or the ability's name; the matrix test reads it. */
  readonly name: string;
  readonly needsActor: boolean;
  allows(actor: Actor | null): boolean;
  /** Only there to tie the policy to the context it promises. */
  readonly context?: C;
}

/** No account needed: signing in, links from letters, health, the API's own document. */
export const everyone: Policy<PublicContext> = {
  name: "everyone",
  needsActor: false,
  allows: () => true,
};

/** Any account, whatever its role. */
export const signedIn: Policy<Context> = {
  name: "signedIn",
  needsActor: true,
  allows: (actor) => actor !== null,
};

/** Accounts whose role has the named ability. */
export function may(ability: AbilityName): Policy<Context> {
  return {
    name: ability,
    needsActor: true,
    allows: (actor) => actor !== null && can(actor)[ability],
  };
}
