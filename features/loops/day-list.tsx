import { Link } from "expo-router";
import { Pressable, View } from "react-native";

import { useWords } from "@features/i18n";
import { Card, Figure, Icon, Inline, Row, Text, useTheme } from "@features/ui";

import type { LoopFigures } from "./loop-context";
import { loopsPaths } from "./loops-paths";
import { energyQuantity, registersOf } from "./register-words";
import { shownFigure } from "./shown-figure";

/** More days than this are the table's business. */
const mostDays = 31;

/** Each day with its energy; a day opens by itself. */
export function DayList({ summary, loop, point, format }: LoopFigures) {
  const t = useWords("loops");
  const { colour } = useTheme();
  const { days } = summary;
  const registers = registersOf(loop.service);
  if (days.length < 2 || days.length > mostDays || summary.basis.blockedBy) return null;
  return (
    <View style={{ gap: 6 }}>
      <Text variant="subhead" level={2}>
        {t("days.title")}
      </Text>
      <Card pad={0}>
        <View role="list" aria-label={t("days.title")}>
          {days.map((day, index) => {
            const kwh = { heating: day.heatingKwh, cooling: day.coolingKwh };
            return (
              <View role="listitem" key={day.date}>
                <Link
                  href={loopsPaths.loop(loop.id, { point: point.id, from: day.date, to: day.date })}
                  asChild
                >
                  <Pressable role="link">
                    <View
                      style={{
                        flexDirection: "row",
                        alignItems: "center",
                        justifyContent: "space-between",
                        gap: 10,
                        minHeight: 48,
                        paddingHorizontal: 14,
                        borderTopWidth: index === 0 ? 0 : 1,
                        borderTopColor: colour.rule,
                      }}
                    >
                      <Text tone="ink3">
                        <Inline variant="subhead" tone="ink">
                          {format.day(day.date, "weekdayShort")}
                        </Inline>{" "}
                        {String(Number(day.date.slice(8)))}
                      </Text>
                      <View style={{ flexDirection: "row", alignItems: "center", gap: 12 }}>
                        <View style={{ alignItems: "flex-end" }}>
                          {registers.map((register) => (
                            <Row key={register} gap={2}>
                              {registers.length > 1 ? (
                                <Text variant="unit" tone="ink3" hidden>
                                  {t(`table.${register}`)}
                                </Text>
                              ) : null}
                              <Figure
                                {...shownFigure(format, kwh[register], energyQuantity[register])}
                                size="s"
                                said={t(`table.${register}`)}
                              />
                            </Row>
                          ))}
                        </View>
                        <Icon name="right" size={18} />
                      </View>
                    </View>
                  </Pressable>
                </Link>
              </View>
            );
          })}
        </View>
      </Card>
    </View>
  );
}
