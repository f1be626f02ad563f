import type { ImportChecks, RepairStepView } from "@shared/contracts/import-checks";
import type { ImportDetail } from "@shared/contracts/imports";

export type LeftOutReason =
  "identicalRepeats" | "conflictingRepeats" | "outOfOrder" | "missingHour" | "unread" | "footer";

export interface RowsOfFiles {
  /** Rows whose time could be read. */
  readonly read: number;
  /** Of those, the ones that are not kept. */
  readonly leftOut: number;
  /** Why, with lines besides that are no rows at all; only what occurred. */
  readonly because: readonly { readonly reason: LeftOutReason; readonly count: number }[];
}

/** What became of the lines of an import's files before any reading was judged. */
export function rowsOfFiles(
  { files }: ImportChecks,
  repair: Pick<ImportDetail["repair"], "outOfOrder" | "missingHour">,
): RowsOfFiles {
  const read = files.reduce((sum, file) => sum + file.rowsRead, 0);
  const kept = files.reduce((sum, file) => sum + file.rowsKept, 0);
  const steps = files.flatMap((file) => file.steps);
  const count = (...codes: readonly RepairStepView["code"][]) =>
    steps.filter(({ code }) => codes.includes(code)).reduce((sum, step) => sum + step.count, 0);
  // A row that ends early is read for what it has; only the other two are left whole.
  const unreadable = steps
    .filter(({ code }) => code === "shortRows")
    .reduce(
      (sum, { countByKind }) => sum + (countByKind.longRow ?? 0) + (countByKind.oversizeRow ?? 0),
      count("unreadableTimes"),
    );
  const all: { reason: LeftOutReason; count: number }[] = [
    { reason: "identicalRepeats", count: count("identicalRepeats") },
    { reason: "conflictingRepeats", count: count("conflictingRepeats") },
    { reason: "outOfOrder", count: repair.outOfOrder === "leaveOut" ? count("outOfOrder") : 0 },
    { reason: "missingHour", count: repair.missingHour === "leaveOut" ? count("missingHour") : 0 },
    { reason: "unread", count: unreadable },
    { reason: "footer", count: count("footer") },
  ];
  return { read, leftOut: read - kept, because: all.filter((entry) => entry.count > 0) };
}
