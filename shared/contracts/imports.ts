import { z } from "zod";
import { contract, id, instant, nothing, page, pageQuery } from "./contract";
import { importChecks } from "./import-checks";
import {
  columnMeaning,
  columnUnit,
  dateOrder,
  fileRecipe,
  flowUnit,
  repairChoices,
} from "./log-recipe";

/*
 * An import takes one or several files of one metering point from bytes to stored readings:
 *
 *   open (files can be added) → reading (a job recognises the files)
 *     → asking (questions or choices wait) → checking (a job runs the whole import without storing)
 *     → ready → importing → imported → undone (and back to ready, choices kept)
 *   failed, cancelled
 *
 * Nothing is stored as readings before `importing` commits, and it commits in one transaction.
 */
export const importState = z.enum([
  "open",
  "reading",
  "asking",
  "checking",
  "ready",
  "importing",
  "imported",
  "undone",
  "failed",
  "cancelled",
]);
export type ImportState = z.infer<typeof importState>;

// What recognition and the checks found -------------------------------------------------------
const proof = z.object({
  about: z.enum([
    "encoding",
    "separator",
    "headerLine",
    "unitsLine",
    "decimalMark",
    "dateOrder",
    "columnMeaning",
    "columnUnit",
    "seriesKind",
    "century",
  ]),
  columnIndex: z.number().nullable(),
  line: z.number().nullable(),
  cell: z.string().nullable(),
  certainty: z.enum(["proved", "likely"]),
});
const pointSet = z.object({
  name: z.string().describe("what the headers of the set have in common"),
  columns: z.array(
    z.object({ index: z.number().int(), meaning: columnMeaning, unit: columnUnit.nullable() }),
  ),
});
export const question = z.discriminatedUnion("code", [
  z.object({
    code: z.literal("dateOrder"),
    choices: z.array(dateOrder),
    firstCell: z.string(),
    lastCell: z.string(),
    stepSeconds: z.array(z.number().nullable()),
  }),
  z.object({
    code: z.literal("flowUnit"),
    columnIndex: z.number(),
    minValue: z.number(),
    maxValue: z.number(),
    choices: z.array(flowUnit),
  }),
  z.object({
    code: z.literal("temperatureUnit"),
    columnIndex: z.number(),
    minValue: z.number(),
    maxValue: z.number(),
  }),
  z.object({
    code: z.literal("decimalMark"),
    columnIndex: z.number(),
    cell: z.string(),
    line: z.number(),
  }),
  z.object({ code: z.literal("columnMeaning"), meaning: columnMeaning }),
  z.object({
    code: z.literal("columnUnit"),
    columnIndex: z.number(),
    minValue: z.number(),
    maxValue: z.number(),
    choices: z.array(columnUnit),
  }),
  z.object({
    code: z.literal("seriesKind"),
    columnIndex: z.number(),
    header: z.string(),
  }),
  z.object({
    code: z.literal("positivePower"),
    columnIndex: z.number(),
    minValue: z.number(),
    maxValue: z.number(),
  }),
  z.object({
    code: z.literal("pulseValue"),
    columnIndex: z.number(),
    minValue: z.number(),
    maxValue: z.number(),
  }),
  z.object({
    code: z.literal("statusWords"),
    columnIndex: z.number(),
    words: z.array(
      z.object({
        word: z.string(),
        count: z.number().int(),
        likely: z.enum(["bad", "good"]).nullable(),
      }),
    ),
  }),
  z.object({
    code: z.literal("alikeColumns"),
    columnIndexes: z.array(z.number()),
    meanings: z.array(columnMeaning),
  }),
  z.object({ code: z.literal("whichSet"), sets: z.array(pointSet) }),
  z.object({ code: z.literal("pointBore"), columnIndex: z.number() }),
  z.object({ code: z.literal("loggerClock") }),
]);
export type QuestionView = z.infer<typeof question>;

const mib = 1024 * 1024;
export const MAX_FILE_BYTES = 200 * mib;
export const MAX_FILES_PER_IMPORT = 12;

const leftOut = z.object({
  name: z.string(),
  because: z.enum(["noLog", "notText", "hiddenSheet", "sameFile", "emptySheet"]),
});
/** The workbook or archive a log came in, and what of it was not taken. */
export const fileSource = z.object({
  kind: z.enum(["xlsx", "zip", "gzip"]),
  name: z.string(),
  bytes: z.number(),
  sha256: z.string(),
  member: z.string().nullable().describe("the sheet or the path in the archive"),
  leftOut: z.array(leftOut),
  formulasWithoutValue: z.number().int(),
  nameMisleads: z.boolean().describe("the ending promises another kind of file"),
  countsFrom1904: z.boolean(),
});

/** What lines above the header say, held against the record of the point. */
export const fileFact = z.object({
  kind: z.enum([
    "serial",
    "loggerSerial",
    "meterSerial",
    "supplyProbeSerial",
    "returnProbeSerial",
    "probeSerial",
    "boreMm",
    "outsideDiameterMm",
    "wallMm",
    "pipeMaterial",
    "fluid",
    "soundSpeedMPerS",
    "intervalS",
    "unitSetting",
    "clock",
    "siteName",
    "pointName",
  ]),
  line: z.number().int(),
  label: z.string(),
  cell: z.string().describe("as written"),
  value: z.number().nullable().describe("in the unit the kind names; null where it is unclear"),
  verdict: z.enum(["matches", "differs", "notRecorded", "unclear", "shown"]),
  recorded: z.union([z.string(), z.number()]).nullable(),
  weight: z.enum(["stop", "look"]).nullable().describe("how much it matters that it differs"),
});
export type FileFact = z.infer<typeof fileFact>;

export const importFile = z.object({
  id,
  name: z.string(),
  bytes: z.number().describe("of the text that is read"),
  sha256: z.string().describe("of the text that is read"),
  source: fileSource.nullable().describe("null where the upload was the text itself"),
  uploadedAt: instant,
  /** The same bytes were imported before for this point (and not undone). */
  sameAs: z.object({ importId: id, name: z.string(), importedAt: instant }).nullable(),
  alsoFor: z
    .array(
      z.object({
        importId: id,
        point: z.object({ id, code: z.string(), name: z.string() }),
        loopTag: z.string(),
        sameColumns: z.array(z.number().int()).describe("columns that both points read"),
      }),
    )
    .describe("imports of the same text for other points"),
  unreadable: z
    .object({ code: z.string(), line: z.number().nullable(), cell: z.string().nullable() })
    .nullable(),
  recognition: z
    .object({
      proofs: z.array(proof),
      firstLines: z.array(z.string()),
      sampleRows: z.array(z.object({ line: z.number(), cells: z.array(z.string()) })),
      dataRowCount: z.number(),
      columnCount: z.number(),
      pointSets: z.array(pointSet).describe("two sets of columns or more, each of another point"),
      preamble: z.array(z.object({ line: z.number(), label: z.string(), value: z.string() })),
    })
    .nullable(),
  recipe: fileRecipe.nullable().describe("the proposed recipe with every answer given so far"),
  questions: z.array(question).describe("what is still to be answered for this file"),
  facts: z.array(fileFact).describe("what the file says about pipe, kit and settings"),
  heldAgainst: id.nullable().describe("the installation its facts were held against"),
});
export type ImportFile = z.infer<typeof importFile>;

export const importProgress = z.object({
  stage: z.enum(["waiting", "recognising", "reading", "checking", "storing", "energy", "done"]),
  rowsRead: z.number().int(),
  rowsTotal: z.number().int().nullable(),
  secondsLeft: z.number().nullable(),
});

export const importSummary = z.object({
  id,
  state: importState,
  point: z.object({ id, code: z.string(), name: z.string() }),
  loop: z.object({
    id,
    tag: z.string(),
    name: z.string(),
    service: z.enum(["chilled", "hot", "changeover"]),
  }),
  site: z.object({ id, name: z.string(), zone: z.string() }),
  buildingName: z.string().nullable(),
  fileNames: z.array(z.string()),
  createdBy: z.string(),
  createdAt: instant,
  importedAt: instant.nullable(),
  rowsStored: z.number().int().nullable(),
  firstInstant: instant.nullable(),
  lastInstant: instant.nullable(),
  failure: z.object({ code: z.string(), detail: z.string(), remedy: z.string() }).nullable(),
  progress: importProgress.nullable(),
  can: z.object({
    edit: z.boolean(),
    confirm: z.boolean(),
    undo: z.boolean(),
    cancel: z.boolean(),
    reopen: z.boolean(),
  }),
});
export type ImportSummary = z.infer<typeof importSummary>;

export const importDetail = importSummary.extend({
  files: z.array(importFile),
  repair: repairChoices,
  checks: importChecks.nullable(),
  pipe: z.object({ insideDiameterMm: z.number(), label: z.string() }).nullable(),
  meterSide: z.enum(["supply", "return"]),
  pressure: z.object({ absoluteMPa: z.number(), assumed: z.boolean() }),
});
export type ImportDetail = z.infer<typeof importDetail>;

const importId = z.object({ importId: id });
const fileId = z.object({ importId: id, fileId: id });

export const listImports = contract({
  operationId: "listImports",
  summary: "Imports, newest first",
  tag: "Import",
  method: "get",
  path: "/imports",
  query: pageQuery.extend({
    pointId: id.optional(),
    siteId: id.optional(),
    state: importState.optional(),
    personId: id.optional().describe("account of who opened the import"),
  }),
  answer: page(importSummary),
});
export const createImport = contract({
  operationId: "createImport",
  summary: "Open an import for a metering point",
  tag: "Import",
  method: "post",
  path: "/points/:pointId/imports",
  params: z.object({ pointId: id }),
  answer: importDetail,
});
export const getImport = contract({
  operationId: "getImport",
  summary: "One import: files, questions, choices, checks, progress, result",
  tag: "Import",
  method: "get",
  path: "/imports/:importId",
  params: importId,
  answer: importDetail,
});
export const addImportFile = contract({
  operationId: "addImportFile",
  summary:
    "Upload one logger file as text, .xlsx, .zip or .gz (multipart, field `file`); it is read at once",
  tag: "Import",
  method: "post",
  path: "/imports/:importId/files",
  params: importId,
  bodyKind: "multipart",
  answer: importDetail,
});
export const removeImportFile = contract({
  operationId: "removeImportFile",
  summary: "Take a file out of an import that is not confirmed",
  tag: "Import",
  method: "delete",
  path: "/imports/:importId/files/:fileId",
  params: fileId,
  answer: importDetail,
});
export const alsoForPoint = contract({
  operationId: "alsoForPoint",
  summary: "Open an import of the same file for another point of the site, without another upload",
  tag: "Import",
  method: "post",
  path: "/imports/:importId/files/:fileId/also",
  params: fileId,
  body: z.object({ pointId: id }),
  answer: importDetail,
});
export const chooseRecipe = contract({
  operationId: "chooseRecipe",
  summary:
    "Give or change how one file is read; answers its questions; another header line or separator recognises the file again",
  tag: "Import",
  method: "put",
  path: "/imports/:importId/files/:fileId/recipe",
  params: fileId,
  body: fileRecipe,
  answer: importDetail,
});
export const chooseRepairs = contract({
  operationId: "chooseRepairs",
  summary: "Choose what happens to each kind of defect",
  tag: "Import",
  method: "patch",
  path: "/imports/:importId/repairs",
  params: importId,
  body: repairChoices.partial(),
  answer: importDetail,
});
export const checkImport = contract({
  operationId: "checkImport",
  summary: "Run the whole import without storing anything; refused while questions are open",
  tag: "Import",
  method: "post",
  path: "/imports/:importId/check",
  params: importId,
  answer: importDetail,
});
export const confirmImport = contract({
  operationId: "confirmImport",
  summary: "Store the readings and work out the energy; refused while anything is undecided",
  tag: "Import",
  method: "post",
  path: "/imports/:importId/confirm",
  params: importId,
  answer: importDetail,
});
export const cancelImport = contract({
  operationId: "cancelImport",
  summary: "Stop an import that is not finished; nothing of it is stored",
  tag: "Import",
  method: "post",
  path: "/imports/:importId/cancel",
  params: importId,
  answer: importDetail,
});
export const undoImport = contract({
  operationId: "undoImport",
  summary: "Take all readings of an import out again and work the energy out anew",
  tag: "Import",
  method: "post",
  path: "/imports/:importId/undo",
  params: importId,
  answer: importDetail,
});
export const reopenImport = contract({
  operationId: "reopenImport",
  summary:
    "Go back to the choices of an undone, failed or cancelled import, files and choices kept",
  tag: "Import",
  method: "post",
  path: "/imports/:importId/reopen",
  params: importId,
  answer: importDetail,
});
export const downloadLogFile = contract({
  operationId: "downloadLogFile",
  summary: "The file as it was uploaded, byte for byte",
  tag: "Import",
  method: "get",
  path: "/imports/:importId/files/:fileId/raw",
  params: fileId,
  answer: nothing,
  answerKind: "file",
});
export const downloadLogText = contract({
  operationId: "downloadLogText",
  summary: "The text that is read: of an uploaded workbook or archive, the member's",
  tag: "Import",
  method: "get",
  path: "/imports/:importId/files/:fileId/text",
  params: fileId,
  answer: nothing,
  answerKind: "file",
});
export const previewLogRows = contract({
  operationId: "previewLogRows",
  summary: "Rows of a file as written, from a line on",
  tag: "Import",
  method: "get",
  path: "/imports/:importId/files/:fileId/rows",
  params: fileId,
  query: z.object({
    line: z.coerce.number().int().min(1).default(1),
    limit: z.coerce.number().int().min(1).max(100).default(20),
  }),
  answer: z.object({ rows: z.array(z.object({ line: z.number(), cells: z.array(z.string()) })) }),
});
