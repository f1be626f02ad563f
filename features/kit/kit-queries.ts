import { queryOptions } from "@tanstack/react-query";
import {
  getBathCheck,
  getInstrument,
  listBathChecks,
  listInstruments,
  type BathCheck,
  type Instrument,
} from "@shared/contracts/evidence";
import { call } from "@features/api";

const pageSize = "200";

/** Every question the screens of the kit ask; the only home of their keys. */
export const kitQueries = {
  /** The whole kit: one time scale holds all of it, so pages are put together. */
  instruments: (archived = false) =>
    queryOptions({
      queryKey: ["kit", "instruments", { archived }],
      queryFn: async ({ signal }) => {
        const items: Instrument[] = [];
        for (let cursor: string | null = null; ;) {
          const page: Awaited<ReturnType<typeof instrumentsPage>> = await instrumentsPage(
            archived,
            cursor,
            signal,
          );
          items.push(...page.items);
          if (page.nextCursor === null) return { ...page, items };
          cursor = page.nextCursor;
        }
      },
    }),
  instrument: (instrumentId: string) =>
    queryOptions({
      queryKey: ["kit", "instrument", instrumentId],
      queryFn: ({ signal }) => call(getInstrument, { params: { instrumentId }, signal }),
    }),
  bathChecks: (superseded = false) =>
    queryOptions({
      queryKey: ["kit", "bath-checks", { superseded }],
      queryFn: async ({ signal }) => {
        const items: BathCheck[] = [];
        for (let cursor: string | null = null; ;) {
          const page: Awaited<ReturnType<typeof bathChecksPage>> = await bathChecksPage(
            superseded,
            cursor,
            signal,
          );
          items.push(...page.items);
          if (page.nextCursor === null) return { ...page, items };
          cursor = page.nextCursor;
        }
      },
    }),
  bathCheck: (bathCheckId: string) =>
    queryOptions({
      queryKey: ["kit", "bath-check", bathCheckId],
      queryFn: ({ signal }) => call(getBathCheck, { params: { bathCheckId }, signal }),
    }),
};

function instrumentsPage(archived: boolean, cursor: string | null, signal: AbortSignal) {
  const query = {
    limit: pageSize,
    ...(archived ? { archived: "true" } : {}),
    ...(cursor === null ? {} : { cursor }),
  };
  return call(listInstruments, { query, signal });
}

function bathChecksPage(superseded: boolean, cursor: string | null, signal: AbortSignal) {
  const query = {
    limit: pageSize,
    ...(superseded ? { superseded: "true" } : {}),
    ...(cursor === null ? {} : { cursor }),
  };
  return call(listBathChecks, { query, signal });
}
