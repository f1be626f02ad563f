import type { Contract } from "@shared/contracts/contract";
import type { z } from "zod";
import { ApiError, NoAnswer, problemFrom } from "./api-error";
import { addressOf } from "./address";

/** Sent with every request: a page of another origin cannot add it, so the cookie alone is no key. */
export const GUARD_HEADERS = { "X-Loopwright-Request": "1" } as const;

type Part<S extends z.ZodType, Name extends string> =
  Record<string, never> extends z.input<S>
    ? { readonly [K in Name]?: z.input<S> }
    : { readonly [K in Name]: z.input<S> };

export type CallInput<C extends Contract> = Part<C["params"], "params"> &
  Part<C["query"], "query"> &
  Part<C["body"], "body"> & { readonly signal?: AbortSignal };

/**
 * One call of the API, typed by its contract.
 *
 * @throws ApiError with the problem document where the server refuses
 * @throws NoAnswer where nothing answers
 */
export async function call<C extends Contract>(
  contract: C,
  input: CallInput<C>,
): Promise<z.output<C["answer"]>> {
  const body = (input as { body?: unknown }).body;
  const response = await answer(addressOf(contract, input), {
    method: contract.method.toUpperCase(),
    credentials: "same-origin",
    headers: {
      ...GUARD_HEADERS,
      Accept: "application/json",
      ...(body === undefined ? {} : { "Content-Type": "application/json" }),
    },
    body: body === undefined ? undefined : JSON.stringify(body),
    signal: input.signal,
  });
  const text = await response.text();
  if (!response.ok) throw new ApiError(problemFrom(response.status, text));
  return contract.answer.parse(text === "" ? {} : JSON.parse(text)) as z.output<C["answer"]>;
}

async function answer(address: string, init: RequestInit): Promise<Response> {
  try {
    return await fetch(address, init);
  } catch (cause) {
    if (init.signal?.aborted) throw cause;
    throw new NoAnswer(cause);
  }
}
