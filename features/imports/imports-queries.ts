import {
  infiniteQueryOptions,
  queryOptions,
  useMutation,
  useQueryClient,
  type QueryClient,
} from "@tanstack/react-query";
import {
  addImportFile,
  alsoForPoint,
  cancelImport,
  checkImport,
  chooseRecipe,
  chooseRepairs,
  confirmImport,
  createImport,
  getImport,
  listImports,
  previewLogRows,
  removeImportFile,
  reopenImport,
  undoImport,
  type ImportDetail,
  type ImportState,
} from "@shared/contracts/imports";
import type { fileRecipe, repairChoices } from "@shared/contracts/log-recipe";
import { listCorrections } from "@shared/contracts/corrections";
import { getEnergy } from "@shared/contracts/energy";
import { listLoops, listPoints, listSites } from "@shared/contracts/places";
import type { z } from "zod";
import { call, upload } from "@features/api";
import { isWorking } from "./wizard-steps";

/** Often enough for a progress loop to move, seldom enough not to load the server. */
const POLL_MS = 700;

/** What a list of imports is narrowed to. */
export interface ImportFilters {
  readonly siteId?: string;
  readonly pointId?: string;
  readonly state?: ImportState;
  readonly personId?: string;
}

const keys = {
  all: ["imports"] as const,
  list: (filters: ImportFilters) => ["imports", "list", filters] as const,
  detail: (importId: string) => ["imports", "detail", importId] as const,
};

export const importsQuery = (filters: ImportFilters = {}) =>
  infiniteQueryOptions({
    queryKey: keys.list(filters),
    initialPageParam: undefined as string | undefined,
    queryFn: ({ pageParam, signal }) =>
      call(listImports, { query: { cursor: pageParam, ...filters, limit: 25 }, signal }),
    getNextPageParam: (page) => page.nextCursor ?? undefined,
    refetchInterval: (query) =>
      query.state.data?.pages.some((page) => page.items.some(isWorking)) ? 2 * POLL_MS : false,
  });

export const importQuery = (importId: string) =>
  queryOptions({
    queryKey: keys.detail(importId),
    queryFn: ({ signal }) => call(getImport, { params: { importId }, signal }),
    refetchInterval: (query) => (query.state.data && isWorking(query.state.data) ? POLL_MS : false),
  });

export const logRowsQuery = (importId: string, fileId: string, line: number) =>
  queryOptions({
    queryKey: [...keys.detail(importId), "rows", fileId, line] as const,
    queryFn: ({ signal }) =>
      call(previewLogRows, { params: { importId, fileId }, query: { line, limit: 12 }, signal }),
  });

/** Energy of a stretch in one sum, with its ±. */
export const energyOfQuery = (pointId: string, range: { from: string; to: string }) =>
  queryOptions({
    queryKey: ["imports", "energy", pointId, range] as const,
    queryFn: ({ signal }) =>
      call(getEnergy, { params: { pointId }, query: { ...range, step: "total" }, signal }),
  });

/** Corrections of a point, those that an import's checks became among them. */
export const correctionsOfPointQuery = (pointId: string) =>
  queryOptions({
    queryKey: ["imports", "corrections", pointId] as const,
    queryFn: ({ signal }) => call(listCorrections, { params: { pointId }, signal }),
  });

export const placesToImportQuery = {
  sites: queryOptions({
    queryKey: ["imports", "sites"] as const,
    queryFn: ({ signal }) => call(listSites, { query: { limit: 200 }, signal }),
  }),
  loops: (siteId: string) =>
    queryOptions({
      queryKey: ["imports", "loops", siteId] as const,
      queryFn: ({ signal }) => call(listLoops, { params: { siteId }, signal }),
    }),
  points: (loopId: string) =>
    queryOptions({
      queryKey: ["imports", "points", loopId] as const,
      queryFn: ({ signal }) => call(listPoints, { params: { loopId }, signal }),
    }),
};

/** The server's word replaces what is shown; energy that an import touches is asked for anew. */
function take(client: QueryClient, detail: ImportDetail): void {
  client.setQueryData(keys.detail(detail.id), detail);
  void client.invalidateQueries({ queryKey: ["imports", "list"] });
}

export function useStartImport() {
  const client = useQueryClient();
  return useMutation({
    mutationFn: (pointId: string) => call(createImport, { params: { pointId } }),
    onSuccess: (detail) => take(client, detail),
  });
}

/** Opens an import of a file's bytes for another point. */
export function useImportAlso(importId: string, fileId: string) {
  const client = useQueryClient();
  return useMutation({
    mutationFn: (pointId: string) =>
      call(alsoForPoint, { params: { importId, fileId }, body: { pointId } }),
    onSuccess: (detail) => {
      take(client, detail);
      void client.invalidateQueries({ queryKey: keys.detail(importId) });
    },
  });
}

/** Everything a person can do to one import; each answers with the import as it then is. */
export function useImportActions(importId: string) {
  const client = useQueryClient();
  const onSuccess = (detail: ImportDetail) => take(client, detail);
  const params = { importId };
  return {
    addFile: useMutation({
      mutationFn: (given: { file: File; onProgress: (share: number) => void }) =>
        upload(addImportFile, { params, ...given }),
      onSuccess,
    }),
    removeFile: useMutation({
      mutationFn: (fileId: string) => call(removeImportFile, { params: { importId, fileId } }),
      onSuccess,
    }),
    chooseRecipe: useMutation({
      mutationFn: ({ fileId, recipe }: { fileId: string; recipe: z.input<typeof fileRecipe> }) =>
        call(chooseRecipe, { params: { importId, fileId }, body: recipe }),
      onSuccess,
    }),
    chooseRepairs: useMutation({
      mutationFn: (body: Partial<z.input<typeof repairChoices>>) =>
        call(chooseRepairs, { params, body }),
      onSuccess,
    }),
    check: useMutation({ mutationFn: () => call(checkImport, { params }), onSuccess }),
    confirm: useMutation({ mutationFn: () => call(confirmImport, { params }), onSuccess }),
    cancel: useMutation({ mutationFn: () => call(cancelImport, { params }), onSuccess }),
    undo: useMutation({
      mutationFn: () => call(undoImport, { params }),
      onSuccess: (detail) => {
        onSuccess(detail);
        void client.invalidateQueries({ predicate: (query) => query.queryKey[0] !== "session" });
      },
    }),
    reopen: useMutation({ mutationFn: () => call(reopenImport, { params }), onSuccess }),
  };
}
export type ImportActions = ReturnType<typeof useImportActions>;
