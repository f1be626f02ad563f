import { useState } from "react";
import { View } from "react-native";

import { useWords } from "@features/i18n";
import { Card, Figure, Row, Segments, Text, TextLink, useBreakpoint, useTheme } from "@features/ui";

import { LoadFigure, useHours } from "./load-figure";
import type { LoadFigures } from "./load-view";
import { loopsPaths } from "./loops-paths";
import { energyQuantity, powerQuantity } from "./register-words";
import { shownFigure } from "./shown-figure";

/** What runs when nobody asks for much, and what runs for nothing. */
export function LoadBase(props: LoadFigures & { onHours: (hours: "all" | "unoccupied") => void }) {
  const { shape, format } = props;
  const t = useWords("load");
  const phone = useBreakpoint() === "phone";
  const { baseLoad, offHours, register } = shape;
  const hours = baseLoad?.hours ?? "all";
  const share = offHours.energyShare;
  const ratio = offHours.dayOffRatio;
  return (
    <Card label={t("base.title")} pad={phone ? 3 : 4} style={phone ? null : { flexGrow: 1 }}>
      <Text variant={phone ? "subhead" : "heading"} level={2}>
        {t("base.title")}
      </Text>
      <Row justify="space-between" align="flex-start" wrap gap={3} style={{ marginTop: 10 }}>
        <View style={{ gap: 2, flexShrink: 1, minWidth: 120 }}>
          <Text variant="small" tone="ink3" hidden>
            {t("base.load")}
          </Text>
          <Figure
            {...shownFigure(
              format,
              baseLoad?.powerKw ?? null,
              powerQuantity[register],
              undefined,
              baseLoad?.plusMinus ?? null,
            )}
            said={t("base.load")}
            size="m"
          />
        </View>
        <Segments
          label={t("base.hours")}
          value={hours}
          size={phone ? "default" : "dense"}
          options={[
            { value: "all", label: t("base.all") },
            { value: "unoccupied", label: t("base.unoccupied") },
          ]}
          onChange={props.onHours}
        />
      </Row>
      <Text variant="small" tone="ink2">
        {baseLoad === null
          ? t("base.unknown")
          : t(baseLoad.hours === "all" ? "base.wordsAll" : "base.wordsUnoccupied")}
      </Text>
      <View style={{ flexDirection: "row", flexWrap: "wrap", gap: 16, marginTop: 14 }}>
        <LoadFigure
          title={t("base.share")}
          figure={{ value: share === null ? null : share * 100, unit: "%", places: 1 }}
        >
          {offHours.energyKwh === null
            ? null
            : t("base.shareWords", {
                energy: format.withUnit(offHours.energyKwh, energyQuantity[register]),
              })}
        </LoadFigure>
        <LoadFigure
          title={t("base.ratio")}
          figure={{ value: ratio === null ? null : ratio * 100, unit: "%", places: 0 }}
        >
          {t("base.ratioWords")}
        </LoadFigure>
      </View>
      <Occupied {...props} />
      <Still {...props} />
    </Card>
  );
}

/** "Mon to Fri" where the days adjoin, else each by itself. */
export function useWeekdays() {
  const t = useWords("load");
  const name = (day: number) => t(`weekday.${String(day) as "1"}`);
  return (weekdays: readonly number[]): string => {
    const first = weekdays[0];
    const last = weekdays.at(-1);
    if (first === undefined || last === undefined) return "";
    const adjoin = last - first === weekdays.length - 1;
    return adjoin && weekdays.length > 2
      ? t("weekday.to", { from: name(first), to: name(last) })
      : weekdays.map(name).join(", ");
  };
}

function Occupied({ shape, site }: LoadFigures) {
  const t = useWords("load");
  const weekdays = useWeekdays();
  const { weekdays: days, start, end, assumed } = shape.occupiedHours;
  return (
    <Row gap={2} wrap style={{ marginTop: 10 }}>
      <Text variant="small" tone="ink3">
        {t("base.occupied", { days: weekdays(days), start, end, zone: site.zone })}
        {assumed ? ` ${t("base.assumed")}` : ""}
      </Text>
      {assumed && site.can.edit ? (
        <TextLink variant="small" label={t("base.set")} href={loopsPaths.editSite(site.id)} />
      ) : null}
    </Row>
  );
}

const fewRuns = 3;

function Still({ shape, format }: LoadFigures) {
  const t = useWords("load");
  const { colour } = useTheme();
  const hours = useHours(format);
  const [all, setAll] = useState(false);
  const still = shape.pumpWithoutDeltaT;
  if (still === null) return null;
  const shown = all ? still.runs : still.runs.slice(0, fewRuns);
  const unlisted = still.runCount - still.runs.length;
  const limit = format.withUnit(still.limitK, "temperatureDifference", 1);
  return (
    <View style={{ marginTop: 12, paddingTop: 10, borderTopWidth: 1, borderTopColor: colour.rule }}>
      <Row justify="space-between" gap={3}>
        <Text variant="subhead" level={3}>
          {t("base.still", { limit })}
        </Text>
        {still.seconds > 0 ? <Text variant="figureS">{hours(still.seconds / 3600)}</Text> : null}
      </Row>
      {still.seconds === 0 ? (
        <Text variant="small" tone="ink2">
          {t("base.stillNone")}
        </Text>
      ) : (
        <View role="list" aria-label={t("base.still", { limit })} style={{ marginTop: 4 }}>
          {shown.map((run) => (
            <View key={run.from} role="listitem">
              <Text variant="small" tone="ink2">
                {t("base.stillRun", {
                  from: format.dateTime(Date.parse(run.from)),
                  to: format.time(Date.parse(run.to)),
                })}
              </Text>
            </View>
          ))}
        </View>
      )}
      {shown.length < still.runs.length ? (
        <TextLink
          variant="small"
          label={t("base.stillAll", { count: still.runs.length })}
          onPress={() => setAll(true)}
        />
      ) : unlisted > 0 ? (
        <Text variant="small" tone="ink3">
          {t("base.stillMore", { count: unlisted })}
        </Text>
      ) : null}
    </View>
  );
}
