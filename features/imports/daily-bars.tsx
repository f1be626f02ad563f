import { useState } from "react";
import { View } from "react-native";
import Svg, { Line, Rect, Text as SvgText } from "react-native-svg";
import { max } from "d3-array";
import { scaleBand, scaleLinear } from "d3-scale";
import { useFormat, useWords } from "@features/i18n";
import {
  font,
  Segments,
  Table,
  Text,
  useBreakpoint,
  useMeasuredWidth,
  useTheme,
} from "@features/ui";
import type { ImportChecks } from "@shared/contracts/import-checks";

type Day = ImportChecks["daily"][number];
const HEIGHT = 300;
const FOOT = 26;
const HEAD = 22;
/** More days than this would make bars nobody can read; the table has them all. */
const MOST_BARS = 62;

type Shown = "chart" | "table";

/** Energy of each day, as bars or as a table with the same days. */
export function DailyEnergy({ days, zone }: { days: readonly Day[]; zone: string }) {
  const t = useWords("imports");
  const format = useFormat(zone);
  const [shown, setShown] = useState<Shown>("chart");
  const last = days.slice(-MOST_BARS);
  const largest = last.reduce<Day | null>(
    (top, day) => (top === null || energyOf(day) > energyOf(top) ? day : top),
    null,
  );
  if (!largest || energyOf(largest) === 0) return null;
  const summary = t("result.chartSummary", {
    from: format.day(last[0]?.date ?? ""),
    to: format.day(last.at(-1)?.date ?? ""),
    max: format.withUnit(energyOf(largest), "coolingEnergy"),
    maxDay: format.day(largest.date),
  });
  return (
    <View style={{ gap: 12 }}>
      <View style={{ alignSelf: "flex-end" }}>
        <Segments<Shown>
          size="dense"
          label={t("result.chart")}
          value={shown}
          options={[
            { value: "chart", label: t("result.asChart") },
            { value: "table", label: t("result.asTable") },
          ]}
          onChange={setShown}
        />
      </View>
      {shown === "chart" ? (
        <DailyBars days={last} zone={zone} summary={summary} />
      ) : (
        <DailyTable days={last} zone={zone} />
      )}
      <Text variant="small" tone="ink2">
        {days.length > last.length
          ? t("result.lastDays", { count: last.length })
          : t("result.chartNote")}
      </Text>
    </View>
  );
}

const hasHeating = (days: readonly Day[]) => days.some((day) => (day.heatingKwh ?? 0) > 0);
const hasCooling = (days: readonly Day[]) => days.some((day) => (day.coolingKwh ?? 0) > 0);

/** Heating beside cooling where a loop has both. */
function DailyBars(props: { days: readonly Day[]; zone: string; summary: string }) {
  const { days: shown, zone } = props;
  const format = useFormat(zone);
  const { colour } = useTheme();
  const phone = useBreakpoint() === "phone";
  const [width, onLayout] = useMeasuredWidth();
  const heating = hasHeating(shown);
  const cooling = hasCooling(shown);

  const x = scaleBand<string>()
    .domain(shown.map((day) => day.date))
    .range([0, width])
    .paddingInner(0.4)
    .paddingOuter(0.2);
  const y = scaleLinear()
    .domain([0, max(shown, (day) => Math.max(day.heatingKwh ?? 0, day.coolingKwh ?? 0)) ?? 1])
    .range([HEIGHT - FOOT, HEAD]);
  const both = heating && cooling;
  const barWidth = x.bandwidth() / (both ? 2 : 1);
  const labelled = x.step() > 44;
  const every = Math.max(1, Math.ceil(34 / Math.max(1, x.step())));

  return (
    <View role="img" aria-label={props.summary} onLayout={onLayout} style={{ height: HEIGHT }}>
      {width > 0 ? (
        <Svg width={width} height={HEIGHT}>
          {shown.map((day, index) => {
            const left = x(day.date) ?? 0;
            const bars = [
              { key: "cooling", kwh: day.coolingKwh, fill: colour.verdigrisMid, on: cooling },
              { key: "heating", kwh: day.heatingKwh, fill: colour.copperMid, on: heating },
            ].filter((bar) => bar.on);
            return bars.map((bar, place) => (
              <BarOfDay
                key={`${day.date} ${bar.key}`}
                x={left + (both ? place * barWidth : 0)}
                width={barWidth}
                top={y(bar.kwh ?? 0)}
                fill={bar.fill}
                value={labelled && bar.kwh !== null ? format.number(bar.kwh, 0) : null}
                day={
                  place === 0 && index % every === 0
                    ? phone || !labelled
                      ? String(Number(day.date.slice(8)))
                      : format.day(day.date, "weekdayDay").split(" ").slice(0, 2).join(" ")
                    : null
                }
                dayX={left + x.bandwidth() / 2}
              />
            ));
          })}
          <Line
            x1={0}
            x2={width}
            y1={HEIGHT - FOOT}
            y2={HEIGHT - FOOT}
            stroke={colour.ruleStrong}
          />
        </Svg>
      ) : null}
    </View>
  );
}

function DailyTable({ days, zone }: { days: readonly Day[]; zone: string }) {
  const t = useWords("imports");
  const format = useFormat(zone);
  const heating = hasHeating(days);
  const cooling = hasCooling(days);
  return (
    <Table
      caption={t("result.chart")}
      captionHidden
      rows={days}
      rowKey={(day) => day.date}
      columns={[
        { key: "day", header: t("result.day"), render: (day) => format.day(day.date) },
        ...(cooling
          ? [
              {
                key: "cooling",
                header: t("result.coolingShort"),
                unit: "kWh",
                align: "right" as const,
                figure: (day: Day) => ({ value: day.coolingKwh, places: 0 }),
              },
            ]
          : []),
        ...(heating
          ? [
              {
                key: "heating",
                header: t("result.heatingShort"),
                unit: "kWh",
                align: "right" as const,
                figure: (day: Day) => ({ value: day.heatingKwh, places: 0 }),
              },
            ]
          : []),
        {
          key: "covered",
          header: t("result.coveredShort"),
          align: "right",
          render: (day) => format.duration(day.coveredS),
        },
      ]}
      card={{
        title: (day) => format.day(day.date),
        figure: (day) => format.withUnit(energyOf(day), "coolingEnergy", 0),
        lines: (day) => [format.duration(day.coveredS)],
      }}
    />
  );
}

const energyOf = (day: Day): number => (day.coolingKwh ?? 0) + (day.heatingKwh ?? 0);

function BarOfDay(props: {
  x: number;
  width: number;
  top: number;
  fill: string;
  value: string | null;
  day: string | null;
  dayX: number;
}) {
  const { colour } = useTheme();
  return (
    <>
      <Rect
        x={props.x}
        y={props.top}
        width={Math.max(1, props.width)}
        height={Math.max(0, HEIGHT - FOOT - props.top)}
        fill={props.fill}
      />
      {props.value ? (
        <SvgText
          x={props.x + props.width / 2}
          y={props.top - 6}
          textAnchor="middle"
          fontSize={13}
          fontFamily={font.narrow.semibold}
          fill={colour.ink}
        >
          {props.value}
        </SvgText>
      ) : null}
      {props.day ? (
        <SvgText
          x={props.dayX}
          y={HEIGHT - 8}
          textAnchor="middle"
          fontSize={13}
          fontFamily={font.narrow.medium}
          fill={colour.ink3}
        >
          {props.day}
        </SvgText>
      ) : null}
    </>
  );
}
