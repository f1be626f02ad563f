import { queryOptions, useQueryClient } from "@tanstack/react-query";
import type { ImportDetail } from "@shared/contracts/imports";
import {
  applyRecipe,
  deleteRecipe,
  getRecipe,
  getRecipeOffer,
  listRecipes,
  saveRecipe,
  updateRecipe,
} from "@shared/contracts/recipes";
import type { z } from "zod";
import { call, useChange } from "@features/api";
import { importQuery } from "../imports-queries";

const keys = {
  all: ["recipes"] as const,
  detail: (recipeId: string) => ["recipes", "detail", recipeId] as const,
  offer: (importId: string, fileId: string) => ["recipes", "offer", importId, fileId] as const,
};

export const recipeQueries = {
  list: queryOptions({
    queryKey: [...keys.all, "list"] as const,
    queryFn: ({ signal }) => call(listRecipes, { signal }),
  }),
  detail: (recipeId: string) =>
    queryOptions({
      queryKey: keys.detail(recipeId),
      queryFn: ({ signal }) => call(getRecipe, { params: { recipeId }, signal }),
    }),
  offer: (importId: string, fileId: string) =>
    queryOptions({
      queryKey: keys.offer(importId, fileId),
      queryFn: ({ signal }) => call(getRecipeOffer, { params: { importId, fileId }, signal }),
    }),
};

/** Reads a file like a recipe says; the import then is as the server says. */
export function useApplyRecipe(importId: string, fileId: string) {
  const client = useQueryClient();
  return useChange({
    send: (recipeId: string) => call(applyRecipe, { params: { importId, fileId, recipeId } }),
    onDone: async (detail: ImportDetail) => {
      client.setQueryData(importQuery(importId).queryKey, detail);
      await client.invalidateQueries({ queryKey: keys.all });
    },
  });
}

export function useSaveRecipe(importId: string, fileId: string, onDone: () => void) {
  const client = useQueryClient();
  return useChange({
    send: (body: z.input<(typeof saveRecipe)["body"]>) =>
      call(saveRecipe, { params: { importId, fileId }, body }),
    onDone: async () => {
      await client.invalidateQueries({ queryKey: keys.all });
      onDone();
    },
    fields: ["name"],
  });
}

export function useUpdateRecipe(recipeId: string, onDone: () => void) {
  const client = useQueryClient();
  return useChange({
    send: (body: z.input<(typeof updateRecipe)["body"]>) =>
      call(updateRecipe, { params: { recipeId }, body }),
    onDone: async () => {
      await client.invalidateQueries({ queryKey: keys.all });
      onDone();
    },
    fields: ["name"],
  });
}

export function useDeleteRecipe(recipeId: string, onDone: () => void) {
  const client = useQueryClient();
  return useChange({
    send: () => call(deleteRecipe, { params: { recipeId } }),
    onDone: async () => {
      onDone();
      client.removeQueries({ queryKey: keys.detail(recipeId) });
      await client.invalidateQueries({ queryKey: keys.all });
    },
  });
}
