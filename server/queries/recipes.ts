import { createHash } from "node:crypto";
import { Op, type Transaction } from "sequelize";
import { headerFingerprint } from "@shared/domain/log-files/header-fingerprint";
import { loggerSerial } from "@shared/domain/log-files/logger-serial";
import type { Scope } from "@server/database/scoped";
import { NotFound } from "@server/http/errors";
import type { LogFile } from "@server/models/log-file";
import { Recipe } from "@server/models/recipe";
import type { Actor } from "@server/policies/actor";

interface Asking {
  readonly scope: Scope;
  readonly actor: Pick<Actor, "accountId">;
}

const visibleTo = ({ actor }: Asking) => ({
  [Op.or]: [{ shared: true }, { createdByAccountId: actor.accountId }],
});

/** Recipes somebody may see: those of everybody and their own. */
export function visibleRecipes(asking: Asking): Promise<Recipe[]> {
  const order: [string, string][] = [
    ["name", "ASC"],
    ["id", "ASC"],
  ];
  return asking.scope.list(Recipe, { where: visibleTo(asking), order });
}

/** @throws NotFound also for one that is another person's own */
export async function visibleRecipe(
  asking: Asking,
  id: string,
  transaction?: Transaction,
): Promise<Recipe> {
  const row = await asking.scope.find(Recipe, {
    where: { ...visibleTo(asking), id },
    transaction,
  });
  if (row === null) throw new NotFound("recipe");
  return row;
}

/** What tells whose file it is; null for one that is not recognised or has no header. */
export function fingerprintOf({ recipe, recognition }: LogFile): string | null {
  if (recipe === null || recognition === null) return null;
  const { columnCount, firstLines } = recognition;
  const text = headerFingerprint(recipe.columns, columnCount, recipe.dialect, firstLines);
  return text === null ? null : createHash("sha256").update(text).digest("hex");
}

export function serialOf({ recognition }: Pick<LogFile, "recognition">): string | null {
  return recognition === null ? null : loggerSerial(recognition.preamble);
}

/** Recipes saved from files with the same header: those of the same logger first, then the last used. */
export async function recipesFor(
  asking: Asking,
  file: LogFile,
): Promise<{ recipe: Recipe; by: "serialAndHeader" | "header" }[]> {
  const fingerprint = fingerprintOf(file);
  if (fingerprint === null) return [];
  const serial = serialOf(file);
  const found = await asking.scope.list(Recipe, {
    where: { ...visibleTo(asking), fingerprint },
    order: [["id", "DESC"]],
  });
  const used = ({ lastUsedAt, createdAt }: Recipe) => (lastUsedAt ?? createdAt).getTime();
  const sameLogger = ({ loggerSerial: own }: Recipe) => own !== null && own === serial;
  return found
    .sort((a, b) => Number(sameLogger(b)) - Number(sameLogger(a)) || used(b) - used(a))
    .map((recipe) => ({ recipe, by: sameLogger(recipe) ? "serialAndHeader" : "header" }));
}
