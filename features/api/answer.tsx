import type { ReactNode } from "react";

import { useWords } from "@features/i18n";
import {
  DeniedState,
  ErrorState,
  LoadingBlocks,
  OfflineState,
  TextLink,
  type BlockShape,
} from "@features/ui";

import { ApiError, NoAnswer } from "./api-error";
import { useOfflineSince } from "./use-offline";

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
  /** The final layout, in still blocks. */
  blocks?: readonly BlockShape[];
  /** Who may see it, said to those who may not. */
  denied?: string;
  children: (data: Data) => ReactNode;
}): ReactNode {
  const { data, error, refetch } = props.of;
  if (data !== undefined) return props.children(data);
  if (error === null) return <LoadingBlocks blocks={props.blocks} label={props.loading} />;
  return <FailedAnswer error={error} denied={props.denied} onRetry={() => void refetch()} />;
}

/** Why there is nothing to show: offline, not allowed, gone, or a fault; with a way on. */
export function FailedAnswer(props: { error: Error; denied?: string; onRetry: () => void }) {
  const { error, onRetry } = props;
  const t = useWords("ui");
  const sinceMs = useOfflineSince();
  if (error instanceof NoAnswer) return <OfflineState sinceMs={sinceMs} onRetry={onRetry} />;
  if (!(error instanceof ApiError)) return <ErrorState onRetry={onRetry} />;
  if (error.status === 403) return <DeniedState detail={props.denied} />;
  if (error.status === 404) {
    const toSites = <TextLink label={t("state.toSites")} href="/sites" />;
    return <ErrorState title={t("state.gone")} problem={error.problem} actions={toSites} />;
  }
  return <ErrorState problem={error.problem} onRetry={onRetry} />;
}
