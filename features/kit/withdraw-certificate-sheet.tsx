import { useQueryClient } from "@tanstack/react-query";
import { withdrawCertificate, type Certificate } from "@shared/contracts/evidence";
import { call, useChange } from "@features/api";
import { useWords } from "@features/i18n";
import { ReasonSheet } from "@features/ui";

/** Takes a certificate entered by mistake out of use; it stays readable with the reason. */
export function WithdrawCertificateSheet(props: { certificate: Certificate; onClose: () => void }) {
  const t = useWords("kit");
  const client = useQueryClient();
  const withdrawing = useChange({
    send: (body: { reason: string }) =>
      call(withdrawCertificate, { params: { certificateId: props.certificate.id }, body }),
    onDone: async () => {
      await client.invalidateQueries();
      props.onClose();
    },
    fields: ["reason"],
  });
  const title = t("certificate.withdrawSaid", { number: props.certificate.number });
  return (
    <ReasonSheet
      title={title}
      lead={t("certificate.withdrawLead")}
      label={t("reason")}
      needed={t("reasonNeeded")}
      send={t("certificate.withdraw")}
      busy={withdrawing.busy}
      errors={withdrawing.formErrors}
      error={withdrawing.fieldError("reason")}
      onSend={(reason) => withdrawing.send({ reason })}
      onClose={props.onClose}
    />
  );
}
