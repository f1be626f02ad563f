import { useQueryClient } from "@tanstack/react-query";
import { useState } from "react";
import { withdrawCorrection, type Correction } from "@shared/contracts/corrections";
import { call, useChange } from "@features/api";
import { useWords } from "@features/i18n";
import { Button, Form, Sheet, Text, TextField, useToast } from "@features/ui";

/** Why a correction goes; it stays in the list with it. */
export function WithdrawSheet(props: { correction: Correction; onClose: () => void }) {
  const { correction, onClose } = props;
  const t = useWords("corrections");
  const toast = useToast();
  const client = useQueryClient();
  const [reason, setReason] = useState("");
  const [tried, setTried] = useState(false);
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
  const submit = () => {
    setTried(true);
    if (reason.trim() !== "") withdrawing.send({ reason: reason.trim() });
  };
  const title = t("withdraw.said", { title: t(`kind.${correction.change.kind}.label`) });
  return (
    <Sheet open kind="side" title={title} onClose={onClose}>
      <Form label={title} onSubmit={submit} errors={withdrawing.formErrors}>
        <Text tone="ink2">{t("withdraw.lead")}</Text>
        <TextField
          label={t("field.reason")}
          value={reason}
          onChange={setReason}
          error={
            tried && reason.trim() === "" ? t("field.needed") : withdrawing.fieldError("reason")
          }
          autoComplete="off"
          required
        />
        <Button submit full label={t("withdraw.send")} busy={withdrawing.busy} />
      </Form>
    </Sheet>
  );
}
