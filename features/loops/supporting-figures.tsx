import type { ReactNode } from "react";
import { View } from "react-native";

import { useWords } from "@features/i18n";
import { Figure, Text, useBreakpoint, useTheme, type ShownValue } from "@features/ui";

import type { FiguresWithWorkings, LoopFigures } from "./loop-context";
import { energyQuantity, powerQuantity } from "./register-words";
import { shownFigure } from "./shown-figure";

/** Volume, ΔT by flow, night base and how many rows count. */
export function SupportingFigures(props: FiguresWithWorkings) {
  const { summary, format, workings } = props;
  const t = useWords("loops");
  const phone = useBreakpoint() === "phone";
  const { totals, nightBase } = summary;
  const register = leading(props);
  const covered = totals.coveredS > 0 && summary.basis.blockedBy === null;
  // Energy without water: a permanent meter gave its power alone.
  const meterOnly = covered && totals[register].energyKwh !== null && totals.volumeM3 === null;
  const night = nightBase
    ? { from: hour(nightBase.fromHour, phone), to: hour(nightBase.toHour, phone) }
    : { from: hour(0, phone), to: hour(5, phone) };
  const expected = totals.rows.expected;
  // Without energy no rows are counted: coverage of time says the same.
  const share =
    summary.basis.blockedBy !== null
      ? totals.coverage
      : expected
        ? Math.min(1, totals.rows.measured / expected)
        : null;
  const shareUnit =
    expected === null || phone ? "%" : t("figures.percentOf", { rows: format.number(expected, 0) });
  return (
    <View style={{ flexDirection: "row", flexWrap: "wrap", columnGap: phone ? 20 : 24 }}>
      <Cell title={t("figures.volume")}>
        <Shown
          said={t("figures.volume")}
          figure={shownFigure(
            format,
            covered ? totals.volumeM3 : null,
            "volume",
            undefined,
            summary.plusMinus.volume,
          )}
          workings={workings.figure({ figure: "volume" })}
        />
        {meterOnly ? <MeterOnly /> : null}
      </Cell>
      <Cell title={t(phone ? "figures.deltaTShort" : "figures.deltaT")}>
        <Shown
          said={t("figures.deltaT")}
          figure={shownFigure(
            format,
            totals[register].flowWeightedDeltaTK,
            "temperatureDifference",
            2,
            summary.plusMinus[register].deltaT,
          )}
          workings={workings.figure({ figure: "deltaT" })}
        />
        {meterOnly ? <MeterOnly /> : null}
      </Cell>
      <Cell title={t("figures.night", night)}>
        <Shown
          said={t("figures.night", night)}
          figure={shownFigure(
            format,
            nightBase?.powerKw ?? null,
            powerQuantity[nightBase?.register ?? register],
            undefined,
            nightBase?.plusMinus ?? null,
          )}
          workings={workings.figure({ figure: "nightBase" })}
        />
      </Cell>
      <Cell title={t(summary.basis.blockedBy ? "figures.covered" : "figures.rows")}>
        <Shown
          said={t(summary.basis.blockedBy ? "figures.covered" : "figures.rows")}
          figure={{ value: share === null ? null : share * 100, unit: shareUnit, places: 1 }}
          workings={workings.figure({ figure: "completeness" })}
        />
      </Cell>
    </View>
  );
}

function MeterOnly() {
  const t = useWords("loops");
  return (
    <Text variant="small" tone="ink3">
      {t("figures.meterOnly")}
    </Text>
  );
}

function hour(value: number, short: boolean): string {
  const two = String(value).padStart(2, "0");
  return short ? two : `${two}:00`;
}

/** The register that moved more heat: on a one-way loop its own, unless it hardly ran. */
export function leading({ summary, loop }: LoopFigures): keyof typeof energyQuantity {
  const { heating, cooling } = summary.totals;
  if (loop.service === "changeover")
    return (heating.energyKwh ?? 0) > (cooling.energyKwh ?? 0) ? "heating" : "cooling";
  return loop.service === "hot" ? "heating" : "cooling";
}

function Cell({ title, children }: { title: string; children: ReactNode }) {
  const { colour } = useTheme();
  return (
    <View
      style={{
        flexGrow: 1,
        flexBasis: "40%",
        minWidth: 130,
        paddingVertical: 10,
        borderTopWidth: 1,
        borderTopColor: colour.rule,
      }}
    >
      <Text variant="small" tone="ink3" hidden>
        {title}
      </Text>
      {children}
    </View>
  );
}

function Shown(props: {
  said: string;
  figure: ShownValue;
  workings: ReturnType<FiguresWithWorkings["workings"]["figure"]>;
}) {
  return (
    <Figure
      {...props.figure}
      said={props.said}
      size="m"
      {...(props.figure.value === null ? {} : props.workings)}
    />
  );
}
