import type {
  AppliedRecipe,
  RecipeDetail,
  RecipeOffer,
  RecipeSummary,
} from "@shared/contracts/recipes";
import { instantText, instantTextOrNull } from "@server/database/conversions";
import { presentRecipe as presentFileRecipe } from "@server/imports/present-import";
import type { LogFile } from "@server/models/log-file";
import type { Recipe } from "@server/models/recipe";
import type { Actor } from "@server/policies/actor";
import { can } from "@server/policies/can";

export function presentRecipe(row: Recipe, actor: Actor): RecipeSummary {
  const { editRecipe, useRecipes } = can(actor);
  return {
    id: row.id,
    name: row.name,
    loggerSerial: row.loggerSerial,
    headers: row.recipe.columns.map(({ header }) => header),
    shared: row.shared,
    createdBy: row.createdByName,
    createdAt: instantText(row.createdAt),
    lastUsedAt: instantTextOrNull(row.lastUsedAt),
    version: row.version,
    can: { edit: editRecipe(row), use: useRecipes },
  };
}

export function presentRecipeDetail(row: Recipe, actor: Actor): RecipeDetail {
  return {
    ...presentRecipe(row, actor),
    recipe: presentFileRecipe(row.recipe),
    repair: row.repair,
  };
}

function presentApplied({ differences, ...applied }: AppliedRecipe): AppliedRecipe {
  return { ...applied, differences: differences.map((difference) => ({ ...difference })) };
}

export function presentOffer(
  file: LogFile,
  more: Pick<RecipeOffer, "loggerSerial" | "proposedName"> & {
    matches: readonly { recipe: Recipe; by: RecipeOffer["matches"][number]["by"] }[];
  },
): RecipeOffer {
  const { appliedRecipe } = file;
  return {
    applied: appliedRecipe ? presentApplied(appliedRecipe) : null,
    matches: more.matches.map(({ recipe, by }) => ({
      id: recipe.id,
      name: recipe.name,
      loggerSerial: recipe.loggerSerial,
      by,
      createdBy: recipe.createdByName,
      lastUsedAt: instantTextOrNull(recipe.lastUsedAt),
    })),
    loggerSerial: more.loggerSerial,
    proposedName: more.proposedName,
  };
}
