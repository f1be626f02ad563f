import { queryOptions } from "@tanstack/react-query";

import { getToday } from "@shared/contracts/energy";
import { listSites } from "@shared/contracts/places";
import { call } from "@features/api";

/** What Today asks; the only home of its keys. */
export const todayQueries = {
  sites: queryOptions({
    queryKey: ["today", "sites"],
    queryFn: ({ signal }) => call(listSites, { query: { limit: 200 }, signal }),
  }),
  today: (siteId: string) =>
    queryOptions({
      queryKey: ["today", "site", siteId],
      queryFn: ({ signal }) => call(getToday, { params: { siteId }, signal }),
      staleTime: 30_000,
    }),
};
