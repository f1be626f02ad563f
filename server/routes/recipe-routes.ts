import * as contracts from "@shared/contracts/recipes";
import { changeRecipe, createRecipe, removeRecipe } from "@server/commands/save-recipe";
import { defineEndpoint, type Endpoint } from "@server/http/define-endpoint";
import { applySavedRecipe } from "@server/imports/apply-saved-recipe";
import { LogImport } from "@server/models/log-import";
import { can } from "@server/policies/can";
import { may } from "@server/policies/policy";
import {
  presentOffer,
  presentRecipe,
  presentRecipeDetail,
} from "@server/presenters/present-recipe";
import { proposedRecipeName } from "@server/queries/proposed-recipe-name";
import { recipesFor, serialOf, visibleRecipe, visibleRecipes } from "@server/queries/recipes";
import { fileOfImport, presentWholeImport } from "./present-whole-import";

/** Saved answers about how loggers write, and their use on files of an import. */
export const recipeRoutes: readonly Endpoint[] = [
  defineEndpoint(contracts.listRecipes, {
    policy: may("seeRecipes"),
    async handle(context) {
      const rows = await visibleRecipes(context);
      return {
        items: rows.map((row) => presentRecipe(row, context.actor)),
        can: { use: can(context.actor).useRecipes },
      };
    },
  }),
  defineEndpoint(contracts.getRecipe, {
    policy: may("seeRecipes"),
    async handle(context, { params }) {
      return presentRecipeDetail(await visibleRecipe(context, params.recipeId), context.actor);
    },
  }),
  defineEndpoint(contracts.saveRecipe, {
    policy: may("useRecipes"),
    status: 201,
    async handle(context, { params, body }) {
      const file = await fileOfImport(context, params);
      const { repair } = await context.scope.get(LogImport, params.importId, "import");
      return presentRecipeDetail(await createRecipe(context, file, repair, body), context.actor);
    },
  }),
  defineEndpoint(contracts.updateRecipe, {
    policy: may("useRecipes"),
    async handle(context, { params, body }) {
      return presentRecipeDetail(await changeRecipe(context, params.recipeId, body), context.actor);
    },
  }),
  defineEndpoint(contracts.deleteRecipe, {
    policy: may("useRecipes"),
    async handle(context, { params }) {
      await removeRecipe(context, params.recipeId);
      return {};
    },
  }),
  defineEndpoint(contracts.getRecipeOffer, {
    policy: may("seeRecipes"),
    async handle(context, { params }) {
      const file = await fileOfImport(context, params);
      return presentOffer(file, {
        matches: await recipesFor(context, file),
        loggerSerial: serialOf(file),
        proposedName: proposedRecipeName(file),
      });
    },
  }),
  defineEndpoint(contracts.applyRecipe, {
    policy: may("useRecipes"),
    async handle(context, { params }) {
      const { importId, fileId, recipeId } = params;
      const row = await applySavedRecipe(context, importId, fileId, recipeId);
      return presentWholeImport(context, row);
    },
  }),
];
