import { z } from "zod";
import { contract, id, instant, nothing, oneLine } from "./contract";
import { importDetail } from "./imports";
import { columnRecipe, fileRecipe, repairChoices } from "./log-recipe";

/*
 * A recipe is what somebody once answered about the files of a logger. It is offered for files with
 * the same header, never applied unasked, and checked against each new file when it is applied.
 */

/** The choices about defects that a recipe keeps; whether another import wins is not one of them. */
export const recipeRepair = repairChoices.pick({
  identicalRepeats: true,
  conflictingRepeats: true,
  outOfOrder: true,
  sentinels: true,
  missingHour: true,
  weakSignal: true,
  weakSignalBelowPercent: true,
});
export type RecipeRepair = z.infer<typeof recipeRepair>;

export const recipeSummary = z.object({
  id,
  name: z.string(),
  loggerSerial: z.string().nullable().describe("of the logger whose file it was saved from"),
  headers: z.array(z.string()).describe("the columns it knows, as their header has them"),
  shared: z.boolean().describe("true: the whole organisation may use it; false: its owner alone"),
  createdBy: z.string(),
  createdAt: instant,
  lastUsedAt: instant.nullable(),
  version: z
    .number()
    .int()
    .describe("grows with every change; a change names the one it was made on"),
  can: z.object({ edit: z.boolean(), use: z.boolean() }),
});
export type RecipeSummary = z.infer<typeof recipeSummary>;

export const recipeDetail = recipeSummary.extend({
  recipe: fileRecipe.describe("line numbers are those of the file it was saved from"),
  repair: recipeRepair,
});
export type RecipeDetail = z.infer<typeof recipeDetail>;

export const recipeDifference = z.object({
  code: z.enum([
    "separator",
    "columnMissing",
    "columnMoved",
    "columnNew",
    "meaning",
    "unit",
    "implausible",
    "decimalMark",
    "timeFormat",
    "dateOrder",
    "clock",
    "seriesKind",
  ]),
  column: z.string().nullable().describe("its header; null where the whole file is meant"),
  columnIndex: z.number().int().nullable(),
  saved: z.string().nullable().describe("what the recipe says, as a code"),
  found: z.string().nullable().describe("what the file says, as a code or as written"),
  line: z.number().int().nullable().describe("line of the file that says so"),
  asks: z.boolean().describe("true: the file contradicts the recipe and the answer stays open"),
});
export type RecipeDifferenceView = z.infer<typeof recipeDifference>;

export const appliedRecipe = z.object({
  recipeId: id,
  name: z.string(),
  version: z.number().int(),
  appliedBy: z.string(),
  at: instant,
  differences: z.array(recipeDifference),
});
export type AppliedRecipe = z.infer<typeof appliedRecipe>;

export const recipeOffer = z.object({
  applied: appliedRecipe.nullable().describe("the recipe this file is read by, and how it differs"),
  matches: z.array(
    z.object({
      id,
      name: z.string(),
      loggerSerial: z.string().nullable(),
      by: z.enum(["serialAndHeader", "header"]),
      createdBy: z.string(),
      lastUsedAt: instant.nullable(),
    }),
  ),
  loggerSerial: z.string().nullable().describe("as the lines above the header say"),
  proposedName: z.string().describe("for a recipe that is saved from this file"),
});
export type RecipeOffer = z.infer<typeof recipeOffer>;

const recipeId = z.object({ recipeId: id });
const ofFile = z.object({ importId: id, fileId: id });

export const listRecipes = contract({
  operationId: "listRecipes",
  summary: "Recipes of the organisation and one's own, by name",
  tag: "Recipes",
  method: "get",
  path: "/recipes",
  answer: z.object({ items: z.array(recipeSummary), can: z.object({ use: z.boolean() }) }),
});
export const getRecipe = contract({
  operationId: "getRecipe",
  summary: "One recipe with everything it answers",
  tag: "Recipes",
  method: "get",
  path: "/recipes/:recipeId",
  params: recipeId,
  answer: recipeDetail,
});
export const saveRecipe = contract({
  operationId: "saveRecipe",
  summary: "Save how a file of an import is read as a recipe",
  tag: "Recipes",
  method: "post",
  path: "/imports/:importId/files/:fileId/recipes",
  params: ofFile,
  body: z.object({ name: oneLine(120), shared: z.boolean() }),
  answer: recipeDetail,
});
export const updateRecipe = contract({
  operationId: "updateRecipe",
  summary: "Change a recipe; imports made with it stay as they are",
  tag: "Recipes",
  method: "patch",
  path: "/recipes/:recipeId",
  params: recipeId,
  body: z.object({
    version: z.number().int().describe("the one the change was made on; an older one is refused"),
    name: oneLine(120).optional(),
    shared: z.boolean().optional(),
    columns: z.array(columnRecipe).max(200).optional(),
    time: fileRecipe.shape.time.optional(),
    seriesKind: fileRecipe.shape.seriesKind.optional(),
    repair: recipeRepair.partial().optional(),
  }),
  answer: recipeDetail,
});
export const deleteRecipe = contract({
  operationId: "deleteRecipe",
  summary: "Delete a recipe; imports made with it stay as they are",
  tag: "Recipes",
  method: "delete",
  path: "/recipes/:recipeId",
  params: recipeId,
  answer: nothing,
});
export const getRecipeOffer = contract({
  operationId: "getRecipeOffer",
  summary: "Recipes that fit a file, the best first, and the one it is read by",
  tag: "Recipes",
  method: "get",
  path: "/imports/:importId/files/:fileId/recipes",
  params: ofFile,
  answer: recipeOffer,
});
export const applyRecipe = contract({
  operationId: "applyRecipe",
  summary:
    "Read a file like a recipe says; what the file contradicts is listed and stays a question",
  tag: "Recipes",
  method: "post",
  path: "/imports/:importId/files/:fileId/recipes/:recipeId/apply",
  params: ofFile.extend({ recipeId: id }),
  answer: importDetail,
});
