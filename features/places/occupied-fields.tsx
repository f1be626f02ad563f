import { View } from "react-native";

import { useWords } from "@features/i18n";
import { FieldGroup, FieldRow, Row, SelectField, TapChip, Text } from "@features/ui";

/** Hours people are in, as picked: weekdays 1 to 7 and times of the clock. */
export interface OccupiedValues {
  readonly weekdays: readonly number[];
  readonly occupiedFrom: string;
  readonly occupiedTo: string;
}

const weekdays = ["1", "2", "3", "4", "5", "6", "7"] as const;

/** Every quarter-hour from 00:00; the end of the day is 24:00. */
const times = Array.from({ length: 97 }, (_, quarter) => {
  const two = (value: number) => String(value).padStart(2, "0");
  const text = `${two(Math.floor(quarter / 4))}:${two((quarter % 4) * 15)}`;
  return { value: text, label: text };
});

/** When a site is occupied: base load and off hours are told from it. */
export function OccupiedFields(props: {
  values: OccupiedValues;
  onChange: (changes: Partial<OccupiedValues>) => void;
  /** Nobody has set them yet. */
  assumed: boolean;
  error: string | null;
}) {
  const t = useWords("load");
  const { values, onChange } = props;
  const toggle = (day: number) =>
    onChange({
      weekdays: values.weekdays.includes(day)
        ? values.weekdays.filter((picked) => picked !== day)
        : [...values.weekdays, day].sort((a, b) => a - b),
    });
  return (
    <FieldGroup title={t("occupied.title")}>
      <View style={{ gap: 4 }}>
        <Text variant="subhead" level={2}>
          {t("occupied.title")}
        </Text>
        <Text variant="small" tone="ink2">
          {t("occupied.why")}
          {props.assumed ? ` ${t("occupied.assumed")}` : ""}
        </Text>
      </View>
      <View role="group" aria-label={t("occupied.days")}>
        <Row gap={2} wrap>
          {weekdays.map((day) => (
            <TapChip
              key={day}
              label={t(`weekday.${day}`)}
              picked={values.weekdays.includes(Number(day))}
              onPress={() => toggle(Number(day))}
            />
          ))}
        </Row>
      </View>
      <FieldRow>
        <SelectField
          label={t("occupied.from")}
          value={values.occupiedFrom}
          options={times.slice(0, -1)}
          onChange={(occupiedFrom) => onChange({ occupiedFrom })}
        />
        <SelectField
          label={t("occupied.to")}
          value={values.occupiedTo}
          options={times.slice(1)}
          onChange={(occupiedTo) => onChange({ occupiedTo })}
          error={props.error}
        />
      </FieldRow>
    </FieldGroup>
  );
}
