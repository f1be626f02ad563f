import { infiniteQueryOptions, queryOptions } from "@tanstack/react-query";
import { call } from "@features/api";
import {
  getLoop,
  getPoint,
  getSite,
  getSiteOverview,
  listBoreVersions,
  listBuildings,
  listLoops,
  listPipeTables,
  listPoints,
  listSites,
} from "@shared/contracts/places";
import { getLoopPump } from "@shared/contracts/shape";

const withArchived = (archived: boolean) => (archived ? ({ archived: "true" } as const) : {});

/** Every question the screens of places ask; the only home of their keys. */
export const placesQueries = {
  sites: (archived: boolean) =>
    infiniteQueryOptions({
      queryKey: ["places", "sites", { archived }],
      queryFn: ({ pageParam, signal }) =>
        call(listSites, {
          query: { ...withArchived(archived), ...(pageParam ? { cursor: pageParam } : {}) },
          signal,
        }),
      initialPageParam: null as string | null,
      getNextPageParam: (page) => page.nextCursor,
    }),
  site: (siteId: string) =>
    queryOptions({
      queryKey: ["places", "site", siteId],
      queryFn: ({ signal }) => call(getSite, { params: { siteId }, signal }),
    }),
  overview: (siteId: string, from: string, to: string) =>
    queryOptions({
      queryKey: ["places", "overview", siteId, from, to],
      queryFn: ({ signal }) =>
        call(getSiteOverview, { params: { siteId }, query: { from, to }, signal }),
      // The week before stays on screen while another loads.
      placeholderData: (before) => before,
    }),
  buildings: (siteId: string, archived = false) =>
    queryOptions({
      queryKey: ["places", "buildings", siteId, { archived }],
      queryFn: ({ signal }) =>
        call(listBuildings, { params: { siteId }, query: withArchived(archived), signal }),
    }),
  loops: (siteId: string, archived = false) =>
    queryOptions({
      queryKey: ["places", "loops", siteId, { archived }],
      queryFn: ({ signal }) =>
        call(listLoops, { params: { siteId }, query: withArchived(archived), signal }),
    }),
  loop: (loopId: string) =>
    queryOptions({
      queryKey: ["places", "loop", loopId],
      queryFn: ({ signal }) => call(getLoop, { params: { loopId }, signal }),
    }),
  pump: (loopId: string) =>
    queryOptions({
      queryKey: ["places", "pump", loopId],
      queryFn: ({ signal }) => call(getLoopPump, { params: { loopId }, signal }),
    }),
  points: (loopId: string, archived = false) =>
    queryOptions({
      queryKey: ["places", "points", loopId, { archived }],
      queryFn: ({ signal }) =>
        call(listPoints, { params: { loopId }, query: withArchived(archived), signal }),
    }),
  point: (pointId: string) =>
    queryOptions({
      queryKey: ["places", "point", pointId],
      queryFn: ({ signal }) => call(getPoint, { params: { pointId }, signal }),
    }),
  bores: (pointId: string) =>
    queryOptions({
      queryKey: ["places", "bores", pointId],
      queryFn: ({ signal }) => call(listBoreVersions, { params: { pointId }, signal }),
    }),
  /** Published dimensions: they change with a release, not while somebody looks. */
  pipeTables: queryOptions({
    queryKey: ["places", "pipe-tables"],
    queryFn: ({ signal }) => call(listPipeTables, { signal }),
    staleTime: Infinity,
  }),
};
