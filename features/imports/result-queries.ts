import { queryOptions, useQueryClient } from "@tanstack/react-query";
import {
  changeImportChoices,
  downloadProblemRows,
  getImportHistory,
  listImportPeople,
} from "@shared/contracts/import-results";
import type { ImportDetail } from "@shared/contracts/imports";
import type { Language } from "@shared/formats/language";
import { addressOf, call, useChange } from "@features/api";
import { importQuery } from "./imports-queries";

/** Asked anew in every state: each brings an event. */
export const importHistoryQuery = ({ id, state }: Pick<ImportDetail, "id" | "state">) =>
  queryOptions({
    queryKey: ["imports", "history", id, state] as const,
    queryFn: ({ signal }) => call(getImportHistory, { params: { importId: id }, signal }),
  });

export const importPeopleQuery = queryOptions({
  queryKey: ["imports", "people"] as const,
  queryFn: ({ signal }) => call(listImportPeople, { signal }),
});

export const problemRowsAddress = (importId: string, language: Language) =>
  addressOf(downloadProblemRows, { params: { importId }, query: { language } });

/** Starts taking the readings out; the import then goes back to its choices by itself. */
export function useChangeChoices(importId: string, onDone: () => void) {
  const client = useQueryClient();
  return useChange({
    send: () => call(changeImportChoices, { params: { importId } }),
    onDone: (detail) => {
      client.setQueryData(importQuery(importId).queryKey, detail);
      void client.invalidateQueries({ queryKey: ["imports", "list"] });
      onDone();
    },
  });
}
