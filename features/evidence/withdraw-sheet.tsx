import { useQueryClient } from "@tanstack/react-query";
import { withdrawInstallation, type Installation } from "@shared/contracts/evidence";
import { call, useChange } from "@features/api";
import { useWords } from "@features/i18n";
import { ReasonSheet } from "@features/ui";

/** Takes an installation out of use, with a reason; it stays readable. */
export function WithdrawSheet(props: { installation: Installation; onClose: () => void }) {
  const t = useWords("installation");
  const client = useQueryClient();
  const withdrawing = useChange({
    send: (body: { reason: string }) =>
      call(withdrawInstallation, { params: { installationId: props.installation.id }, body }),
    onDone: async () => {
      await client.invalidateQueries();
      props.onClose();
    },
    fields: ["reason"],
  });
  return (
    <ReasonSheet
      title={t("withdraw")}
      lead={t("withdrawLead")}
      label={t("reason")}
      needed={t("reasonNeeded")}
      send={t("withdraw")}
      busy={withdrawing.busy}
      errors={withdrawing.formErrors}
      error={withdrawing.fieldError("reason")}
      onSend={(reason) => withdrawing.send({ reason })}
      onClose={props.onClose}
    />
  );
}
