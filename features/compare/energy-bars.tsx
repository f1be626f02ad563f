import { View } from "react-native";
import Svg, { Line, Rect } from "react-native-svg";
import type { MeterComparisonResult } from "@shared/contracts/meter-comparisons";
import { useFormat, useWords } from "@features/i18n";
import { Figure, Row, Text, useMeasuredWidth, useTheme } from "@features/ui";
import { energyQuantityOf } from "./compare-words";
import { shownFigure } from "./shown-figure";

const barHeight = 30;
const whiskerHeight = 18;
/** Room for the whisker's end at the right. */
const edge = 2;

/** Both energies from 0 on one scale, each with its ±; the second's ± runs through both as a band. */
export function EnergyBars({ result }: { result: MeterComparisonResult }) {
  const t = useWords("compare");
  const format = useFormat();
  const { colour } = useTheme();
  const [width, onLayout] = useMeasuredWidth();
  const quantity = energyQuantityOf(result);
  const { first, second, verdict } = result;
  const sides = [first, second];
  const most = Math.max(
    ...sides.map(({ energyKwh }) => energyKwh.value + (energyKwh.expanded ?? 0)),
  );
  const x = (kwh: number) => (most > 0 ? (Math.max(0, kwh) / most) * (width - edge) : 0);
  const said = (side: typeof first) =>
    format.figure(side.energyKwh.value, side.energyKwh.expanded, quantity);
  const { value: reference, expanded: referenceExpanded } = second.energyKwh;
  const fills = [colour.ink2, colour.slateTint];
  return (
    <View
      role="img"
      aria-label={t("result.barsSaid", {
        first: first.name,
        firstFigure: said(first),
        second: second.name,
        secondFigure: said(second),
        verdict: t(`verdict.${verdict}`),
      })}
      style={{ gap: 10 }}
    >
      <View aria-hidden onLayout={onLayout} style={{ gap: 10 }}>
        {sides.map(({ name, energyKwh }, at) => (
          <View key={at} style={{ gap: 2 }}>
            <Row gap={3} wrap justify="space-between">
              <Text variant="subhead" level="none">
                {name}
              </Text>
              <Figure
                {...shownFigure(format, energyKwh.value, energyKwh.expanded, quantity)}
                size="s"
              />
            </Row>
            {width > 0 ? (
              <Svg width={width} height={barHeight + whiskerHeight}>
                {referenceExpanded === null ? null : (
                  <Rect
                    x={x(reference - referenceExpanded)}
                    y={0}
                    width={x(reference + referenceExpanded) - x(reference - referenceExpanded)}
                    height={barHeight + whiskerHeight}
                    fill={colour.brassTint}
                  />
                )}
                <Rect
                  x={0.75}
                  y={whiskerHeight}
                  width={Math.max(0, x(energyKwh.value) - 1.5)}
                  height={barHeight - 1}
                  rx={2}
                  fill={fills[at]}
                  stroke={colour.ink2}
                  strokeWidth={1.5}
                />
                {energyKwh.expanded === null ? null : (
                  <Whisker
                    from={x(energyKwh.value - energyKwh.expanded)}
                    to={x(energyKwh.value + energyKwh.expanded)}
                  />
                )}
              </Svg>
            ) : (
              <View style={{ height: barHeight + whiskerHeight }} />
            )}
          </View>
        ))}
      </View>
      {referenceExpanded === null ? null : (
        <Text variant="small" tone="ink3" hidden>
          {t("result.band", { second: second.name })}
        </Text>
      )}
    </View>
  );
}

/** The ± above the bar's end, as brackets on a steel rule. */
function Whisker({ from, to }: { from: number; to: number }) {
  const { colour } = useTheme();
  const line = { stroke: colour.ink, strokeWidth: 2 };
  return (
    <>
      <Line x1={from} y1={9} x2={to} y2={9} {...line} />
      <Line x1={from + 1} y1={3} x2={from + 1} y2={15} {...line} />
      <Line x1={to - 1} y1={3} x2={to - 1} y2={15} {...line} />
    </>
  );
}
