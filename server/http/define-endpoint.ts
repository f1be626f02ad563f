import type { RequestHandler } from "express";
import type { z } from "zod";
import type { Contract } from "@shared/contracts/contract";
import type { Policy } from "@server/policies/policy";
import type { PublicContext } from "./context";
import type { FileAnswer } from "./file-answer";
import { readInput, type RawInput } from "./read-input";

/** Input as the contract's schemas leave it. */
export interface Input<C extends Contract> {
  readonly params: z.output<C["params"]>;
  readonly query: z.output<C["query"]>;
  readonly body: z.output<C["body"]>;
}

/** At most so many calls per address within the minutes; beyond it the answer is 429. */
export interface CallLimit {
  readonly perAddress: number;
  readonly minutes: number;
  /** Count only calls that were refused, so that a busy office is not locked out. */
  readonly onlyFailures?: boolean;
}

interface Definition<C extends Contract, Ctx extends PublicContext> {
  /** Who may call it. There is no default: leaving it out does not compile. */
  readonly policy: Policy<Ctx>;
  /** 200 unless said otherwise; 201 for what makes a thing, 202 for what starts a job. */
  readonly status?: 200 | 201 | 202;
  readonly limit?: CallLimit;
  /** Receives a multipart body (multer with explicit limits); runs after the policy. */
  readonly receive?: RequestHandler;
  /** Load → authorize → act → present. */
  handle(context: Ctx, input: Input<C>): Promise<z.input<C["answer"]> | FileAnswer>;
}

/** An endpoint with its types closed over, so that all of them fit one list. */
export interface Endpoint {
  readonly contract: Contract;
  readonly policy: Pick<Policy<PublicContext>, "name" | "needsActor" | "allows">;
  readonly status: number;
  readonly limit: CallLimit | undefined;
  readonly receive: RequestHandler | undefined;
  /** Validates (Invalid, 422) and runs the handler. The policy has been asked before. */
  run(context: PublicContext, raw: RawInput): Promise<unknown>;
}

/**
 * Ties a contract of `shared/contracts` to who may call it and what it does:
 *
 *     export const endpoints = [
 *       defineEndpoint(getSite, {
 *         policy: may("seeSites"),
 *         async handle({ scope, actor }, { params }) {
 *           const site = await scope.get(Site, params.siteId, "site");
 *           return presentSite(site, actor);
 *         },
 *       }),
 *     ];
 *
 * Routes live in `server/routes/x-routes.ts` and are appended to the list of `routes/index.ts`.
 * Behind `may(…)` and `signedIn` the context has an actor and a scope; behind `everyone` neither.
 */
export function defineEndpoint<C extends Contract, Ctx extends PublicContext>(
  contract: C,
  definition: Definition<C, Ctx>,
): Endpoint {
  const { policy, status, limit, receive, handle } = definition;
  return {
    contract,
    policy: { name: policy.name, needsActor: policy.needsActor, allows: policy.allows },
    status: status ?? 200,
    limit,
    receive,
    async run(context, raw) {
      const input = readInput(contract, raw);
      // mount-endpoints builds a Context wherever the policy needs an actor, which is what the
      // policy's type promises.
      return handle(context as Ctx, input);
    },
  };
}
