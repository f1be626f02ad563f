import { useId } from "react";
import { View } from "react-native";
import Svg, { Defs, Path, Pattern, Rect } from "react-native-svg";

import { useWords } from "@features/i18n";
import type { LoopChartProps } from "./loop-chart";
import { Row, serviceColours, Text, useTheme, type Service } from "@features/ui";

/** What the lines, the fill and the bars are. On a changeover loop both fills are shown. */
export function ChartKey(props: { service: Service; draws: LoopChartProps["draws"] }) {
  const { service, draws } = props;
  const t = useWords("charts");
  const { colour } = useTheme();
  const hues = serviceColours(service, colour);
  const fills = service === "changeover" ? (["cooling", "heating"] as const) : ([service] as const);
  const item = (name: string, drawing: React.ReactNode) => (
    <Row gap={1} key={name}>
      <View aria-hidden>{drawing}</View>
      <Text variant="chip" tone="ink2">
        {name}
      </Text>
    </Row>
  );
  if (draws === "power")
    return (
      <Row gap={3} wrap>
        {fills.map((direction) =>
          item(
            service === "changeover" ? t(`register.${direction}`) : t("power"),
            <BandSwatch direction={direction} lined />,
          ),
        )}
      </Row>
    );
  return (
    <Row gap={3} wrap>
      {item(
        t("supply"),
        <Svg width={22} height={10}>
          <Path d="M0 5H22" stroke={hues.main} strokeWidth={2.4} />
        </Svg>,
      )}
      {item(
        t("return"),
        <Svg width={22} height={10}>
          <Path d="M0 5H22" stroke={hues.mid} strokeWidth={2.4} strokeDasharray="6 3" />
        </Svg>,
      )}
      {fills.map((direction) =>
        item(
          service === "changeover" ? t(`deltaT.${direction}`) : t("deltaT.plain"),
          <BandSwatch direction={direction} />,
        ),
      )}
      {item(
        t("flow"),
        <Svg width={16} height={12}>
          <Path d="M2 12V5M6 12V2M10 12V4M14 12V7" stroke={colour.slate} strokeWidth={2.6} />
        </Svg>,
      )}
    </Row>
  );
}

/** @param props.lined the fill has its curve along the top */
function BandSwatch(props: { direction: "cooling" | "heating"; lined?: boolean }) {
  const { direction } = props;
  const id = useId().replace(/:/g, "");
  const { colour } = useTheme();
  const hues = serviceColours(direction, colour);
  const level = direction === "cooling";
  return (
    <Svg width={22} height={12}>
      <Defs>
        <Pattern id={id} width={8} height={level ? 5 : 8} patternUnits="userSpaceOnUse">
          <Rect width={8} height={8} fill={hues.tint} />
          <Path
            d={level ? "M0 2.5H8" : "M-2 10L10 -2M-2 2L2 -2M6 10L10 6"}
            stroke={hues.main}
            strokeWidth={0.7}
            opacity={0.3}
          />
        </Pattern>
      </Defs>
      <Rect width={22} height={12} fill={`url(#${id})`} />
      {props.lined ? <Path d="M0 1H22" stroke={hues.main} strokeWidth={2.4} /> : null}
    </Svg>
  );
}
