import type { ReactNode } from "react";

import { ApiError, NoAnswer, useOfflineSince } from "@features/api";
import { DeniedState, ErrorState, LoadingBlocks, OfflineState } from "@features/ui";

interface Answered<Data> {
  readonly data: Data | undefined;
  readonly error: Error | null;
  readonly refetch: () => unknown;
}

/** Content once it is there; loading, denied, offline or error until then. */
export function Answer<Data>(props: {
  of: Answered<Data>;
  children: (data: Data) => ReactNode;
}): ReactNode {
  const { data, error, refetch } = props.of;
  const since = useOfflineSince();
  const retry = () => void refetch();
  if (data !== undefined) return props.children(data);
  if (since !== null || error instanceof NoAnswer) {
    return <OfflineState sinceMs={since} onRetry={retry} />;
  }
  if (error === null) return <LoadingBlocks />;
  if (error instanceof ApiError && error.status === 403) return <DeniedState />;
  return <ErrorState problem={error instanceof ApiError ? error.problem : null} onRetry={retry} />;
}
