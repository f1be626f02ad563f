import { useState } from "react";

import { ApiError, NoAnswer } from "@features/api";
import { useWords } from "@features/i18n";
import { DeniedState, ErrorState, OfflineState, TextLink } from "@features/ui";

import { loopsPaths } from "./loops-paths";

/** Why there is nothing to show: offline, not allowed, gone, or a fault; with a way on. */
export function FailedAnswer({ error, onRetry }: { error: Error; onRetry: () => void }) {
  const t = useWords("loops");
  const [sinceMs] = useState(() => Date.now());
  if (error instanceof NoAnswer) return <OfflineState sinceMs={sinceMs} onRetry={onRetry} />;
  if (!(error instanceof ApiError)) return <ErrorState onRetry={onRetry} />;
  if (error.status === 403) return <DeniedState />;
  const toSites = <TextLink label={t("toSites")} href={loopsPaths.sites} />;
  if (error.status === 404) return <ErrorState title={t("gone")} actions={toSites} />;
  return <ErrorState problem={error.problem} onRetry={onRetry} />;
}
