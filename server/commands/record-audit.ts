import type { Transaction } from "sequelize";
import type { PublicContext } from "@server/http/context";
import { AuditEvent } from "@server/models/audit-event";

export interface AuditEntry {
  /** What was done, in the past tense: "signed-in", "member-invited", "log-imported". */
  readonly kind: string;
  readonly subject?: { readonly kind: string; readonly id: string };
  readonly details?: Record<string, unknown>;
  /** For acts of somebody whom the request does not name yet, such as signing in. */
  readonly by?: { accountId: string | null; name: string; organisationId: string | null };
}

type Surroundings = Pick<PublicContext, "actor" | "clock"> &
  Partial<Pick<PublicContext, "request">>;

/** Appends to the audit trail, in the transaction of the act where there is one. No secrets. */
export async function recordAudit(
  { actor, clock, request }: Surroundings,
  entry: AuditEntry,
  transaction?: Transaction,
): Promise<void> {
  await AuditEvent.create(
    {
      organisationId: entry.by?.organisationId ?? actor?.organisationId ?? null,
      accountId: entry.by?.accountId ?? actor?.accountId ?? null,
      actorName: entry.by?.name ?? actor?.accountName ?? "nobody",
      kind: entry.kind,
      subjectKind: entry.subject?.kind ?? null,
      subjectId: entry.subject?.id ?? null,
      details: entry.details ?? null,
      address: request?.ip ?? null,
      at: clock.date(),
    },
    { transaction },
  );
}
