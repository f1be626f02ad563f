import { useState } from "react";
import { Pressable, View } from "react-native";

import { useFormat, useWords } from "@features/i18n";

import { daysInclusive, weeksOfMonth } from "./calendar";
import { DateField } from "./date-field";
import { FieldRow } from "./form";
import { MonthHead, WeekdayRow } from "./month-head";
import { Row } from "./stack";
import { Text } from "./text";
import { stroke, target, useTheme } from "./theme";

export interface DateRangeValue {
  /** First and last day, both included, YYYY-MM-DD. */
  from: string | null;
  to: string | null;
}

export interface DateRangeProps {
  label: string;
  value: DateRangeValue;
  onChange: (value: DateRangeValue) => void;
  today: string;
  min?: string;
  max?: string;
  zoneName?: string;
}

/** Two fields and one band that runs from row to row. */
export function DateRange(props: DateRangeProps) {
  const t = useWords("ui");
  const { from, to } = props.value;
  const [month, setMonth] = useState(from ?? props.max ?? props.today);
  const backwards = from !== null && to !== null && to < from;
  const pick = (day: string) => {
    // First tap starts, second ends; a tap before the start, or on a finished range, starts anew.
    if (from === null || to !== null || day < from) props.onChange({ from: day, to: null });
    else props.onChange({ from, to: day });
  };
  return (
    <View role="group" aria-label={props.label} style={{ gap: 12 }}>
      <FieldRow>
        <DateField
          label={t("calendar.from")}
          value={from}
          min={props.min}
          max={props.max}
          onChange={(day) => {
            props.onChange({ from: day, to });
            if (day) setMonth(day);
          }}
        />
        <DateField
          label={t("calendar.to")}
          value={to}
          min={props.min}
          max={props.max}
          error={backwards ? t("calendar.backwards") : null}
          onChange={(day) => props.onChange({ from, to: day })}
        />
      </FieldRow>
      <MonthHead month={month} onMonth={setMonth} />
      <View>
        <WeekdayRow />
        {weeksOfMonth(month).map((week) => (
          <View key={week[0]} style={{ flexDirection: "row", marginBottom: 6 }}>
            {week.map((day) => (
              <RangeDay key={day} {...props} day={day} month={month.slice(0, 7)} onPick={pick} />
            ))}
          </View>
        ))}
      </View>
      <Row justify="space-between" wrap>
        <Text variant="small" tone="ink2">
          {from && to && !backwards
            ? t("calendar.days", { count: daysInclusive(from, to) })
            : t("calendar.pickTwo")}
        </Text>
        {props.zoneName ? (
          <Text variant="small" tone="ink2">
            {props.zoneName}
          </Text>
        ) : null}
      </Row>
    </View>
  );
}

function RangeDay(
  props: DateRangeProps & { day: string; month: string; onPick: (day: string) => void },
) {
  const { colour } = useTheme();
  const format = useFormat();
  const { day } = props;
  const { from } = props.value;
  const to = props.value.to ?? from;
  const inside = from !== null && to !== null && day >= from && day <= to;
  const off =
    (props.min !== undefined && day < props.min) || (props.max !== undefined && day > props.max);
  const first = day === from;
  const last = day === to;
  const edge = inside ? colour.mark : "transparent";
  return (
    <Pressable
      role="button"
      aria-label={format.day(day, "full")}
      aria-pressed={inside}
      aria-disabled={off}
      onPress={() => (off ? undefined : props.onPick(day))}
      style={{
        flex: 1,
        minHeight: target.default,
        alignItems: "center",
        justifyContent: "center",
        backgroundColor: inside ? colour.markTint : "transparent",
        borderTopWidth: stroke.run,
        borderBottomWidth: stroke.run,
        borderLeftWidth: first ? stroke.run : 0,
        borderRightWidth: last ? stroke.run : 0,
        borderColor: edge,
        borderTopLeftRadius: first ? 12 : 0,
        borderBottomLeftRadius: first ? 12 : 0,
        borderTopRightRadius: last ? 12 : 0,
        borderBottomRightRadius: last ? 12 : 0,
      }}
    >
      <View
        style={{
          minWidth: 34,
          height: 34,
          borderRadius: 17,
          borderWidth: 1.8,
          borderColor: day === props.today ? colour.ink : "transparent",
          alignItems: "center",
          justifyContent: "center",
        }}
      >
        <Text
          variant={first || last ? "navOn" : "nav"}
          tone={off || day.slice(0, 7) !== props.month || day > props.today ? "ink3" : "ink"}
        >
          {String(Number(day.slice(8)))}
        </Text>
      </View>
    </Pressable>
  );
}
