import type { Transaction } from "sequelize";
import type { AppliedRecipe } from "@shared/contracts/recipes";
import { applyRecipe } from "@shared/domain/log-files/apply-recipe";
import type { FileRecipe, RepairChoices } from "@shared/domain/log-files/recipe";
import type { Question } from "@shared/domain/log-files/recognition";
import type { Database } from "@server/database/connect";
import { scoped } from "@server/database/scoped";
import type { LogFile } from "@server/models/log-file";
import type { Recipe } from "@server/models/recipe";
import { currentBores } from "@server/queries/current-bores";
import { loadEnergySettings } from "@server/readings/energy-settings";
import { SERVICE_OF_ENERGY } from "@server/readings/meter-facts";
import { questionsLeftBy } from "./open-questions";

/** How a file is read by a saved recipe, and what of it nobody has answered yet. */
export interface ReadLike {
  readonly recipe: FileRecipe;
  readonly questions: readonly Question[];
  readonly appliedRecipe: AppliedRecipe;
}

/** Holds a recipe against a recognised file; nothing is written here. */
export async function readLike(
  database: Database,
  file: LogFile,
  saved: Recipe,
  by: { readonly name: string; readonly at: Date },
  transaction?: Transaction,
): Promise<ReadLike | null> {
  const { recognition } = file;
  const proposed = recognition?.proposed ?? file.recipe;
  if (recognition === null || proposed === null) return null;
  const [{ service }, bores] = await Promise.all([
    loadEnergySettings(database, file.pointId, transaction),
    currentBores(scoped(file.organisationId), [file.pointId], transaction),
  ]);
  const applied = applyRecipe(saved.recipe, {
    proposed,
    proofs: recognition.proofs,
    asked: recognition.asked,
    sampleRows: recognition.sampleRows,
    service: SERVICE_OF_ENERGY[service],
    insideDiameterMm: bores.get(file.pointId)?.insideDiameterMm ?? null,
  });
  return {
    recipe: applied.recipe,
    questions: together(
      questionsLeftBy(applied.recipe, recognition, { service, hasBore: bores.has(file.pointId) }),
      applied.questions,
    ),
    appliedRecipe: {
      recipeId: saved.id,
      name: saved.name,
      version: saved.version,
      appliedBy: by.name,
      at: by.at.toISOString(),
      differences: [...applied.differences],
    },
  };
}

function together(first: readonly Question[], second: readonly Question[]): Question[] {
  const key = (question: Question) =>
    JSON.stringify([
      question.code,
      "columnIndex" in question ? question.columnIndex : null,
      "meaning" in question ? question.meaning : null,
    ]);
  const known = new Set(first.map(key));
  return [...first, ...second.filter((question) => !known.has(key(question)))];
}

/** The choices a recipe brings along; how overlaps with other imports are settled is never one. */
export function withRepairOf(repair: RepairChoices, saved: Recipe): RepairChoices {
  return { ...repair, ...saved.repair };
}
