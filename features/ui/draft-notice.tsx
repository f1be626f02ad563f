import { useWords } from "@features/i18n";

import { Banner } from "./banner";
import { TextLink } from "./text-link";
import type { Draft } from "./use-draft";

/** Says that what is on screen was typed on an earlier visit and is not saved yet. */
export function DraftNotice({ draft }: { draft: Pick<Draft<object>, "resumed" | "clear"> }) {
  const t = useWords("ui");
  if (!draft.resumed) return null;
  return (
    <Banner
      kind="note"
      lead={t("draft.lead")}
      action={<TextLink label={t("draft.discard")} onPress={draft.clear} />}
    >
      {t("draft.detail")}
    </Banner>
  );
}
