import type { Instrument } from "@shared/contracts/evidence";
import { useFormat, useWords } from "@features/i18n";
import { Mark, Row, Text } from "@features/ui";
import { certificateToday, daysUntil } from "./calibration-life";

/** When calibration runs out, in words; trouble carries its mark. */
export function CalibrationWords(props: { instrument: Instrument; today: string }) {
  const t = useWords("kit");
  const format = useFormat();
  const { instrument, today } = props;
  const due = certificateToday(instrument, today)?.dueOn ?? null;
  const day = due === null ? "" : format.day(due, "dayMonthYear");
  const said = {
    none: t("calibration.none"),
    openEnded: t("calibration.openEnded"),
    inDate: day,
    dueSoon: t("calibration.dueSoon", {
      day,
      count: due === null ? 0 : daysUntil(due, today),
    }),
    lapsed: t("calibration.lapsed", { day }),
  }[instrument.calibration];
  const marks = { none: "look", dueSoon: "look", lapsed: "wrong" } as const;
  const mark =
    instrument.calibration === "inDate" || instrument.calibration === "openEnded"
      ? null
      : marks[instrument.calibration];
  return (
    <Row gap={2} align="center">
      {mark ? <Mark kind={mark} size={18} silent /> : null}
      <Text variant="table" style={{ flexShrink: 1 }}>
        {said}
      </Text>
    </Row>
  );
}
