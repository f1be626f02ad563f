import { QueryTypes } from "sequelize";
import type { ImportHistoryEvent } from "@shared/contracts/import-results";
import { instantText } from "@server/database/conversions";
import type { Database } from "@server/database/connect";
import type { Scope } from "@server/database/scoped";
import { AuditEvent } from "@server/models/audit-event";

/** What of the audit trail belongs to an import's history; single choices are too many to read. */
const KINDS: Readonly<Record<string, ImportHistoryEvent["kind"]>> = {
  "import-opened": "opened",
  "recipe-applied": "recipeApplied",
  "import-confirmed": "confirmed",
  "import-cancelled": "cancelled",
  "import-undone": "undone",
  "import-changed": "changed",
  "import-reopened": "reopened",
};

/** Who did what with an import, oldest first. */
export async function importHistory(scope: Scope, importId: string): Promise<ImportHistoryEvent[]> {
  const events = await AuditEvent.findAll({
    where: {
      organisationId: scope.organisationId,
      subjectKind: "import",
      subjectId: importId,
      kind: Object.keys(KINDS),
    },
    order: [["id", "ASC"]],
  });
  return events.flatMap(({ kind, actorName, at }) => {
    const known = KINDS[kind];
    return known ? [{ kind: known, by: actorName, at: instantText(at) }] : [];
  });
}

/** Who has imported logs, by name. */
export function importPeople({
  database,
  scope,
}: {
  readonly database: Database;
  readonly scope: Scope;
}): Promise<{ accountId: string; name: string }[]> {
  return database.query(
    `SELECT created_by_account_id AS accountId, MAX(created_by_name) AS name FROM log_import
      WHERE organisation_id = :organisationId AND created_by_account_id IS NOT NULL
      GROUP BY created_by_account_id ORDER BY name, accountId`,
    { replacements: { organisationId: scope.organisationId }, type: QueryTypes.SELECT },
  );
}
