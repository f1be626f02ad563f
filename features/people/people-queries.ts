import { infiniteQueryOptions, queryOptions } from "@tanstack/react-query";

import {
  listAccessTokens,
  listCaughtMail,
  listMembers,
  readInvitation,
} from "@shared/contracts/people";
import { call } from "@features/api";

/** Without a network they fail at once instead of waiting unseen, so the screen can say so. */
const networkMode = "always" as const;

/** Every question the screens of people ask; the only home of their keys. */
export const peopleQueries = {
  members: infiniteQueryOptions({
    queryKey: ["people", "members"],
    queryFn: ({ pageParam, signal }) =>
      call(listMembers, { query: pageParam === null ? {} : { cursor: pageParam }, signal }),
    initialPageParam: null as string | null,
    getNextPageParam: (page) => page.nextCursor,
    networkMode,
  }),
  accessTokens: queryOptions({
    queryKey: ["people", "access-tokens"],
    queryFn: async ({ signal }) => (await call(listAccessTokens, { signal })).items,
    networkMode,
  }),
  caughtMail: queryOptions({
    queryKey: ["people", "caught-mail"],
    queryFn: async ({ signal }) => (await call(listCaughtMail, { signal })).items,
    networkMode,
    staleTime: 0,
  }),
  /** The secret is a key in memory only, and forgotten with the page. */
  invitation: (secret: string) =>
    queryOptions({
      queryKey: ["people", "invitation", secret],
      queryFn: ({ signal }) => call(readInvitation, { body: { secret }, signal }),
      networkMode,
      staleTime: Infinity,
      gcTime: 0,
    }),
};
