import type { Transaction } from "sequelize";
import type { Context } from "@server/http/context";
import { recordAudit } from "./record-audit";

/** Who does something, where and when: what every command needs of a request. */
export type Acting = Pick<Context, "actor" | "scope" | "database" | "clock"> &
  Partial<Pick<Context, "request">>;

type PlaceKind = "site" | "building" | "loop" | "point";

/** Writes what was done to a place in the transaction of the change: neither is kept alone. */
export function recordPlaceEvent(
  acting: Acting,
  place: { readonly kind: PlaceKind; readonly id: string },
  act: "created" | "updated" | "removed",
  details: Record<string, unknown>,
  transaction: Transaction,
): Promise<void> {
  const entry = { kind: `${place.kind}-${act}`, subject: place, details };
  return recordAudit(acting, entry, transaction);
}

/** The changed values of a record, as before → after, for the audit trail. */
export function changesOf<Values extends object>(
  before: Values,
  after: Partial<Values>,
): Record<string, { from: unknown; to: unknown }> {
  const changes: Record<string, { from: unknown; to: unknown }> = {};
  for (const [name, to] of Object.entries(after)) {
    const from = (before as Record<string, unknown>)[name];
    if (to !== undefined && JSON.stringify(from) !== JSON.stringify(to))
      changes[name] = { from, to };
  }
  return changes;
}
