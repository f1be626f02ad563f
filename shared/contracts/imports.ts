import { z } from "zod";
import { contract, id, instant, nothing, page, pageQuery } from "./contract";
import { energyBlock } from "./energy";
import { ianaZone } from "./places";

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

// The recipe: the same shape as shared/domain/log-files/recipe.ts ------------------------------
export const seriesKind = z.enum(["instantaneous", "meanFromLabel", "meanToLabel"]);
export const dialect = z.object({
  encoding: z.enum(["utf-8", "utf-16le", "utf-16be", "windows-1252"]),
  separator: z.enum([",", ";", "\t", "|", " "]),
  quote: z.enum(['"', "'"]).nullable(),
  headerLine: z.number().int().min(1).nullable(),
  unitsLine: z.number().int().min(1).nullable(),
  firstDataLine: z.number().int().min(1),
});
export const columnMeaning = z.enum([
  "time",
  "date",
  "timeOfDay",
  "flow",
  "supply",
  "return",
  "signal",
  "power",
  "volumeCounter",
  "heatingCounter",
  "coolingCounter",
  "skip",
]);
export const flowUnit = z.enum(["m3/h", "L/s", "L/min", "US gpm"]);
export const temperatureUnit = z.enum(["degC", "degF", "K"]);
export const meterPowerUnit = z.enum(["kW", "MW", "W", "MBH", "ton"]);
export const countedVolumeUnit = z.enum(["m3", "L", "US gal", "ft3"]);
export const countedEnergyUnit = z.enum(["kWh", "MWh", "MJ", "GJ", "kBtu", "MMBtu"]);
export const columnUnit = z.union([
  flowUnit,
  temperatureUnit,
  z.literal("%"),
  meterPowerUnit,
  countedVolumeUnit,
  countedEnergyUnit,
]);
export const columnRecipe = z.object({
  index: z.number().int().min(0),
  header: z.string(),
  meaning: columnMeaning,
  unit: columnUnit.nullable(),
  decimalMark: z.enum([".", ","]),
  capacity: z
    .number()
    .gt(0)
    .max(1e15)
    .nullable()
    .optional()
    .describe("where a counter starts from zero again, in the column's unit; 9999.9 means 10000"),
});
export const meterRecipe = z.object({
  positivePower: z
    .enum(["heating", "cooling", "byTemperature"])
    .nullable()
    .describe("what a positive power is; only asked where the loop changes over"),
  exchangedAt: z.array(instant).max(50).describe("when the meter was exchanged"),
});
export const dateOrder = z.enum(["dayMonthYear", "monthDayYear", "yearMonthDay"]);
export const timeFormat = z.discriminatedUnion("kind", [
  z.object({ kind: z.literal("calendar"), order: dateOrder.nullable() }),
  z.object({ kind: z.literal("epochSeconds") }),
  z.object({ kind: z.literal("epochMilliseconds") }),
  z.object({ kind: z.literal("spreadsheetDays") }),
]);
export const loggerClock = z.discriminatedUnion("kind", [
  z.object({ kind: z.literal("site") }),
  z.object({ kind: z.literal("utc") }),
  z.object({ kind: z.literal("fixedOffset"), offsetMinutes: z.number().int().min(-840).max(840) }),
  z.object({ kind: z.literal("zone"), zone: ianaZone }),
]);
export const fileRecipe = z.object({
  dialect,
  columns: z.array(columnRecipe).max(200),
  time: z.object({ format: timeFormat, clock: loggerClock.nullable() }),
  seriesKind,
  kindChosen: z
    .boolean()
    .optional()
    .describe("true: moments, though the header says the rows are means"),
  meter: meterRecipe.optional().describe("of a permanent meter's file"),
});
export const repairChoices = z.object({
  identicalRepeats: z.enum(["dropRepeats", "leaveOutAll"]),
  conflictingRepeats: z.enum(["keepFirst", "keepLast", "leaveOutAll"]).nullable(),
  outOfOrder: z.enum(["sort", "leaveOut"]),
  sentinels: z.enum(["noReading", "asWritten"]),
  missingHour: z.enum(["leaveOut", "readAsBeforeChange"]),
  weakSignal: z.enum(["exclude", "keep"]).nullable(),
  weakSignalBelowPercent: z.number().min(0).max(100),
  overlap: z.enum(["keepEarlier", "useThis"]).nullable(),
});

// What recognition and the checks found -------------------------------------------------------
const rowExample = z.object({
  line: z.number().int(),
  column: z.string().nullable(),
  cell: z.string().nullable(),
  instantMs: z.number().nullable(),
});
export const repairStep = z.object({
  code: z.enum([
    "unreadableCells",
    "shortRows",
    "unreadableTimes",
    "sentinels",
    "identicalRepeats",
    "conflictingRepeats",
    "outOfOrder",
    "repeatedHour",
    "missingHour",
    "weakSignal",
    "overlapEqual",
    "overlapDifferent",
    "unitConversion",
    "counterRollover",
    "counterReset",
    "counterJump",
    "counterExchange",
    "footer",
  ]),
  count: z.number().int(),
  examples: z.array(rowExample),
  countByKind: z.record(z.string(), z.number()),
});
export type RepairStepView = z.infer<typeof repairStep>;

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
  ]),
  columnIndex: z.number().nullable(),
  line: z.number().nullable(),
  cell: z.string().nullable(),
  certainty: z.enum(["proved", "likely"]),
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
  z.object({ code: z.literal("loggerClock") }),
]);
export type QuestionView = z.infer<typeof question>;

const mib = 1024 * 1024;
export const MAX_FILE_BYTES = 200 * mib;
export const MAX_FILES_PER_IMPORT = 12;

export const importFile = z.object({
  id,
  name: z.string(),
  bytes: z.number(),
  sha256: z.string(),
  uploadedAt: instant,
  /** The same bytes were imported before for this point (and not undone). */
  sameAs: z.object({ importId: id, name: z.string(), importedAt: instant }).nullable(),
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
      preamble: z.array(z.object({ line: z.number(), label: z.string(), value: z.string() })),
    })
    .nullable(),
  recipe: fileRecipe.nullable().describe("the proposed recipe with every answer given so far"),
  questions: z.array(question).describe("what is still to be answered for this file"),
});
export type ImportFile = z.infer<typeof importFile>;

/** What the checking job found over all files, with the choices so far. */
export const importChecks = z.object({
  /** Choices that must be made because the defect occurs: names of repairChoices that are null. */
  undecided: z.array(z.enum(["conflictingRepeats", "weakSignal", "overlap"])),
  files: z.array(
    z.object({
      fileId: id,
      steps: z.array(repairStep),
      rowsRead: z.number().int(),
      rowsKept: z.number().int(),
      firstInstant: instant.nullable(),
      lastInstant: instant.nullable(),
      nominalStepS: z.number().nullable(),
      expectedRows: z.number().int().nullable(),
      gaps: z.array(
        z.object({
          from: instant,
          to: instant,
          missingRows: z.number().int(),
          flowBeforeM3PerHour: z.number().nullable(),
          flowAfterM3PerHour: z.number().nullable(),
        }),
      ),
      gapCount: z.number().int(),
      /** How the first row moved from the logger's clock to UTC. */
      firstRow: z.object({ line: z.number(), cell: z.string(), instant }).nullable(),
      clockChangeInside: z.boolean(),
    }),
  ),
  rows: z.object({
    measured: z.number().int(),
    excluded: z.number().int(),
    noReading: z.number().int(),
    missing: z.number().int(),
    expected: z.number().int(),
  }),
  /** Rows whose flow instant found no temperature within two steps. */
  rowsWithoutTemperature: z.number().int(),
  /** Measured rows at temperatures at which the fluid is not liquid: stored, but without energy. */
  rowsOutsideFluid: z.number().int().optional(),
  liquidC: z
    .object({ lowest: z.number(), highest: z.number() })
    .nullable()
    .optional()
    .describe("the loop's fluid is liquid and known between these, °C"),
  outsideFluidExamples: z
    .array(
      z.object({
        instant,
        channel: z.enum(["supply", "return"]),
        valueC: z.number().nullable(),
        reason: z.string(),
      }),
    )
    .optional(),
  energy: z
    .object({
      heatingKwh: z.number(),
      coolingKwh: z.number(),
      suppressedKwh: z.number(),
      volumeM3: z
        .number()
        .nullable()
        .describe("null where a permanent meter gives the energy and no water was measured"),
      coveredS: z.number(),
    })
    .nullable()
    .describe("null where the loop's energy cannot be worked out, see energyBlockedBy"),
  energyBlockedBy: energyBlock.nullable(),
  /** Rows of a meter's power of the other sign than the loop's service: they give no energy. */
  rowsAgainstRegister: z.number().int().optional(),
  /** A small picture of the whole file: 240 columns of flow and ΔT, null in holes. */
  picture: z
    .object({
      from: instant,
      to: instant,
      flowM3PerHour: z.array(z.number().nullable()),
      supplyC: z.array(z.number().nullable()),
      returnC: z.array(z.number().nullable()),
      quality: z.array(
        z.object({ from: instant, to: instant, kind: z.enum(["measured", "excluded", "missing"]) }),
      ),
    })
    .nullable(),
  /** Names of the checks that found nothing. */
  clean: z.array(z.string()),
  daily: z.array(
    z.object({
      date: z.iso.date(),
      heatingKwh: z.number().nullable(),
      coolingKwh: z.number().nullable(),
      coveredS: z.number(),
      lengthS: z.number(),
    }),
  ),
});
export type ImportChecks = z.infer<typeof importChecks>;

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
  summary: "Upload one logger file (multipart, field `file`); recognition starts at once",
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
