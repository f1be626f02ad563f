import { queryOptions } from "@tanstack/react-query";

import {
  listAccessTokens,
  listCaughtMail,
  listMembers,
  readInvitation,
  type Member,
} from "@shared/contracts/people";
import { call } from "@features/api";

/** Every member: an organisation's list is short, so its pages are read one after the other. */
export const membersQuery = queryOptions({
  queryKey: ["members"],
  queryFn: async ({ signal }): Promise<Member[]> => {
    const members: Member[] = [];
    let cursor: string | undefined;
    do {
      const page = await call(listMembers, { query: { cursor, limit: 200 }, signal });
      members.push(...page.items);
      cursor = page.nextCursor ?? undefined;
    } while (cursor !== undefined);
    return members;
  },
});

export const tokensQuery = queryOptions({
  queryKey: ["access-tokens"],
  queryFn: async ({ signal }) => (await call(listAccessTokens, { signal })).items,
});

export const mailQuery = queryOptions({
  queryKey: ["development-mail"],
  queryFn: async ({ signal }) => (await call(listCaughtMail, { signal })).items,
});

export const invitationQuery = (secret: string) =>
  queryOptions({
    queryKey: ["invitation", secret],
    queryFn: ({ signal }) => call(readInvitation, { body: { secret }, signal }),
    staleTime: Infinity,
    retry: false,
  });
