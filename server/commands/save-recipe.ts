import type { z } from "zod";
import { recipeRepair, type RecipeRepair, type updateRecipe } from "@shared/contracts/recipes";
import type { FileRecipe, RepairChoices } from "@shared/domain/log-files/recipe";
import { inTransaction } from "@server/database/transaction";
import type { Context } from "@server/http/context";
import { Conflict, Denied, Invalid } from "@server/http/errors";
import { recipeProblems } from "@server/imports/recipe-problems";
import type { LogFile } from "@server/models/log-file";
import { Recipe } from "@server/models/recipe";
import { can } from "@server/policies/can";
import { fingerprintOf, serialOf, visibleRecipe, visibleRecipes } from "@server/queries/recipes";
import { recordAudit } from "./record-audit";

type Saving = Pick<Context, "actor" | "scope" | "database" | "clock" | "request">;

/** What of a file's recipe holds for other files of its logger: not when its meter was exchanged. */
function lastingPart({ meter, ...recipe }: FileRecipe): FileRecipe {
  const { format, clock } = recipe.time;
  return {
    ...recipe,
    time: { format, clock },
    ...(meter && { meter: { ...meter, exchangedAt: [] } }),
  };
}

function lastingChoices(repair: RepairChoices): RecipeRepair {
  return recipeRepair.parse(repair);
}

async function requireFreeName(saving: Saving, name: string, except?: string): Promise<void> {
  const wanted = name.toLowerCase();
  const rows = await visibleRecipes(saving);
  if (!rows.some((row) => row.id !== except && row.name.toLowerCase() === wanted)) return;
  throw new Conflict(
    "recipe-name-taken",
    `There is a recipe called ${name} already.`,
    "Give this one another name.",
  );
}

/** Saves how a file is read. @throws Conflict while it still asks, or without a header to know it by */
export async function createRecipe(
  saving: Saving,
  file: LogFile,
  repair: RepairChoices,
  wishes: { readonly name: string; readonly shared: boolean },
): Promise<Recipe> {
  const fingerprint = fingerprintOf(file);
  if (file.recipe === null || (file.questions ?? []).length > 0)
    throw new Conflict(
      "questions-open",
      "This file still has a question that only you can answer.",
      "Answer it first: a recipe is the answers.",
    );
  if (fingerprint === null)
    throw new Conflict(
      "no-header",
      "This file has no header, so nothing would tell which files the recipe is for.",
      "Export the log with a header line.",
    );
  await requireFreeName(saving, wishes.name);
  const { scope, actor, clock, database } = saving;
  const recipe = lastingPart(file.recipe);
  return inTransaction(database, async (transaction) => {
    const row = await scope.create(
      Recipe,
      {
        ...wishes,
        fingerprint,
        loggerSerial: serialOf(file),
        recipe,
        repair: lastingChoices(repair),
        createdByAccountId: actor.accountId,
        createdByName: actor.accountName,
        createdAt: clock.date(),
      },
      { transaction },
    );
    const details = { name: row.name, file: file.name };
    await recordAudit(saving, { kind: "recipe-saved", ...subjectOf(row), details }, transaction);
    return row.reload({ transaction });
  });
}

const subjectOf = ({ id }: Recipe) => ({ subject: { kind: "recipe", id } });

function requireEditable(saving: Saving, row: Recipe): void {
  if (can(saving.actor).editRecipe(row)) return;
  throw new Denied("Only who saved a recipe changes it, and an administrator those of everybody.");
}

type Changes = z.output<(typeof updateRecipe)["body"]>;

/** @throws Conflict where somebody else changed it meanwhile, Invalid where columns contradict */
export async function changeRecipe(saving: Saving, id: string, body: Changes): Promise<Recipe> {
  const { version, name, shared, columns, time, seriesKind, repair } = body;
  if (name !== undefined) await requireFreeName(saving, name, id);
  return inTransaction(saving.database, async (transaction) => {
    const row = await visibleRecipe(saving, id, transaction);
    requireEditable(saving, row);
    if (row.version !== version)
      throw new Conflict(
        "recipe-changed",
        "Somebody changed this recipe meanwhile.",
        "Load it again and make your change on the newer one.",
      );
    const recipe: FileRecipe = {
      ...row.recipe,
      ...(columns && { columns }),
      ...(time && { time }),
      ...(seriesKind && { seriesKind, kindChosen: true }),
    };
    if (columns) requireSameColumns(row.recipe, columns);
    const columnCount = 1 + Math.max(...recipe.columns.map(({ index }) => index));
    const problems = recipeProblems(recipe, { ...nothingFound, columnCount });
    if (problems.length > 0) throw new Invalid(problems);
    await row.update(
      {
        recipe,
        version: row.version + 1,
        ...(name !== undefined && { name }),
        ...(shared !== undefined && { shared }),
        ...(repair && { repair: { ...row.repair, ...repair } }),
      },
      { transaction },
    );
    const details = { name: row.name, version: row.version };
    await recordAudit(saving, { kind: "recipe-changed", ...subjectOf(row), details }, transaction);
    return row;
  });
}

const nothingFound = {
  asked: [],
  proofs: [],
  firstLines: [],
  sampleRows: [],
  dataRowCount: 0,
  preamble: [],
};

/** Files are known by their headers, so those stay as they were. */
function requireSameColumns(before: FileRecipe, after: FileRecipe["columns"]): void {
  const names = (columns: FileRecipe["columns"]) =>
    JSON.stringify(columns.map(({ index, header }) => [index, header]));
  if (names(before.columns) === names(after)) return;
  throw Invalid.field(
    "columns",
    "other-columns",
    "Columns and headers of a recipe stay: save another one from a file with the new header.",
  );
}

export async function removeRecipe(saving: Saving, id: string): Promise<void> {
  await inTransaction(saving.database, async (transaction) => {
    const row = await visibleRecipe(saving, id, transaction);
    requireEditable(saving, row);
    const details = { name: row.name };
    await recordAudit(saving, { kind: "recipe-deleted", ...subjectOf(row), details }, transaction);
    await row.destroy({ transaction });
  });
}
