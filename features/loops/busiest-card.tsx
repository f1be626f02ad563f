import { View } from "react-native";

import { useWords } from "@features/i18n";
import { Card, LoopCard, Row, Text, useBreakpoint } from "@features/ui";

import type { FiguresWithWorkings } from "./loop-context";
import { dayKey } from "./day-key";
import { energyQuantity, powerQuantity, registersOf, tagService } from "./register-words";
import { shownFigure } from "./shown-figure";

/** The busiest half hour of the range as a loop card, with the energy of its day. */
export function BusiestCard({ loop, point, summary, format, workings }: FiguresWithWorkings) {
  const t = useWords("loops");
  const phone = useBreakpoint() === "phone";
  const { busiest, busiestDay, basis } = summary;
  const alone = registersOf(loop.service).length === 1;
  const nominalMm =
    point.pipe?.kind === "table" ? point.pipe.dn : (point.bore?.insideDiameterMm ?? null);
  const base = {
    service: tagService(loop.service),
    nominalMm,
    meterSide: point.meterSide,
    height: phone ? 156 : 168,
  };
  const emptyTitle = basis.blockedBy
    ? t(`blocked.${basis.blockedBy}.title`)
    : summary.totals.coveredS > 0
      ? t("busiest.noWhole")
      : t("busiest.none");
  return (
    <Card pad={phone ? 3 : 4} style={phone ? null : { width: 420, flexShrink: 1 }}>
      <Row justify="space-between" wrap>
        <Text variant={phone ? "label" : "subhead"} level={2}>
          {t("busiest.title")}
        </Text>
        {busiest ? (
          <Text variant="small" tone="ink3">
            {format.dateTime(Date.parse(busiest.from))}
          </Text>
        ) : null}
      </Row>
      <View style={{ marginTop: 8 }}>
        {busiest ? (
          <LoopCard
            {...base}
            doing={busiest.register}
            powerSize="l"
            supply={shownFigure(format, busiest.supplyC, "temperature", 2)}
            return={shownFigure(format, busiest.returnC, "temperature", 2)}
            flow={shownFigure(format, busiest.flowM3PerHour, "flow", 1)}
            power={shownFigure(
              format,
              busiest.powerKw,
              powerQuantity[busiest.register],
              1,
              busiest.plusMinus,
            )}
            powerWorkings={workings.figure({ figure: "power" })}
            deltaT={shownFigure(format, busiest.deltaTK, "temperatureDifference", 2)}
            {...(busiestDay
              ? {
                  energy: shownFigure(
                    format,
                    busiestDay.energyKwh,
                    energyQuantity[busiest.register],
                    undefined,
                    busiestDay.plusMinus,
                  ),
                  energyWorkings: workings.figure(
                    dayKey(busiestDay.date, alone ? undefined : busiest.register),
                  ),
                  energyLabel: format.day(busiestDay.date, "weekdayShort"),
                }
              : {})}
          />
        ) : (
          <LoopCard
            {...base}
            empty={{ kind: basis.blockedBy ? "look" : "note", title: emptyTitle }}
          />
        )}
      </View>
    </Card>
  );
}
