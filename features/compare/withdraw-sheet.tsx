import { useQueryClient } from "@tanstack/react-query";
import { withdrawMeterComparison, type MeterComparison } from "@shared/contracts/meter-comparisons";
import { call, useChange } from "@features/api";
import { useWords } from "@features/i18n";
import { ReasonSheet } from "@features/ui";

/** Takes a comparison out of use, with a reason; it stays readable. */
export function WithdrawSheet(props: { comparison: MeterComparison; onClose: () => void }) {
  const t = useWords("compare");
  const client = useQueryClient();
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
  return (
    <ReasonSheet
      title={t("saved.withdraw")}
      lead={t("saved.withdrawLead")}
      label={t("saved.reason")}
      needed={t("saved.reasonNeeded")}
      send={t("saved.withdraw")}
      busy={withdrawing.busy}
      errors={withdrawing.formErrors}
      error={withdrawing.fieldError("reason")}
      onSend={(reason) => withdrawing.send({ reason })}
      onClose={props.onClose}
    />
  );
}
