import { useQueryClient } from "@tanstack/react-query";
import { useState } from "react";
import { withdrawInstallation, type Installation } from "@shared/contracts/evidence";
import { call, useChange } from "@features/api";
import { useWords } from "@features/i18n";
import { Button, Form, Sheet, Text, TextField } from "@features/ui";

/** Takes an installation out of use, with a reason; it stays readable. */
export function WithdrawSheet(props: { installation: Installation; onClose: () => void }) {
  const t = useWords("installation");
  const client = useQueryClient();
  const [reason, setReason] = useState("");
  const [tried, setTried] = useState(false);
  const withdrawing = useChange({
    send: (body: { reason: string }) =>
      call(withdrawInstallation, { params: { installationId: props.installation.id }, body }),
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
  return (
    <Sheet open kind="side" title={t("withdraw")} onClose={props.onClose}>
      <Form label={t("withdraw")} onSubmit={submit} errors={withdrawing.formErrors}>
        <Text tone="ink2">{t("withdrawLead")}</Text>
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
        <Button submit full label={t("withdraw")} busy={withdrawing.busy} />
      </Form>
    </Sheet>
  );
}
