import type { ImportChecks, RepairStepView } from "@shared/contracts/import-checks";
import { rowsOfFiles } from "./rows-left-out";

const step = (
  code: RepairStepView["code"],
  count: number,
  countByKind: Record<string, number> = {},
): RepairStepView => ({ code, count, examples: [], countByKind });

const file = (rowsRead: number, rowsKept: number, steps: RepairStepView[]) =>
  ({ fileId: "1", rowsRead, rowsKept, steps }) as unknown as ImportChecks["files"][number];

const checks = (...files: ImportChecks["files"]) => ({ files }) as unknown as ImportChecks;
const sorted = { outOfOrder: "sort", missingHour: "leaveOut" } as const;

it("adds up the rows of all files and names why some are left out", () => {
  const found = rowsOfFiles(
    checks(
      file(100, 96, [step("identicalRepeats", 3), step("missingHour", 1), step("outOfOrder", 9)]),
      file(50, 50, [step("unreadableTimes", 2), step("footer", 1)]),
    ),
    sorted,
  );
  expect(found).toEqual({
    read: 150,
    leftOut: 4,
    because: [
      { reason: "identicalRepeats", count: 3 },
      { reason: "missingHour", count: 1 },
      { reason: "unread", count: 2 },
      { reason: "footer", count: 1 },
    ],
  });
});

it("counts rows out of order only where they are left out", () => {
  const of = (outOfOrder: "sort" | "leaveOut") =>
    rowsOfFiles(checks(file(10, 10, [step("outOfOrder", 4)])), { ...sorted, outOfOrder }).because;
  expect(of("sort")).toEqual([]);
  expect(of("leaveOut")).toEqual([{ reason: "outOfOrder", count: 4 }]);
});

it("does not take a row that ends early for one that is lost", () => {
  const found = rowsOfFiles(
    checks(file(10, 10, [step("shortRows", 5, { shortRow: 3, longRow: 2 })])),
    sorted,
  );
  expect(found.because).toEqual([{ reason: "unread", count: 2 }]);
});
