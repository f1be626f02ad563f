import { useId, useState } from "react";
import { Pressable, View } from "react-native";
import Svg from "react-native-svg";

import { useFormat, useWords } from "@features/i18n";

import { isoWeek, mondayOf, weeksOfMonth } from "./calendar";
import { MonthHead, WeekdayRow } from "./month-head";
import { QualityKey, QualityPatterns, QualityRect, type Quality } from "./quality";
import { Text } from "./text";
import { stroke, target, useTheme } from "./theme";

export interface WeekPickerProps {
  label: string;
  /** Monday of the picked week, YYYY-MM-DD, or null. */
  value: string | null;
  onChange: (monday: string) => void;
  /** Today in the site's zone. */
  today: string;
  /** Worst quality of each day known, so weak weeks are seen before picking. */
  quality?: Readonly<Record<string, Quality>>;
  /** First and last day with data; other weeks are off. */
  min?: string;
  max?: string;
  /** Said below the grid: “London time”. */
  zoneName?: string;
}

/** Rows are weeks and a whole row is the target; each day shows its quality. */
export function WeekPicker(props: WeekPickerProps) {
  const t = useWords("ui");
  const [month, setMonth] = useState(props.value ?? props.max ?? props.today);
  return (
    <View role="group" aria-label={props.label} style={{ gap: 8 }}>
      <MonthHead month={month} onMonth={setMonth} />
      <View>
        <WeekdayRow lead={t("calendar.week")} />
        {weeksOfMonth(month).map((week) => (
          <WeekRow key={week[0]} {...props} week={week} month={month.slice(0, 7)} />
        ))}
      </View>
      {props.quality ? <QualityKey /> : null}
      {props.zoneName ? (
        <Text variant="small" tone="ink2">
          {props.zoneName}
        </Text>
      ) : null}
    </View>
  );
}

function WeekRow(props: WeekPickerProps & { week: string[]; month: string }) {
  const { colour } = useTheme();
  const t = useWords("ui");
  const format = useFormat();
  const monday = props.week[0] ?? props.today;
  const sunday = props.week[6] ?? props.today;
  const on = props.value !== null && mondayOf(props.value) === monday;
  const off =
    (props.min !== undefined && sunday < props.min) ||
    (props.max !== undefined && monday > props.max);
  const troubles = props.week.filter((day) => {
    const quality = props.quality?.[day];
    return quality !== undefined && quality !== "measured";
  }).length;
  const said = t("calendar.saidWeek", {
    week: isoWeek(monday),
    from: format.day(monday, "dayMonth"),
    to: format.day(sunday, "dayMonth"),
  });
  return (
    <Pressable
      role="button"
      aria-label={troubles > 0 ? `${said}, ${t("calendar.troubles", { count: troubles })}` : said}
      aria-pressed={on}
      aria-disabled={off}
      onPress={() => (off ? undefined : props.onChange(monday))}
      style={{
        flexDirection: "row",
        alignItems: "center",
        minHeight: target.default,
        borderRadius: 12,
        borderWidth: stroke.run,
        borderColor: on ? colour.mark : "transparent",
        backgroundColor: on ? colour.markTint : "transparent",
      }}
    >
      <View style={{ width: 52 - stroke.run, paddingLeft: 12, paddingBottom: 8 }}>
        <Text variant={on ? "navOn" : "subhead"} level="none" tone={off ? "ink3" : "ink"}>
          {String(isoWeek(monday))}
        </Text>
      </View>
      {props.week.map((day) => (
        <DayCell
          key={day}
          day={day}
          faint={off || day.slice(0, 7) !== props.month || day > props.today}
          today={day === props.today}
          quality={props.quality?.[day]}
        />
      ))}
    </Pressable>
  );
}

function DayCell(props: { day: string; faint: boolean; today: boolean; quality?: Quality }) {
  const { colour } = useTheme();
  const id = useId().replace(/:/g, "");
  return (
    <View style={{ flex: 1, alignItems: "center", gap: 1 }}>
      <View
        style={{
          minWidth: 30,
          height: 30,
          borderRadius: 15,
          borderWidth: 1.8,
          borderColor: props.today ? colour.ink : "transparent",
          alignItems: "center",
          justifyContent: "center",
        }}
      >
        <Text variant="nav" tone={props.faint ? "ink3" : "ink"}>
          {String(Number(props.day.slice(8)))}
        </Text>
      </View>
      <View style={{ height: 7 }}>
        {props.quality ? (
          <Svg width={18} height={7}>
            <QualityPatterns id={id} />
            <QualityRect
              id={id}
              quality={props.quality}
              x={1}
              y={1}
              width={16}
              height={props.quality === "measured" ? 3 : 5}
            />
          </Svg>
        ) : null}
      </View>
    </View>
  );
}
