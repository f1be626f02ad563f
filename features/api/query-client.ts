import { MutationCache, QueryCache, QueryClient } from "@tanstack/react-query";
import { ApiError } from "./api-error";
import { sessionQuery } from "./session-queries";

/** Refusals are final; only silence and a server's own failure are worth another try. */
function worthAnotherTry(failures: number, error: unknown): boolean {
  if (error instanceof ApiError && error.status < 500) return false;
  return failures < 2;
}

export function createQueryClient(): QueryClient {
  // A session that ended elsewhere shows with the next call: then nobody is signed in, and the guard
  // of the signed-in pages asks for the password again.
  const noticeEnd = (error: unknown) => {
    if (error instanceof ApiError && error.code === "not-signed-in") {
      client.setQueryData(sessionQuery.queryKey, null);
    }
  };
  const client: QueryClient = new QueryClient({
    queryCache: new QueryCache({ onError: noticeEnd }),
    mutationCache: new MutationCache({ onError: noticeEnd }),
    defaultOptions: {
      queries: { retry: worthAnotherTry, staleTime: 10_000, refetchOnWindowFocus: true },
      mutations: { retry: false },
    },
  });
  return client;
}
