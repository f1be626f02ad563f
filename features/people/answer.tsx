import type { ReactNode } from "react";

import { ApiError, NoAnswer, useOfflineSince } from "@features/api";
import { DeniedState, ErrorState, LoadingBlocks, OfflineState } from "@features/ui";

interface Answered<Data> {
  readonly data: Data | undefined;
  readonly error: Error | null;
  readonly refetch: () => unknown;
}

/** Content once it is there, also when a later refresh fails; until then what keeps it away. */
export function Answer<Data>(props: {
  of: Answered<Data>;
  /** Said while it loads. */
  loading?: string;
  /** Who may see it, said to those who may not. */
  denied?: string;
  children: (data: Data) => ReactNode;
}): ReactNode {
  const { data, error, refetch } = props.of;
  const since = useOfflineSince();
  const retry = () => void refetch();
  if (data !== undefined) return props.children(data);
  if (error === null) return <LoadingBlocks label={props.loading} />;
  if (error instanceof NoAnswer) return <OfflineState sinceMs={since} onRetry={retry} />;
  if (error instanceof ApiError && error.status === 403) {
    return <DeniedState detail={props.denied} />;
  }
  return <ErrorState problem={error instanceof ApiError ? error.problem : null} onRetry={retry} />;
}
