import { z } from "zod";

/**
 * One endpoint of the API, said once: the server's router, the OpenAPI document and the client's
 * typed call are all made from it.
 *
 * `path` is relative to /api/v1 and writes its parameters as `:name`; every one of them is a key of
 * `params`. Query values arrive as text, so query schemas coerce.
 */
export interface Contract<
  Params extends z.ZodType = z.ZodType,
  Query extends z.ZodType = z.ZodType,
  Body extends z.ZodType = z.ZodType,
  Answer extends z.ZodType = z.ZodType,
> {
  readonly operationId: string;
  readonly summary: string;
  readonly tag: string;
  readonly method: "get" | "post" | "put" | "patch" | "delete";
  readonly path: string;
  readonly params: Params;
  readonly query: Query;
  readonly body: Body;
  readonly answer: Answer;
  /** What the body or the answer is when it is not JSON. */
  readonly bodyKind: "json" | "multipart";
  readonly answerKind: "json" | "csv" | "file";
}

export const nothing = z.object({}).strict();

type Given<P, Q, B, A> = Pick<Contract, "operationId" | "summary" | "tag" | "method" | "path"> & {
  params?: P;
  query?: Q;
  body?: B;
  answer: A;
  bodyKind?: Contract["bodyKind"];
  answerKind?: Contract["answerKind"];
};

export function contract<
  A extends z.ZodType,
  P extends z.ZodType = typeof nothing,
  Q extends z.ZodType = typeof nothing,
  B extends z.ZodType = typeof nothing,
>(given: Given<P, Q, B, A>): Contract<P, Q, B, A> {
  return {
    ...given,
    params: given.params ?? (nothing as unknown as P),
    query: given.query ?? (nothing as unknown as Q),
    body: given.body ?? (nothing as unknown as B),
    bodyKind: given.bodyKind ?? "json",
    answerKind: given.answerKind ?? "json",
  };
}

export const id = z.string().regex(/^[1-9]\d{0,18}$/, "an id is a positive whole number, as text");
/**
 * One line of text people give a thing. Control characters are refused: a line break in a name would
 * write lines of its own into letters and CSV files.
 */
export function oneLine(maxLength: number) {
  return z
    .string()
    .trim()
    .min(1)
    .max(maxLength)
    .refine((text) => !/\p{Cc}/u.test(text), "a single line without control characters");
}
export const instant = z.iso.datetime({ offset: true }).describe("UTC instant, ISO 8601");
export const localDate = z.iso.date().describe("calendar day in the site's zone, YYYY-MM-DD");

/** A page of a list; `nextCursor` is null on the last one. */
export function page<Item extends z.ZodType>(item: Item) {
  return z.object({ items: z.array(item), nextCursor: z.string().nullable() });
}

export const pageQuery = z.object({
  cursor: z.string().max(200).optional(),
  limit: z.coerce.number().int().min(1).max(200).default(50),
});

/** RFC 9457 problem document. `code` is stable; `remedy` says in plain words what to do. */
export const problem = z.object({
  type: z.string(),
  title: z.string(),
  status: z.number().int(),
  code: z.string(),
  detail: z.string(),
  remedy: z.string(),
  errors: z
    .array(
      z.object({
        pointer: z.string(),
        code: z.string().describe("stable"),
        message: z.string().describe("in English, for scripts"),
        /** With `too-big` and `too-small`: the bound, so that a client can say it in its own words. */
        bound: z
          .object({
            of: z.enum(["number", "text", "list"]),
            limit: z.number(),
            included: z.boolean().describe("whether the limit itself is allowed"),
          })
          .optional(),
      }),
    )
    .optional(),
});
export type Problem = z.infer<typeof problem>;
