import { useState } from "react";
import type { ImportDetail } from "@shared/contracts/imports";
import { useWords } from "@features/i18n";
import { Banner, Dialog, ListRow, Text } from "@features/ui";
import { useChangeChoices } from "./result-queries";

/** The way back from an imported log to its choices, asked first: energy goes meanwhile. */
export function ChangeChoices({ detail }: { detail: ImportDetail }) {
  const t = useWords("logs");
  const [asking, setAsking] = useState(false);
  const changing = useChangeChoices(detail.id, () => setAsking(false));
  if (detail.state === "imported" && detail.progress !== null)
    return (
      <Banner kind="note" live>
        {t("change.busy")}
      </Banner>
    );
  if (!detail.can.undo) return null;
  return (
    <>
      <ListRow
        icon="edit"
        title={t("change.title")}
        detail={t("change.hint")}
        onPress={() => setAsking(true)}
      />
      <Dialog
        open={asking}
        title={t("change.dialogTitle")}
        confirmLabel={t("change.send")}
        cancelLabel={t("change.keep")}
        stop
        busy={changing.busy}
        onClose={() => setAsking(false)}
        onConfirm={() => changing.send(undefined)}
      >
        <Text>
          {t("change.dialogText", { count: detail.rowsStored ?? 0, tag: detail.loop.tag })}
        </Text>
        {changing.error ? <Text>{changing.formErrors.join(" ")}</Text> : null}
      </Dialog>
    </>
  );
}
