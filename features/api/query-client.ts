import { QueryClient } from "@tanstack/react-query";
import { ApiError } from "./api-error";

/** Refusals are final; only silence and a server's own failure are worth another try. */
function worthAnotherTry(failures: number, error: unknown): boolean {
  if (error instanceof ApiError && error.status < 500) return false;
  return failures < 2;
}

export function createQueryClient(): QueryClient {
  return new QueryClient({
    defaultOptions: {
      queries: { retry: worthAnotherTry, staleTime: 10_000, refetchOnWindowFocus: true },
      mutations: { retry: false },
    },
  });
}
