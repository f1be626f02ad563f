import { queryOptions } from "@tanstack/react-query";
import {
  getEnergyResult,
  listCorrections,
  listEnergyResults,
  listFills,
} from "@shared/contracts/corrections";
import { getDayMarks, getPointSummary } from "@shared/contracts/energy";
import { listInstruments, listInstallations } from "@shared/contracts/evidence";
import { addDays } from "@shared/domain/time/local-calendar";
import { getLoop, getPoint, getSite, listLoops, listPoints } from "@shared/contracts/places";
import { call } from "@features/api";

/** While the server works something out, it is asked again this often. */
const askAgainMs = 1500;

/** Every question these screens ask; the only home of their keys. */
export const correctionsQueries = {
  site: (siteId: string) =>
    queryOptions({
      queryKey: ["corrections", "site", siteId],
      queryFn: ({ signal }) => call(getSite, { params: { siteId }, signal }),
    }),
  loop: (loopId: string) =>
    queryOptions({
      queryKey: ["corrections", "loop", loopId],
      queryFn: ({ signal }) => call(getLoop, { params: { loopId }, signal }),
    }),
  point: (pointId: string) =>
    queryOptions({
      queryKey: ["corrections", "point", pointId],
      queryFn: ({ signal }) => call(getPoint, { params: { pointId }, signal }),
    }),
  /** When the point's readings begin and end. */
  extent: (pointId: string, date: string) =>
    queryOptions({
      queryKey: ["corrections", "extent", pointId],
      queryFn: ({ signal }) =>
        call(getDayMarks, {
          params: { pointId },
          query: { from: date, to: addDays(date, 1) },
          signal,
        }),
    }),
  list: (pointId: string) =>
    queryOptions({
      queryKey: ["corrections", "list", pointId],
      queryFn: ({ signal }) => call(listCorrections, { params: { pointId }, signal }),
      refetchInterval: ({ state }) =>
        state.data?.items.some((item) => item.state === "working") ? askAgainMs : false,
    }),
  /** Probes of the point's installations by id, with their serials. */
  probes: (pointId: string) =>
    queryOptions({
      queryKey: ["corrections", "probes", pointId],
      queryFn: async ({ signal }) => {
        const [installations, instruments] = await Promise.all([
          call(listInstallations, { params: { pointId }, signal }),
          call(listInstruments, { query: { kind: "probe", limit: "200" }, signal }),
        ]);
        const used = new Set(
          installations.items.flatMap(({ probes }) =>
            probes ? [probes.supply.probeId, probes.return.probeId] : [],
          ),
        );
        return instruments.items.filter(({ id }) => used.has(id));
      },
    }),
  fills: (pointId: string) =>
    queryOptions({
      queryKey: ["corrections", "fills", pointId],
      queryFn: ({ signal }) => call(listFills, { params: { pointId }, signal }),
    }),
  gaps: (pointId: string, range: { readonly from: string; readonly to: string }) =>
    queryOptions({
      queryKey: ["corrections", "gaps", pointId, range.from, range.to],
      queryFn: ({ signal }) => call(getPointSummary, { params: { pointId }, query: range, signal }),
    }),
  /** Other points of the site, by the loop they are on. */
  otherPoints: (siteId: string, pointId: string) =>
    queryOptions({
      queryKey: ["corrections", "otherPoints", siteId, pointId],
      queryFn: async ({ signal }) => {
        const loops = await call(listLoops, { params: { siteId }, signal });
        const lists = await Promise.all(
          loops.items.map(async (loop) => {
            const { items } = await call(listPoints, { params: { loopId: loop.id }, signal });
            return items.map(({ id, code, hasReadings }) => ({
              id,
              code,
              loopTag: loop.tag,
              hasReadings,
            }));
          }),
        );
        return lists.flat().filter(({ id, hasReadings }) => id !== pointId && hasReadings);
      },
    }),
  results: (pointId: string) =>
    queryOptions({
      queryKey: ["corrections", "results", pointId],
      queryFn: ({ signal }) => call(listEnergyResults, { params: { pointId }, signal }),
    }),
  result: (resultId: string) =>
    queryOptions({
      queryKey: ["corrections", "result", resultId],
      queryFn: ({ signal }) => call(getEnergyResult, { params: { resultId }, signal }),
    }),
};
