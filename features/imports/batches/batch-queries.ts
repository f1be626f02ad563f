import { infiniteQueryOptions, queryOptions, useQueryClient } from "@tanstack/react-query";
import {
  addBatchFile,
  chooseBatchPoint,
  confirmImportBatch,
  createImportBatch,
  downloadBatchReport,
  getImportBatch,
  listImportBatches,
  removeBatchFile,
  type BatchDetail,
} from "@shared/contracts/import-batches";
import { addressOf, call, upload, useChange } from "@features/api";

/** Often enough to see files move on, seldom enough not to load the server. */
const POLL_MS = 1200;

const MOVING: readonly BatchDetail["files"][number]["state"][] = [
  "reading",
  "checking",
  "importing",
];

const keys = {
  list: ["import-batches", "list"] as const,
  detail: (batchId: string) => ["import-batches", "detail", batchId] as const,
};

export const batchQueries = {
  list: infiniteQueryOptions({
    queryKey: keys.list,
    initialPageParam: undefined as string | undefined,
    queryFn: ({ pageParam, signal }) =>
      call(listImportBatches, { query: { cursor: pageParam, limit: 20 }, signal }),
    getNextPageParam: (page) => page.nextCursor ?? undefined,
  }),
  detail: (batchId: string) =>
    queryOptions({
      queryKey: keys.detail(batchId),
      queryFn: ({ signal }) => call(getImportBatch, { params: { batchId }, signal }),
      refetchInterval: (query) =>
        query.state.data?.files.some(({ state }) => MOVING.includes(state)) ? POLL_MS : false,
    }),
};

export const batchReportAddress = (batchId: string) =>
  addressOf(downloadBatchReport, { params: { batchId } });

export function useOpenBatch(onDone: (batch: BatchDetail) => void) {
  const client = useQueryClient();
  return useChange({
    send: (body: { recipeId: string; siteId: string }) => call(createImportBatch, { body }),
    onDone: (batch) => {
      client.setQueryData(keys.detail(batch.id), batch);
      void client.invalidateQueries({ queryKey: keys.list });
      onDone(batch);
    },
  });
}

/** Everything done to one batch; each answers with the batch as it then is. */
export function useBatchActions(batchId: string) {
  const client = useQueryClient();
  const onDone = (batch: BatchDetail) => {
    client.setQueryData(keys.detail(batch.id), batch);
    void client.invalidateQueries({ queryKey: ["imports", "list"] });
  };
  return {
    add: async (file: File) => {
      onDone(
        await upload(addBatchFile, { params: { batchId }, file, onProgress: () => undefined }),
      );
    },
    choosePoint: useChange({
      send: ({ batchFileId, pointId }: { batchFileId: string; pointId: string }) =>
        call(chooseBatchPoint, { params: { batchId, batchFileId, pointId } }),
      onDone,
    }),
    remove: useChange({
      send: (batchFileId: string) => call(removeBatchFile, { params: { batchId, batchFileId } }),
      onDone,
    }),
    confirm: useChange({
      send: () => call(confirmImportBatch, { params: { batchId } }),
      onDone,
    }),
  };
}
export type BatchActions = ReturnType<typeof useBatchActions>;
