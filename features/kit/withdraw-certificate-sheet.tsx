import { useQueryClient } from "@tanstack/react-query";
import { useState } from "react";
import { withdrawCertificate, type Certificate } from "@shared/contracts/evidence";
import { call, useChange } from "@features/api";
import { useWords } from "@features/i18n";
import { Button, Form, Sheet, Text, TextField } from "@features/ui";

/** Takes a certificate entered by mistake out of use; it stays readable with the reason. */
export function WithdrawCertificateSheet(props: { certificate: Certificate; onClose: () => void }) {
  const t = useWords("kit");
  const client = useQueryClient();
  const [reason, setReason] = useState("");
  const [tried, setTried] = useState(false);
  const withdrawing = useChange({
    send: (body: { reason: string }) =>
      call(withdrawCertificate, { params: { certificateId: props.certificate.id }, body }),
    onDone: async () => {
      await client.invalidateQueries();
      props.onClose();
    },
    fields: ["reason"],
  });
  const submit = () => {
    setTried(true);
    if (reason.trim() !== "") withdrawing.send({ reason: reason.trim() });
  };
  const title = t("certificate.withdrawSaid", { number: props.certificate.number });
  return (
    <Sheet open kind="side" title={title} onClose={props.onClose}>
      <Form label={title} onSubmit={submit} errors={withdrawing.formErrors}>
        <Text tone="ink2">{t("certificate.withdrawLead")}</Text>
        <TextField
          label={t("reason")}
          value={reason}
          onChange={setReason}
          error={
            tried && reason.trim() === "" ? t("reasonNeeded") : withdrawing.fieldError("reason")
          }
          required
          autoComplete="off"
        />
        <Button submit full label={t("certificate.withdraw")} busy={withdrawing.busy} />
      </Form>
    </Sheet>
  );
}
