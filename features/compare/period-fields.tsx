import { View } from "react-native";
import { minuteOf, type WallTime } from "@shared/domain/time/wall-time";
import { useWords } from "@features/i18n";
import { DateField, FieldGroup, FieldRow, Text, TextField } from "@features/ui";

/** From when to when, by the site's clock. */
export function PeriodFields(props: {
  zone: string;
  from: WallTime;
  to: WallTime;
  onChange: (changed: { from?: WallTime; to?: WallTime }) => void;
  errorOf: (field: string) => string | null;
}) {
  const t = useWords("compare");
  const end = (which: "from" | "to") => {
    const value = props[which];
    const timeError = minuteOf(value.time) === null ? t("form.timeWrong") : null;
    return (
      <FieldRow>
        <DateField
          label={t(`form.${which}Day`)}
          value={value.day}
          onChange={(day) => props.onChange({ [which]: { ...value, day } })}
          error={props.errorOf(which)}
          required
        />
        <TextField
          label={t(`form.${which}Time`)}
          value={value.time}
          onChange={(time) => props.onChange({ [which]: { ...value, time } })}
          error={timeError}
          autoComplete="off"
          asRead
          required
        />
      </FieldRow>
    );
  };
  return (
    <FieldGroup title={t("form.period")}>
      <View>
        <Text variant="heading">{t("form.period")}</Text>
        <Text variant="small" tone="ink3">
          {t("form.periodHint", { zone: props.zone })}
        </Text>
      </View>
      {end("from")}
      {end("to")}
    </FieldGroup>
  );
}
