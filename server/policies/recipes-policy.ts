import type { Actor } from "./actor";
import { logsAbilities } from "./logs-policy";

interface RecipeRecord {
  readonly createdByAccountId: string | null;
  readonly shared: boolean;
}

/** Saved answers about how loggers write. */
export function recipesAbilities(actor: Actor) {
  const { seeLogs, importLogs } = logsAbilities(actor);
  return {
    seeRecipes: seeLogs,
    /** Save one, read files by one. */
    useRecipes: importLogs,
    /** One's own; an administrator also what everybody uses, or a leaver's could never be mended. */
    editRecipe: ({ createdByAccountId, shared }: RecipeRecord): boolean =>
      importLogs &&
      (createdByAccountId === actor.accountId || (shared && actor.role === "administrator")),
  };
}
