import { queryOptions, useQuery } from "@tanstack/react-query";
import { getSession, type Session } from "@shared/contracts/people";
import { ApiError } from "./api-error";
import { call } from "./call";

/** Who is signed in; null when nobody is. */
export const sessionQuery = queryOptions({
  queryKey: ["session"],
  queryFn: async ({ signal }): Promise<Session | null> => {
    try {
      return await call(getSession, { signal });
    } catch (error) {
      if (error instanceof ApiError && error.status === 401) return null;
      throw error;
    }
  },
  staleTime: 60_000,
});

export const useSession = () => useQuery(sessionQuery);
