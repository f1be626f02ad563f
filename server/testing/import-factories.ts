import { Readable } from "node:stream";
import { recipeRepair } from "@shared/contracts/recipes";
import { DEFAULT_REPAIR_CHOICES, type FileRecipe } from "@shared/domain/log-files/recipe";
import { ImportBatch } from "@server/models/import-batch";
import { ImportBatchFile } from "@server/models/import-batch-file";
import { LogFile } from "@server/models/log-file";
import { LogImport } from "@server/models/log-import";
import { Recipe } from "@server/models/recipe";
import type { Person } from "./factories";
import type { TestApp } from "./test-app";

/** How a file with the columns time, flow, supply and return is read. */
export const plainRecipe: FileRecipe = {
  dialect: {
    encoding: "utf-8",
    separator: ",",
    quote: null,
    headerLine: 1,
    unitsLine: null,
    firstDataLine: 2,
  },
  columns: [
    { index: 0, header: "time", meaning: "time", unit: null, decimalMark: "." },
    { index: 1, header: "flow", meaning: "flow", unit: "m3/h", decimalMark: "." },
    { index: 2, header: "supply", meaning: "supply", unit: "degC", decimalMark: "." },
    { index: 3, header: "return", meaning: "return", unit: "degC", decimalMark: "." },
  ],
  time: { format: { kind: "calendar", order: "yearMonthDay" }, clock: { kind: "utc" } },
  seriesKind: "instantaneous",
};

/** An import with one file that has been recognised and asks nothing. */
export async function recognisedImport(
  app: TestApp,
  owner: { readonly organisationId: string; readonly pointId: string },
): Promise<{ row: LogImport; file: LogFile }> {
  const now = app.clock.date();
  const content = "time,flow,supply,return\n2025-07-14 06:00,28.8,6.9,12.8\n";
  const stored = await app.services.files.put(Readable.from([Buffer.from(content)]));
  const row = await LogImport.create({
    ...owner,
    state: "asking",
    repair: DEFAULT_REPAIR_CHOICES,
    createdByAccountId: null,
    createdByName: "Somebody",
    createdAt: now,
  });
  const file = await LogFile.create({
    ...owner,
    ...stored,
    importId: row.id,
    name: "log.csv",
    uploadedAt: now,
    recipe: plainRecipe,
    questions: [],
    recognition: {
      asked: [],
      proofs: [],
      firstLines: [],
      sampleRows: [],
      dataRowCount: 1,
      columnCount: 4,
      preamble: [],
    },
  });
  return { row, file };
}

/** A saved recipe of a person's own, made from a file as {@link plainRecipe} reads it. */
export function savedRecipe(app: TestApp, { organisationId, account }: Person): Promise<Recipe> {
  return Recipe.create({
    organisationId,
    name: "Plain logger",
    fingerprint: "0".repeat(64),
    recipe: plainRecipe,
    repair: recipeRepair.parse(DEFAULT_REPAIR_CHOICES),
    shared: false,
    createdByAccountId: account.id,
    createdByName: account.name,
    createdAt: app.clock.date(),
  });
}

/** A batch of a site with one file whose point nobody has said yet. */
export async function batchOfSite(app: TestApp, recipe: Recipe, siteId: string) {
  const { organisationId } = recipe;
  const now = app.clock.date();
  const stored = await app.services.files.put(Readable.from([Buffer.from("time,flow\n")]));
  const batch = await ImportBatch.create({
    organisationId,
    siteId,
    recipeId: recipe.id,
    recipeName: recipe.name,
    createdByAccountId: recipe.createdByAccountId,
    createdByName: recipe.createdByName,
    createdAt: now,
  });
  const file = await ImportBatchFile.create({
    organisationId,
    batchId: batch.id,
    name: "log.csv",
    ...stored,
    uploadedAt: now,
  });
  return { batchId: batch.id, batchFileId: file.id };
}
