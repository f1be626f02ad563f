import { View } from "react-native";

import { useWords } from "@features/i18n";
import { Card, MarkedText, Row, Text, TextLink, useBreakpoint, useTheme } from "@features/ui";

import { LoadFigure, useHours } from "./load-figure";
import type { LoadFigures } from "./load-view";
import { loopsPaths } from "./loops-paths";

/** Flow beyond what the load needed at the design ΔT, and what pumping it takes. */
export function LoadExcess(props: LoadFigures) {
  const { shape, format } = props;
  const t = useWords("load");
  const phone = useBreakpoint() === "phone";
  const hours = useHours(format);
  const { excess } = shape;
  return (
    <Card label={t("excess.title")} pad={phone ? 3 : 4}>
      <Text variant={phone ? "subhead" : "heading"} level={2} style={{ marginBottom: 10 }}>
        {t("excess.title")}
      </Text>
      {excess === null ? (
        <Missing {...props} />
      ) : (
        <View style={{ gap: 12 }}>
          <View
            style={{
              flexDirection: "row",
              flexWrap: "wrap",
              columnGap: phone ? 16 : 28,
              rowGap: 12,
            }}
          >
            <LoadFigure
              title={t("excess.share")}
              size={phone ? "m" : "l"}
              figure={{
                value: excess.excessShare === null ? null : excess.excessShare * 100,
                unit: "%",
                places: 1,
              }}
            >
              {t("excess.shareWords", {
                volume: format.withUnit(excess.volumeM3, "volume", 0),
                ideal: format.withUnit(excess.idealVolumeM3, "volume", 0),
                deltaT: format.withUnit(excess.designDeltaTK, "temperatureDifference", 1),
              })}
            </LoadFigure>
            {shape.pumping ? <Pumping {...props} pumping={shape.pumping} /> : null}
          </View>
          <Text variant="small" tone="ink3">
            {excess.minimumFlowM3PerHour === null
              ? t("excess.noMinimum")
              : t("excess.minimum", {
                  flow: format.withUnit(excess.minimumFlowM3PerHour, "flow", 1),
                })}
            {excess.leftOutS > 0
              ? ` ${t("excess.leftOut", { hours: hours(excess.leftOutS / 3600) })}`
              : ""}
          </Text>
          <PumpWords {...props} />
        </View>
      )}
    </Card>
  );
}

/** Why there is nothing to show, and the way to change it. */
function Missing({ shape, loop, site }: LoadFigures) {
  const t = useWords("load");
  if (shape.energyKwh === null || loop.designDeltaTK !== null)
    return <Text tone="ink2">{t("excess.unknown")}</Text>;
  return (
    <Row gap={3} wrap>
      <Text tone="ink2">{t("excess.noDesign")}</Text>
      {loop.can.edit ? (
        <TextLink
          variant="small"
          label={t("excess.editLoop")}
          href={loopsPaths.editLoop(site.id, loop.id)}
        />
      ) : null}
    </Row>
  );
}

function Pumping(props: LoadFigures & { pumping: NonNullable<LoadFigures["shape"]["pumping"]> }) {
  const { pumping, format } = props;
  const t = useWords("load");
  const electric = (value: number) => ({ value, unit: "kWh" });
  const price = pumping.pricePerKwh;
  return (
    <>
      <LoadFigure title={t("excess.pump")} figure={electric(pumping.energyKwh)}>
        {pumping.kwhPerMwh === null
          ? null
          : t("excess.pumpWords", { perMwh: `${format.number(pumping.kwhPerMwh)}\u00A0kWh` })}
      </LoadFigure>
      <LoadFigure title={t("excess.excessPump")} figure={electric(pumping.excessKwh)}>
        {t("excess.excessPumpWords")}
      </LoadFigure>
      <LoadFigure
        title={t("excess.cost")}
        figure={{ value: pumping.excessCost, unit: pumping.currency, places: 2 }}
      >
        {price === null
          ? t("excess.noPrice")
          : t("excess.costWords", {
              price: `${format.number(Number(price), decimalsOf(price))}\u00A0${pumping.currency}`,
            })}
      </LoadFigure>
    </>
  );
}

/** A price is written with the decimals it was given with, two at least. */
function decimalsOf(price: string): number {
  return Math.max(2, price.split(".")[1]?.length ?? 0);
}

/** What the pump's figures stand on, or the way to give what they need. */
function PumpWords({ shape, loop, site, format }: LoadFigures) {
  const t = useWords("load");
  const { colour } = useTheme();
  const { pumping } = shape;
  const way = loop.can.edit ? (
    <TextLink
      variant="small"
      label={t(pumping ? "excess.editPump" : "excess.addPump")}
      href={loopsPaths.pump(site.id, loop.id)}
    />
  ) : null;
  const line = { paddingTop: 10, borderTopWidth: 1, borderTopColor: colour.rule } as const;
  if (pumping === null)
    return (
      <Row gap={3} wrap style={line}>
        <Text tone="ink2">{t("excess.noPump")}</Text>
        {way}
      </Row>
    );
  return (
    <View style={[line, { gap: 6 }]}>
      <MarkedText kind="note" variant="small">
        {t("excess.advice", { step: format.duration(shape.stepMinutes * 60) })}
      </MarkedText>
      {pumping.cubeLawHolds ? null : (
        <Text variant="small" tone="ink2">
          {t("excess.head")}
        </Text>
      )}
      {shape.register === "cooling" ? (
        <Text variant="small" tone="ink2">
          {t("excess.heat")}
        </Text>
      ) : null}
      {way}
    </View>
  );
}
