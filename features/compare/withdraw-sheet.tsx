import { useQueryClient } from "@tanstack/react-query";
import { useState } from "react";
import { withdrawMeterComparison, type MeterComparison } from "@shared/contracts/meter-comparisons";
import { call, useChange } from "@features/api";
import { useWords } from "@features/i18n";
import { Button, Form, Sheet, Text, TextField } from "@features/ui";

/** Takes a comparison out of use, with a reason; it stays readable. */
export function WithdrawSheet(props: { comparison: MeterComparison; onClose: () => void }) {
  const t = useWords("compare");
  const client = useQueryClient();
  const [reason, setReason] = useState("");
  const [tried, setTried] = useState(false);
  const { id: meterComparisonId } = props.comparison;
  const withdrawing = useChange({
    send: (body: { reason: string }) =>
      call(withdrawMeterComparison, { params: { meterComparisonId }, body }),
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
    <Sheet open kind="side" title={t("saved.withdraw")} onClose={props.onClose}>
      <Form label={t("saved.withdraw")} onSubmit={submit} errors={withdrawing.formErrors}>
        <Text tone="ink2">{t("saved.withdrawLead")}</Text>
        <TextField
          label={t("saved.reason")}
          value={reason}
          onChange={setReason}
          error={
            tried && reason.trim() === ""
              ? t("saved.reasonNeeded")
              : withdrawing.fieldError("reason")
          }
          required
          autoComplete="off"
        />
        <Button submit full label={t("saved.withdraw")} busy={withdrawing.busy} />
      </Form>
    </Sheet>
  );
}
