import { useQueryClient } from "@tanstack/react-query";
import { withdrawCorrection, type Correction } from "@shared/contracts/corrections";
import { call, useChange } from "@features/api";
import { useWords } from "@features/i18n";
import { ReasonSheet, useToast } from "@features/ui";

/** Why a correction goes; it stays in the list with it. */
export function WithdrawSheet(props: { correction: Correction; onClose: () => void }) {
  const { correction, onClose } = props;
  const t = useWords("corrections");
  const toast = useToast();
  const client = useQueryClient();
  const withdrawing = useChange({
    send: (body: { reason: string }) =>
      call(withdrawCorrection, { params: { correctionId: correction.id }, body }),
    onDone: async () => {
      await client.invalidateQueries();
      toast({ message: t("withdraw.done") });
      onClose();
    },
    fields: ["reason"],
  });
  const title = t("withdraw.said", { title: t(`kind.${correction.change.kind}.label`) });
  return (
    <ReasonSheet
      title={title}
      lead={t("withdraw.lead")}
      label={t("field.reason")}
      needed={t("field.needed")}
      send={t("withdraw.send")}
      busy={withdrawing.busy}
      errors={withdrawing.formErrors}
      error={withdrawing.fieldError("reason")}
      onSend={(reason) => withdrawing.send({ reason })}
      onClose={onClose}
    />
  );
}
