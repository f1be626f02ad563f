import { View } from "react-native";

import { dayInstant, formatDate, useFormat, useWords } from "@features/i18n";

import { Button } from "./button";
import { addDays, addMonths, mondayOf } from "./calendar";
import { Row } from "./stack";
import { Text } from "./text";

/** Month name between two arrows. */
export function MonthHead({ month, onMonth }: { month: string; onMonth: (month: string) => void }) {
  const t = useWords("ui");
  const format = useFormat();
  return (
    <Row justify="space-between">
      <Button
        kind="quiet"
        icon="left"
        iconOnly
        label={t("calendar.before")}
        onPress={() => onMonth(addMonths(month, -1))}
      />
      <View aria-live="polite">
        <Text variant="subhead" level={3}>
          {format.day(month, "monthYear")}
        </Text>
      </View>
      <Button
        kind="quiet"
        icon="right"
        iconOnly
        label={t("calendar.after")}
        onPress={() => onMonth(addMonths(month, 1))}
      />
    </Row>
  );
}

/** Mo Tu We … in the language, two letters. */
export function WeekdayRow({ lead }: { lead?: string }) {
  const { language } = useFormat();
  const monday = mondayOf("2026-01-05");
  const days = Array.from({ length: 7 }, (_, index) => addDays(monday, index));
  return (
    <View aria-hidden style={{ flexDirection: "row", marginBottom: 6 }}>
      {lead === undefined ? null : (
        <View style={{ width: 52 }}>
          <Text variant="chip" tone="ink3">
            {lead}
          </Text>
        </View>
      )}
      {days.map((day) => (
        <View key={day} style={{ flex: 1, alignItems: "center" }}>
          <Text variant="chip" tone="ink3">
            {formatDate(dayInstant(day), "UTC", language, "weekdayShort").slice(0, 2)}
          </Text>
        </View>
      ))}
    </View>
  );
}
