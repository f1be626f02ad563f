import { z } from "zod";
import { contract, id, instant, nothing } from "./contract";
import { importDetail } from "./imports";

/** Rows a download of problems lists at most; a last record says how many more there are. */
export const MAX_PROBLEM_ROWS = 100_000;

const importId = z.object({ importId: id });

export const importEventKind = z.enum([
  "opened",
  "recipeApplied",
  "confirmed",
  "cancelled",
  "undone",
  "changed",
  "reopened",
]);

export const importHistoryEvent = z.object({ kind: importEventKind, by: z.string(), at: instant });
export type ImportHistoryEvent = z.infer<typeof importHistoryEvent>;

export const downloadProblemRows = contract({
  operationId: "downloadProblemRows",
  summary:
    "Every row with a problem as CSV: file, line, the row as written, column, cell, reason, remedy",
  tag: "Import",
  method: "get",
  path: "/imports/:importId/problem-rows.csv",
  params: importId,
  query: z.object({ language: z.enum(["en", "de"]).default("en") }),
  answer: nothing,
  answerKind: "csv",
});
export const getImportHistory = contract({
  operationId: "getImportHistory",
  summary: "Who did what with an import, oldest first",
  tag: "Import",
  method: "get",
  path: "/imports/:importId/history",
  params: importId,
  answer: z.object({ items: z.array(importHistoryEvent) }),
});
export const changeImportChoices = contract({
  operationId: "changeImportChoices",
  summary:
    "Take the readings of an import out again and go back to its choices, files and choices kept",
  tag: "Import",
  method: "post",
  path: "/imports/:importId/change-choices",
  params: importId,
  answer: importDetail,
});
export const listImportPeople = contract({
  operationId: "listImportPeople",
  summary: "Who has imported logs: for narrowing the list of imports",
  tag: "Import",
  method: "get",
  path: "/import-people",
  answer: z.object({ items: z.array(z.object({ accountId: id, name: z.string() })) }),
});
