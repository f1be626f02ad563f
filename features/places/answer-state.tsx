import { useState, type ReactNode } from "react";
import { ApiError, NoAnswer } from "@features/api";
import { useWords } from "@features/i18n";
import {
  DeniedState,
  ErrorState,
  LoadingBlocks,
  OfflineState,
  type BlockShape,
} from "@features/ui";
import { TextLink } from "@features/ui";
import { placesPaths } from "./places-paths";

interface Answer<Data> {
  readonly data: Data | undefined;
  readonly error: Error | null;
  readonly refetch: () => unknown;
}

/**
 * What a screen shows of an answer: its content once there is one, and the loading, denied, gone,
 * offline or error state until then. Content that is there stays when a refresh fails.
 */
export function AnswerState<Data>(props: {
  answer: Answer<Data>;
  blocks?: readonly BlockShape[];
  children: (data: Data) => ReactNode;
}): ReactNode {
  const { answer, blocks, children } = props;
  if (answer.data !== undefined) return children(answer.data);
  if (answer.error === null) return <LoadingBlocks {...(blocks ? { blocks } : {})} />;
  return <Failure error={answer.error} onRetry={() => void answer.refetch()} />;
}

function Failure({ error, onRetry }: { error: Error; onRetry: () => void }) {
  const t = useWords("places");
  const [sinceMs] = useState(() => Date.now());
  if (error instanceof NoAnswer) return <OfflineState sinceMs={sinceMs} onRetry={onRetry} />;
  if (!(error instanceof ApiError)) return <ErrorState onRetry={onRetry} />;
  if (error.status === 403) return <DeniedState />;
  const toSites = <TextLink label={t("state.toSites")} href={placesPaths.sites} />;
  if (error.status === 404) return <ErrorState title={t("state.gone")} actions={toSites} />;
  return <ErrorState problem={error.problem} onRetry={onRetry} />;
}
