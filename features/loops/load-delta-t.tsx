import { View } from "react-native";

import type { PlusMinus } from "@shared/contracts/plus-minus";
import { useWords } from "@features/i18n";
import { Card, Figure, Text, useBreakpoint, useTheme } from "@features/ui";

import { LoadFigure, useHours } from "./load-figure";
import type { LoadFigures } from "./load-view";
import { shownFigure } from "./shown-figure";

/** The three means side by side, which of them gives the energy back, and water for the heat. */
export function LoadDeltaT({ shape, format, loop, workings }: LoadFigures) {
  const t = useWords("load");
  const phone = useBreakpoint() === "phone";
  const { colour } = useTheme();
  const hours = useHours(format);
  const { deltaT, specificFlow, lowDeltaT } = shape;
  const kelvin = (value: number | null, plusMinus: PlusMinus | null) =>
    shownFigure(format, value, "temperatureDifference", 2, plusMinus);
  const inchPound = format.unitSystem === "inchPound";
  const perPower = inchPound
    ? { value: specificFlow?.gpmPerTon ?? null, unit: "US gpm/ton", places: 2 }
    : { value: specificFlow?.litresPerSecondPerKw ?? null, unit: "L/s per kW", places: 4 };
  const means = [
    ["flow", deltaT.flowWeightedK, deltaT.plusMinus.flowWeighted],
    ["energy", deltaT.energyWeightedK, deltaT.plusMinus.energyWeighted],
    ["time", deltaT.timeMeanK, deltaT.plusMinus.timeMean],
  ] as const;
  return (
    <Card label={t("deltaT.title")} pad={phone ? 3 : 4} style={phone ? null : { flexGrow: 1 }}>
      <Text variant={phone ? "subhead" : "heading"} level={2}>
        {t("deltaT.title")}
      </Text>
      <View
        role="list"
        aria-label={t("deltaT.title")}
        style={{ flexDirection: "row", marginTop: 10 }}
      >
        {means.map(([name, value, plusMinus], place) => (
          <View
            key={name}
            role="listitem"
            style={{
              flex: 1,
              minWidth: 0,
              gap: 2,
              paddingLeft: place === 0 ? 0 : 10,
              paddingRight: place === 2 ? 0 : 8,
              borderLeftWidth: place === 0 ? 0 : 1,
              borderLeftColor: colour.rule,
            }}
          >
            <Text variant="small" tone="ink3" hidden style={{ minHeight: 36 }}>
              {t(`deltaT.${name}`)}
            </Text>
            <View>
              <Figure
                {...kelvin(value, plusMinus)}
                said={t(`deltaT.${name}`)}
                size="m"
                {...(name === "flow" && value !== null
                  ? workings.figure({ figure: "deltaT" })
                  : {})}
              />
              <Text variant="small" tone={name === "flow" ? "ink" : "ink2"}>
                {t(`deltaT.${name}Words`)}
              </Text>
            </View>
          </View>
        ))}
      </View>
      <Text variant="small" tone="ink2" style={{ marginTop: 10 }}>
        {deltaT.fromEnergyK === null
          ? t("deltaT.noProof")
          : t("deltaT.proof", {
              value: format.withUnit(deltaT.fromEnergyK, "temperatureDifference", 2),
            })}
      </Text>
      <View
        style={{
          flexDirection: "row",
          flexWrap: "wrap",
          gap: 16,
          marginTop: 12,
          paddingTop: 12,
          borderTopWidth: 1,
          borderTopColor: colour.rule,
        }}
      >
        <LoadFigure
          title={t("deltaT.specific")}
          figure={shownFigure(
            format,
            specificFlow?.m3PerKwh ?? null,
            "volumePerEnergy",
            1,
            specificFlow?.plusMinus ?? null,
          )}
        >
          {perPower.value === null
            ? null
            : `${format.number(perPower.value, perPower.places)}\u00A0${perPower.unit}`}
        </LoadFigure>
      </View>
      {lowDeltaT && loop.designDeltaTK !== null ? (
        <Text variant="small" tone="ink2" style={{ marginTop: 8 }}>
          {t("deltaT.low", {
            hours: hours(lowDeltaT.seconds / 3600),
            limit: format.withUnit(lowDeltaT.limitK, "temperatureDifference", 1),
          })}
        </Text>
      ) : null}
    </Card>
  );
}
