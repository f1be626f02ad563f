import { queryOptions } from "@tanstack/react-query";
import {
  getMeterComparison,
  listMeterComparisons,
  tryMeterComparison,
  type MeterComparisonBody,
  type MeterComparisonLine,
} from "@shared/contracts/meter-comparisons";
import {
  listLoops,
  listPoints,
  listSites,
  type LoopService,
  type Site,
} from "@shared/contracts/places";
import { call } from "@features/api";

const limit = "200";

/** A metering point to choose, with the loop it is on. */
export interface PointChoice {
  readonly id: string;
  readonly code: string;
  readonly name: string;
  readonly loopTag: string;
  readonly service: LoopService;
}

/** Every question the screens of Compare ask; the only home of their keys. */
export const compareQueries = {
  /** All comparisons, page after page: the list is short and is read as one. */
  meters: (superseded: boolean) =>
    queryOptions({
      queryKey: ["compare", "meters", { superseded }],
      queryFn: async ({ signal }) => {
        const items: MeterComparisonLine[] = [];
        for (let cursor: string | null = null; ;) {
          const page: Awaited<ReturnType<typeof metersPage>> = await metersPage(
            superseded,
            cursor,
            signal,
          );
          items.push(...page.items);
          if (page.nextCursor === null) return { items, can: page.can };
          cursor = page.nextCursor;
        }
      },
    }),
  comparison: (meterComparisonId: string) =>
    queryOptions({
      queryKey: ["compare", "meters", meterComparisonId],
      queryFn: ({ signal }) => call(getMeterComparison, { params: { meterComparisonId }, signal }),
    }),
  /** What it would come to; the result before stays on screen while the next is worked out. */
  trial: (siteId: string, body: MeterComparisonBody | null) =>
    queryOptions({
      queryKey: ["compare", "trial", siteId, body],
      queryFn: ({ signal }) => {
        if (body === null) throw new Error("a trial without a body was asked for");
        return call(tryMeterComparison, { params: { siteId }, body, signal });
      },
      enabled: body !== null,
      placeholderData: (before) => before,
    }),
  sites: queryOptions({
    queryKey: ["compare", "sites"],
    queryFn: async ({ signal }) => {
      const items: Site[] = [];
      for (let cursor: string | null = null; ;) {
        const page: Awaited<ReturnType<typeof sitesPage>> = await sitesPage(cursor, signal);
        items.push(...page.items);
        if (page.nextCursor === null) return { items };
        cursor = page.nextCursor;
      }
    },
  }),
  /** Metering points of a site with the loop each is on. */
  points: (siteId: string) =>
    queryOptions({
      queryKey: ["compare", "points", siteId],
      queryFn: async ({ signal }) => {
        const { items: loops } = await call(listLoops, { params: { siteId }, signal });
        const found = await Promise.all(
          loops.map(async (loop) => {
            const { items } = await call(listPoints, { params: { loopId: loop.id }, signal });
            return items.map(({ id, code, name }): PointChoice => ({
              id,
              code,
              name,
              loopTag: loop.tag,
              service: loop.service,
            }));
          }),
        );
        return found.flat();
      },
    }),
};

function metersPage(superseded: boolean, cursor: string | null, signal: AbortSignal) {
  const query = {
    limit,
    ...(superseded ? { superseded: "true" } : {}),
    ...(cursor === null ? {} : { cursor }),
  };
  return call(listMeterComparisons, { query, signal });
}

function sitesPage(cursor: string | null, signal: AbortSignal) {
  return call(listSites, { query: { limit, ...(cursor === null ? {} : { cursor }) }, signal });
}
