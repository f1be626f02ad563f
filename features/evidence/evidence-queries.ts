import { keepPreviousData, queryOptions } from "@tanstack/react-query";
import {
  listBathChecks,
  listInstallations,
  listInstruments,
  tryInstallation,
} from "@shared/contracts/evidence";
import { getLoop, getPoint, getSite } from "@shared/contracts/places";
import { call } from "@features/api";
import type { InstallationBody } from "./installation-values";

/** Every question the screens of evidence ask; the only home of their keys. */
export const evidenceQueries = {
  site: (siteId: string) =>
    queryOptions({
      queryKey: ["evidence", "site", siteId],
      queryFn: ({ signal }) => call(getSite, { params: { siteId }, signal }),
    }),
  loop: (loopId: string) =>
    queryOptions({
      queryKey: ["evidence", "loop", loopId],
      queryFn: ({ signal }) => call(getLoop, { params: { loopId }, signal }),
    }),
  point: (pointId: string) =>
    queryOptions({
      queryKey: ["evidence", "point", pointId],
      queryFn: ({ signal }) => call(getPoint, { params: { pointId }, signal }),
    }),
  /** Superseded and withdrawn versions too: the history shows them. */
  installations: (pointId: string) =>
    queryOptions({
      queryKey: ["evidence", "installations", pointId],
      queryFn: ({ signal }) =>
        call(listInstallations, {
          params: { pointId },
          query: { superseded: "true" },
          signal,
        }),
    }),
  instruments: queryOptions({
    queryKey: ["evidence", "instruments"],
    queryFn: ({ signal }) =>
      call(listInstruments, { query: { limit: "200", archived: "true" }, signal }),
  }),
  bathChecks: (probeId: string) =>
    queryOptions({
      queryKey: ["evidence", "bath-checks", probeId],
      queryFn: ({ signal }) => call(listBathChecks, { query: { probeId, limit: "200" }, signal }),
      enabled: probeId !== "",
    }),
  /** What would follow from what is typed; the last answer stays while the next is on its way. */
  tried: (pointId: string, body: InstallationBody | null) =>
    queryOptions({
      queryKey: ["evidence", "tried", pointId, body],
      queryFn: ({ signal }) =>
        call(tryInstallation, { params: { pointId }, body: body ?? { startsAt: "" }, signal }),
      enabled: body !== null,
      placeholderData: keepPreviousData,
      staleTime: Infinity,
      retry: false,
    }),
};
