import { infiniteQueryOptions, queryOptions, type QueryClient } from "@tanstack/react-query";

import {
  getDayMarks,
  getEnergy,
  getPointSummary,
  getReadings,
  getSeries,
} from "@shared/contracts/energy";
import {
  getCompanionSeries,
  listCompanions,
  type CompanionName,
} from "@shared/contracts/companions";
import { listImports } from "@shared/contracts/imports";
import { getLoop, getSite, listPoints } from "@shared/contracts/places";
import { getPointShape } from "@shared/contracts/shape";
import type { Interval } from "@shared/domain/time/interval";
import { call } from "@features/api";

import type { ShownRange } from "./shown-range";

const instants = ({ startMs, endMs }: Interval) => ({
  from: new Date(startMs).toISOString(),
  to: new Date(endMs).toISOString(),
});
/** The API's ranges end before their last date; people's include it. */
const dates = ({ from, until }: ShownRange) => ({ from, to: until });

/** Figures change with an import, which starts from elsewhere: a minute is fresh enough. */
const fresh = { staleTime: 60_000 } as const;

/** Lengths of a peak, minutes. */
export type PeakWindow = "15" | "30" | "60";

/** Every question the loop page asks; the only home of its keys. */
export const loopsQueries = {
  loop: (loopId: string) =>
    queryOptions({
      queryKey: ["loops", "loop", loopId],
      queryFn: ({ signal }) => call(getLoop, { params: { loopId }, signal }),
    }),
  site: (siteId: string) =>
    queryOptions({
      queryKey: ["loops", "site", siteId],
      queryFn: ({ signal }) => call(getSite, { params: { siteId }, signal }),
    }),
  points: (loopId: string) =>
    queryOptions({
      queryKey: ["loops", "points", loopId],
      queryFn: ({ signal }) => call(listPoints, { params: { loopId }, signal }),
    }),
  dayMarks: (pointId: string, range: ShownRange) =>
    queryOptions({
      ...fresh,
      queryKey: ["loops", "days", pointId, range.from, range.until],
      queryFn: ({ signal }) =>
        call(getDayMarks, { params: { pointId }, query: dates(range), signal }),
    }),
  summary: (pointId: string, range: ShownRange) =>
    queryOptions({
      ...fresh,
      queryKey: ["loops", "summary", pointId, range.from, range.until],
      queryFn: ({ signal }) =>
        call(getPointSummary, { params: { pointId }, query: dates(range), signal }),
    }),
  shape: (
    pointId: string,
    range: ShownRange,
    asked: { readonly windowMinutes: PeakWindow; readonly hours: "all" | "unoccupied" },
  ) =>
    queryOptions({
      ...fresh,
      queryKey: ["loops", "shape", pointId, range.from, range.until, asked],
      queryFn: ({ signal }) =>
        call(getPointShape, { params: { pointId }, query: { ...dates(range), ...asked }, signal }),
    }),
  energy: (pointId: string, range: ShownRange, step: "day" | "hour") =>
    queryOptions({
      ...fresh,
      queryKey: ["loops", "energy", pointId, range.from, range.until, step],
      queryFn: ({ signal }) =>
        call(getEnergy, { params: { pointId }, query: { ...dates(range), step }, signal }),
    }),
  readings: (pointId: string, range: ShownRange) =>
    infiniteQueryOptions({
      ...fresh,
      queryKey: ["loops", "readings", pointId, range.from, range.until],
      queryFn: ({ pageParam, signal }) =>
        call(getReadings, {
          params: { pointId },
          query: { ...dates(range), limit: 200, ...(pageParam ? { cursor: pageParam } : {}) },
          signal,
        }),
      initialPageParam: null as string | null,
      getNextPageParam: (page) => page.nextCursor,
    }),
  companions: (pointId: string) =>
    queryOptions({
      ...fresh,
      queryKey: ["loops", "companions", pointId],
      queryFn: ({ signal }) => call(listCompanions, { params: { pointId }, signal }),
    }),
  companionSeries: (
    pointId: string,
    channel: CompanionName,
    window: { readonly from: string; readonly to: string },
    pixels: number,
  ) =>
    queryOptions({
      ...fresh,
      queryKey: ["loops", "companion", pointId, channel, window.from, window.to, pixels],
      queryFn: ({ signal }) =>
        call(getCompanionSeries, {
          params: { pointId, channel },
          query: { ...window, pixels: String(pixels) },
          signal,
        }),
    }),
  /** Files whose rows are stored for the point. */
  imports: (pointId: string) =>
    queryOptions({
      ...fresh,
      queryKey: ["loops", "imports", pointId],
      queryFn: ({ signal }) =>
        call(listImports, { query: { pointId, state: "imported", limit: 50 }, signal }),
    }),
  series: (pointId: string, window: Interval, pixels: number) =>
    queryOptions({
      ...fresh,
      queryKey: ["loops", "series", pointId, window.startMs, window.endMs, pixels],
      queryFn: ({ signal }) =>
        call(getSeries, {
          params: { pointId },
          query: { ...instants(window), pixels: String(pixels) },
          signal,
        }),
      gcTime: 5 * 60_000,
    }),
};

/** A chart's way to its pictures; those fetched before are taken from what is kept. */
export function seriesLoader(client: QueryClient, pointId: string) {
  return (window: Interval, pixels: number) =>
    client.fetchQuery(loopsQueries.series(pointId, window, pixels));
}
