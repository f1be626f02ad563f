import { useQuery } from "@tanstack/react-query";
import { useState } from "react";
import { Pressable, View } from "react-native";

import { addDays } from "@shared/domain/time/local-calendar";
import { needsYear, useFormat, useWords, type Format } from "@features/i18n";
import {
  Button,
  DateRange,
  Icon,
  isoWeek,
  mondayOf,
  radius,
  Row,
  Sheet,
  stroke,
  Tabs,
  target,
  Text,
  useBreakpoint,
  useTheme,
  WeekPicker,
  type DateRangeValue,
  type Quality,
} from "@features/ui";

import { loopsQueries } from "./loops-queries";
import { dayCount, daysOf, lastDayOf, neighbour, weekOf, type ShownRange } from "./shown-range";

export interface RangeBarProps {
  range: ShownRange;
  pointId: string;
  today: string;
  zone: string;
  /** First and last day with readings; null before any came. */
  first: string | null;
  last: string | null;
  onChange: (range: ShownRange) => void;
}

/** "Week 20" and its days, or the days alone. */
export function rangeWords(range: ShownRange, format: Format, today: string) {
  const last = lastDayOf(range);
  const one = range.from === last;
  const day = (date: string, named: boolean) =>
    format.day(date, named ? "dayMonthYear" : "dayMonth");
  // One year for both stands at the end.
  const ofTwoYears = needsYear(range.from, last);
  const past = needsYear(last, today);
  return {
    from: day(range.from, ofTwoYears || (one && past)),
    to: day(last, ofTwoYears || past),
    one,
  };
}

/** The range shown, its neighbours to each side, and weeks or own dates behind its name. */
export function RangeBar(props: RangeBarProps) {
  const { range, onChange } = props;
  const t = useWords("loops");
  const { colour } = useTheme();
  const format = useFormat(props.zone);
  const phone = useBreakpoint() === "phone";
  const [open, setOpen] = useState(false);
  const words = rangeWords(range, format, props.today);
  const days = words.one ? words.from : t("range.days", words);
  const before = neighbour(range, -1);
  const after = neighbour(range, 1);
  const latest = props.last !== null && props.last > props.today ? props.last : props.today;
  const step = (label: string, icon: "left" | "right", to: ShownRange, off: boolean) => (
    <Pressable
      role="button"
      aria-label={label}
      aria-disabled={off}
      onPress={() => (off ? undefined : onChange(to))}
      style={{
        minWidth: target.default - 4,
        minHeight: target.default - 2 * stroke.control,
        alignItems: "center",
        justifyContent: "center",
      }}
    >
      <Icon name={icon} size={20} tone={off ? "ruleStrong" : "ink"} />
    </Pressable>
  );
  return (
    <View
      role="group"
      aria-label={t("range.label")}
      style={{
        flexDirection: "row",
        alignSelf: "flex-start",
        flexGrow: phone ? 1 : 0,
        borderWidth: stroke.control,
        borderColor: colour.ruleStrong,
        borderRadius: radius.button,
        backgroundColor: colour.sheet,
      }}
    >
      {step(
        t("range.before"),
        "left",
        before,
        props.first !== null && lastDayOf(before) < props.first,
      )}
      <Pressable
        role="button"
        aria-label={t("range.pick", {
          range:
            range.week === null
              ? days
              : `${t("range.week", { week: isoWeek(range.week) })}, ${days}`,
        })}
        onPress={() => setOpen(true)}
        style={{
          flexDirection: "row",
          alignItems: "center",
          justifyContent: "center",
          flexGrow: 1,
          gap: 8,
          paddingHorizontal: 12,
          borderLeftWidth: 1,
          borderRightWidth: 1,
          borderColor: colour.rule,
        }}
      >
        {range.week === null ? (
          <Text variant="subhead" level="none">
            {days}
          </Text>
        ) : (
          <>
            <Text variant="subhead" level="none">
              {t("range.week", { week: isoWeek(range.week) })}
            </Text>
            <Text tone="ink2">{days}</Text>
          </>
        )}
      </Pressable>
      {step(t("range.after"), "right", after, after.from > latest)}
      <Sheet open={open} title={t("range.choose")} onClose={() => setOpen(false)}>
        {open ? (
          <RangePicker
            {...props}
            latest={latest}
            onChange={(picked) => {
              setOpen(false);
              onChange(picked);
            }}
          />
        ) : null}
      </Sheet>
    </View>
  );
}

const shownQuality: Readonly<Record<string, Quality>> = {
  measured: "measured",
  filled: "estimated",
  excluded: "excluded",
  missing: "missing",
};

function RangePicker(props: RangeBarProps & { latest: string }) {
  const { range, pointId, today, zone, first, last, latest, onChange } = props;
  const t = useWords("loops");
  const [tab, setTab] = useState<"weeks" | "dates">(range.week === null ? "dates" : "weeks");
  const [week, setWeek] = useState(range.week ?? mondayOf(range.from));
  const [dates, setDates] = useState<DateRangeValue>({ from: range.from, to: lastDayOf(range) });
  const marks = useQuery({
    ...loopsQueries.dayMarks(pointId, {
      from: first ?? today,
      until: addDays(last ?? today, 1),
      week: null,
    }),
    enabled: first !== null,
  });
  const quality = Object.fromEntries(
    (marks.data?.days ?? []).flatMap(({ date, kind }) => {
      const shown = shownQuality[kind];
      return shown ? [[date, shown]] : [];
    }),
  );
  const zoneName = t("range.zone", { zone });
  const limits = { ...(first === null ? {} : { min: first }), max: latest };
  const picked = dates.from !== null && dates.to !== null && dates.to >= dates.from;
  const lastWeek = last === null ? null : weekOf(fullWeek(last));
  return (
    <View style={{ gap: 14 }}>
      <Tabs
        label={t("range.choose")}
        current={tab}
        onChange={setTab}
        ground="sheet"
        tabs={[
          { key: "weeks", label: t("range.weeks") },
          { key: "dates", label: t("range.dates") },
        ]}
      />
      {tab === "weeks" ? (
        <>
          <WeekPicker
            label={t("range.weeks")}
            value={week}
            onChange={setWeek}
            today={today}
            quality={quality}
            zoneName={zoneName}
            {...limits}
          />
          {lastWeek && last ? (
            <Row gap={3} wrap>
              <Button
                kind="second"
                label={t("range.lastWeek")}
                onPress={() => onChange(lastWeek)}
              />
              <Button
                kind="second"
                label={t("range.lastFour")}
                onPress={() => onChange(daysOf(addDays(lastWeek.from, -21), lastDayOf(lastWeek)))}
              />
            </Row>
          ) : null}
          <Button
            full
            label={t("range.showWeek", { week: isoWeek(week) })}
            onPress={() => onChange(weekOf(week))}
          />
        </>
      ) : (
        <>
          <DateRange
            label={t("range.dates")}
            value={dates}
            onChange={setDates}
            today={today}
            zoneName={zoneName}
            {...limits}
          />
          {first !== null && last !== null ? (
            <Button
              kind="second"
              label={t("range.all")}
              onPress={() => onChange(daysOf(first, last))}
            />
          ) : null}
          <Button
            full
            label={
              picked && dates.from && dates.to
                ? t("range.showDays", { count: dayCount(daysOf(dates.from, dates.to)) })
                : t("range.showNone")
            }
            {...(picked ? {} : { offBecause: t("range.pickTwo") })}
            onPress={() => {
              if (dates.from && dates.to && picked) onChange(daysOf(dates.from, dates.to));
            }}
          />
        </>
      )}
    </View>
  );
}

/** The last week that ended on or before the last day with readings, or the one it stands in. */
function fullWeek(last: string): string {
  return addDays(mondayOf(last), 6) <= last ? last : addDays(mondayOf(last), -7);
}
