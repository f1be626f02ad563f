import { z } from "zod";
import { contract, id, instant, nothing, page, pageQuery } from "./contract";
import { importState } from "./imports";

/*
 * Many files read by one recipe. Every file becomes an ordinary import of its point; one whose point
 * is not known yet waits without one.
 */
export const MAX_FILES_PER_BATCH = 50;

export const batchFileState = z.enum(["askingPoint", ...importState.options]);
export type BatchFileState = z.infer<typeof batchFileState>;

const energyFigure = z.object({
  kwh: z.number(),
  expandedKwh: z.number().nullable().describe("k = 2; null before it is stored, or unknown"),
});

export const batchFile = z.object({
  id,
  name: z.string(),
  bytes: z.number(),
  loggerSerial: z.string().nullable(),
  importId: id.nullable(),
  state: batchFileState,
  point: z.object({ id, code: z.string(), name: z.string(), loopTag: z.string() }).nullable(),
  pointBy: z.enum(["serial", "fileName", "chosen"]).nullable().describe("how the point was found"),
  rows: z
    .object({
      read: z.number().int(),
      used: z.number().int(),
      leftOut: z.number().int(),
      excluded: z.number().int(),
      noReading: z.number().int(),
    })
    .nullable(),
  firstInstant: instant.nullable(),
  lastInstant: instant.nullable(),
  heating: energyFigure.nullable(),
  cooling: energyFigure.nullable(),
  problems: z.array(
    z.object({
      code: z.enum([
        "pointUnknown",
        "pointAmbiguous",
        "pointDoubtful",
        "unreadable",
        "recipeDiffers",
        "questionsOpen",
        "choicesOpen",
        "sameFile",
        "failed",
        "energyBlocked",
      ]),
      count: z.number().int().nullable(),
      detail: z.string().nullable(),
    }),
  ),
  can: z.object({ choosePoint: z.boolean(), remove: z.boolean() }),
});
export type BatchFile = z.infer<typeof batchFile>;

export const batchSummary = z.object({
  id,
  site: z.object({ id, name: z.string(), zone: z.string() }),
  recipe: z.object({ id: id.nullable(), name: z.string() }),
  createdBy: z.string(),
  createdAt: instant,
  fileCount: z.number().int(),
});
export type BatchSummary = z.infer<typeof batchSummary>;

export const batchDetail = batchSummary.extend({
  files: z.array(batchFile),
  points: z
    .array(z.object({ id, code: z.string(), name: z.string(), loopTag: z.string() }))
    .describe("points in use of the site, to choose from"),
  ready: z.number().int().describe("files that would be imported now"),
  refused: z
    .array(z.object({ batchFileId: id, detail: z.string(), remedy: z.string() }))
    .describe("files that were ready and still refused, in the answer to a confirmation alone"),
  can: z.object({ edit: z.boolean(), confirm: z.boolean() }),
});
export type BatchDetail = z.infer<typeof batchDetail>;

const batchId = z.object({ batchId: id });
const ofFile = z.object({ batchId: id, batchFileId: id });

export const listImportBatches = contract({
  operationId: "listImportBatches",
  summary: "Batches of files, newest first",
  tag: "Import batches",
  method: "get",
  path: "/import-batches",
  query: pageQuery,
  answer: page(batchSummary),
});
export const createImportBatch = contract({
  operationId: "createImportBatch",
  summary: "Open a batch: many files of a site, all read by one recipe",
  tag: "Import batches",
  method: "post",
  path: "/import-batches",
  body: z.object({ recipeId: id, siteId: id }),
  answer: batchDetail,
});
export const getImportBatch = contract({
  operationId: "getImportBatch",
  summary: "One batch: every file with its point, state, rows, energy and problems",
  tag: "Import batches",
  method: "get",
  path: "/import-batches/:batchId",
  params: batchId,
  answer: batchDetail,
});
export const addBatchFile = contract({
  operationId: "addBatchFile",
  summary:
    "Upload one file (multipart, field `file`); its point is found by serial number, then by the point's code in its name",
  tag: "Import batches",
  method: "post",
  path: "/import-batches/:batchId/files",
  params: batchId,
  bodyKind: "multipart",
  answer: batchDetail,
});
export const chooseBatchPoint = contract({
  operationId: "chooseBatchPoint",
  summary: "Say which point a file of a batch belongs to",
  tag: "Import batches",
  method: "put",
  path: "/import-batches/:batchId/files/:batchFileId/points/:pointId",
  params: ofFile.extend({ pointId: id }),
  answer: batchDetail,
});
export const removeBatchFile = contract({
  operationId: "removeBatchFile",
  summary: "Take a file that is not imported out of a batch",
  tag: "Import batches",
  method: "delete",
  path: "/import-batches/:batchId/files/:batchFileId",
  params: ofFile,
  answer: batchDetail,
});
export const confirmImportBatch = contract({
  operationId: "confirmImportBatch",
  summary: "Import every file that asks nothing any more",
  tag: "Import batches",
  method: "post",
  path: "/import-batches/:batchId/confirm",
  params: batchId,
  answer: batchDetail,
});
export const downloadBatchReport = contract({
  operationId: "downloadBatchReport",
  summary: "The batch's report as CSV, one file a record",
  tag: "Import batches",
  method: "get",
  path: "/import-batches/:batchId/report.csv",
  params: batchId,
  answer: nothing,
  answerKind: "csv",
});
