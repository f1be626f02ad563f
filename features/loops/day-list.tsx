import { Link } from "expo-router";
import { Pressable, View } from "react-native";

import { needsYear, useWords } from "@features/i18n";
import { Card, Figure, Icon, Inline, Row, Text, useTheme } from "@features/ui";

import { dayKey } from "./day-key";
import type { FiguresWithWorkings } from "./loop-context";
import { loopsPaths } from "./loops-paths";
import { energyQuantity, registersOf } from "./register-words";
import { shownFigure } from "./shown-figure";

/** More days than this are the table's business. */
const mostDays = 31;

/** Each day with its energy; a day opens by itself. */
export function DayList({ summary, loop, point, format, workings, today }: FiguresWithWorkings) {
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
                <View
                  style={{
                    flexDirection: "row",
                    alignItems: "center",
                    justifyContent: "space-between",
                    gap: 12,
                    paddingHorizontal: 14,
                    borderTopWidth: index === 0 ? 0 : 1,
                    borderTopColor: colour.rule,
                  }}
                >
                  <Link
                    href={loopsPaths.loop(loop.id, {
                      point: point.id,
                      from: day.date,
                      to: day.date,
                    })}
                    asChild
                  >
                    <Pressable role="link" style={{ flexGrow: 1 }}>
                      <View
                        style={{
                          flexDirection: "row",
                          alignItems: "center",
                          gap: 8,
                          minHeight: 48,
                        }}
                      >
                        <Text tone="ink3">
                          <Inline variant="subhead" tone="ink">
                            {format.day(day.date, "weekdayShort")}
                          </Inline>{" "}
                          {needsYear(day.date, today)
                            ? format.day(day.date, "dayMonthYear")
                            : String(Number(day.date.slice(8)))}
                        </Text>
                        <Icon name="right" size={18} />
                      </View>
                    </Pressable>
                  </Link>
                  <View style={{ alignItems: "flex-end", gap: 10, paddingVertical: 8 }}>
                    {registers.map((register) => (
                      <Row key={register} gap={2}>
                        {registers.length > 1 ? (
                          <Text variant="unit" tone="ink3" hidden>
                            {t(`table.${register}`)}
                          </Text>
                        ) : null}
                        <Figure
                          {...shownFigure(
                            format,
                            kwh[register],
                            energyQuantity[register],
                            undefined,
                            day.plusMinus[register],
                          )}
                          size="s"
                          said={`${format.day(day.date, "weekdayDay")}, ${t(`table.${register}`)}`}
                          {...(kwh[register] === null
                            ? {}
                            : workings.figure(
                                dayKey(day.date, registers.length > 1 ? register : undefined),
                              ))}
                        />
                      </Row>
                    ))}
                  </View>
                </View>
              </View>
            );
          })}
        </View>
      </Card>
    </View>
  );
}
