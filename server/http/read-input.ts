import type { z } from "zod";
import type { Contract } from "@shared/contracts/contract";
import type { Input } from "./define-endpoint";
import { Invalid, type Bound, type FieldError } from "./errors";

export interface RawInput {
  readonly params: unknown;
  readonly query: unknown;
  readonly body: unknown;
}

function pointer(part: string, path: readonly PropertyKey[]): string {
  const steps = path.map((step) => String(step).replace(/~/g, "~0").replace(/\//g, "~1"));
  return ["", part, ...steps].join("/");
}

const KINDS: Readonly<Record<string, Bound["of"]>> = {
  number: "number",
  int: "number",
  string: "text",
  array: "list",
  set: "list",
};

/** The bound an issue is about; nothing for issues of another kind, and for dates. */
function boundOf(issue: z.core.$ZodIssue): { bound?: Bound } {
  if (issue.code !== "too_big" && issue.code !== "too_small") return {};
  const of = KINDS[issue.origin];
  const limit = issue.code === "too_big" ? issue.maximum : issue.minimum;
  if (of === undefined) return {};
  return { bound: { of, limit: Number(limit), included: issue.inclusive ?? true } };
}

function fieldErrors(part: string, issues: readonly z.core.$ZodIssue[]): FieldError[] {
  return issues.flatMap((issue) =>
    issue.code === "unrecognized_keys"
      ? issue.keys.map((key) => ({
          pointer: pointer(part, [...issue.path, key]),
          code: "unknown-field",
          message: "This field is not known here.",
        }))
      : [
          {
            pointer: pointer(part, issue.path),
            code: issue.code.replace(/_/g, "-"),
            message: issue.message,
            ...boundOf(issue),
          },
        ],
  );
}

/**
 * Checks path parameters, query and body against the contract, all three before answering, so that
 * a form hears of every wrong field at once.
 * @throws Invalid (422) with a pointer per field.
 */
export function readInput<C extends Contract>(contract: C, raw: RawInput): Input<C> {
  const errors: FieldError[] = [];
  const read = (part: "params" | "query" | "body") => {
    const result = contract[part].safeParse(raw[part]);
    if (!result.success) errors.push(...fieldErrors(part, result.error.issues));
    return result.data;
  };
  const input = { params: read("params"), query: read("query"), body: read("body") };
  if (errors.length > 0) throw new Invalid(errors);
  return input as Input<C>;
}
