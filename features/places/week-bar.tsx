import { useState } from "react";
import { Pressable, View } from "react-native";
import {
  dayInstant,
  localeOf,
  needsYear,
  useFormat,
  useWords,
  type Language,
} from "@features/i18n";
import {
  addDays,
  Button,
  Icon,
  isoWeek,
  radius,
  Sheet,
  stroke,
  target,
  Text,
  useBreakpoint,
  useTheme,
  WeekPicker,
} from "@features/ui";

/** “11–17 May”, “27 Apr–3 May”: as short as the language writes a range of days. */
function weekDays(monday: string, language: Language, today: string): string {
  const sunday = addDays(monday, 6);
  const format = new Intl.DateTimeFormat(localeOf(language), {
    day: "numeric",
    month: "short",
    ...(needsYear(sunday, today) ? { year: "numeric" } : {}),
    timeZone: "UTC",
  });
  const range = format.formatRange(dayInstant(monday), dayInstant(sunday));
  // Some browsers put thin spaces around the dash, some do not.
  return range.replace(/\s*–\s*/, "–");
}

/** The week shown, one to each side, and the whole calendar behind its name. */
export function WeekBar(props: {
  /** Monday of the week shown. */
  monday: string;
  today: string;
  onChange: (monday: string) => void;
  /** Days with readings; weeks outside are off. */
  min?: string;
  max?: string;
  zoneName: string;
}) {
  const t = useWords("places");
  const { colour } = useTheme();
  const format = useFormat();
  const [open, setOpen] = useState(false);
  const { monday, min, max, today } = props;
  const latest = max !== undefined && max > today ? max : today;
  const phone = useBreakpoint() === "phone";
  const days = weekDays(monday, format.language, today);
  const step = (label: string, icon: "left" | "right", to: string, off: boolean) => (
    <Pressable
      role="button"
      aria-label={label}
      aria-disabled={off}
      onPress={() => (off ? undefined : props.onChange(to))}
      style={{
        minWidth: target.default - 2 * stroke.control,
        minHeight: target.default - 2 * stroke.control,
        alignItems: "center",
        justifyContent: "center",
      }}
    >
      <Icon name={icon} size={20} tone={off ? "rule" : "ink"} />
    </Pressable>
  );
  return (
    <View
      role="group"
      aria-label={t("week.label")}
      style={{
        flexDirection: "row",
        alignSelf: "flex-start",
        borderWidth: stroke.control,
        borderColor: colour.ruleStrong,
        borderRadius: radius.button,
        backgroundColor: colour.sheet,
      }}
    >
      {step(
        t("week.before"),
        "left",
        addDays(monday, -7),
        min !== undefined && addDays(monday, -1) < min,
      )}
      <Pressable
        role="button"
        aria-label={t("week.pick", { week: isoWeek(monday), days })}
        onPress={() => setOpen(true)}
        style={{
          flexDirection: "row",
          alignItems: "center",
          gap: phone ? 6 : 8,
          paddingHorizontal: phone ? 10 : 14,
          borderLeftWidth: 1,
          borderRightWidth: 1,
          borderColor: colour.rule,
        }}
      >
        <Text variant="subhead" level="none">
          {t("week.name", { week: isoWeek(monday) })}
        </Text>
        <Text tone="ink2">{days}</Text>
      </Pressable>
      {step(t("week.after"), "right", addDays(monday, 7), addDays(monday, 7) > latest)}
      <Sheet open={open} title={t("week.choose")} onClose={() => setOpen(false)}>
        <WeekPicker
          label={t("week.choose")}
          value={monday}
          today={today}
          zoneName={props.zoneName}
          {...(min === undefined ? {} : { min })}
          max={latest}
          onChange={(picked) => {
            setOpen(false);
            props.onChange(picked);
          }}
        />
        <Button
          kind="second"
          label={t("week.this")}
          onPress={() => {
            setOpen(false);
            props.onChange(addDays(today, -((new Date(`${today}T00:00Z`).getUTCDay() + 6) % 7)));
          }}
        />
      </Sheet>
    </View>
  );
}
