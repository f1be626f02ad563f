import { useQuery } from "@tanstack/react-query";
import { useLocalSearchParams, useRouter } from "expo-router";
import { useMemo } from "react";
import { View } from "react-native";
import Svg, { Line, Path } from "react-native-svg";
import { FailedAnswer } from "@features/api";
import { useWords } from "@features/i18n";
import { Card, LoadingBlocks, Row, TapChip, Text, useMeasuredWidth, useTheme } from "@features/ui";
import type { CompanionName, CompanionSeriesAnswer } from "@shared/contracts/companions";
import { unpackNumbers } from "@shared/domain/readings/packed-numbers";
import type { LoopFigures } from "./loop-context";
import { loopsQueries } from "./loops-queries";

const HEIGHT = 120;
const PIXELS = 800;
const KPA_PER_MPA = 1000;

/** What was logged beside the readings: which series, over which time, and one of them as a line. */
export function CompanionsCard(props: LoopFigures) {
  const { point, format } = props;
  const t = useWords("loops");
  const router = useRouter();
  const { beside } = useLocalSearchParams<{ beside?: string }>();
  const companions = useQuery(loopsQueries.companions(point.id));
  const items = companions.data?.items ?? [];
  if (items.length === 0) return null;
  const shown = items.find(({ channel }) => channel === beside) ?? null;
  return (
    <Card label={t("beside.title")} pad={4}>
      <View style={{ gap: 12 }}>
        <View style={{ gap: 4 }}>
          <Text variant="subhead" level={2}>
            {t("beside.title")}
          </Text>
          <Text variant="small" tone="ink2">
            {t("beside.text")}
          </Text>
        </View>
        <Row gap={2} wrap>
          {items.map(({ channel }) => (
            <TapChip
              key={channel}
              label={t(`beside.${channel}`)}
              picked={shown?.channel === channel}
              onPress={() =>
                router.setParams({ beside: shown?.channel === channel ? undefined : channel })
              }
            />
          ))}
        </Row>
        {shown ? <Series {...props} channel={shown.channel} /> : null}
        {items.map(({ channel, firstAt, lastAt, rows }) => (
          <Text key={channel} variant="small" tone="ink2">
            {t("beside.span", {
              series: t(`beside.${channel}`),
              from: format.dateTime(Date.parse(firstAt)),
              to: format.dateTime(Date.parse(lastAt)),
              count: rows,
            })}
          </Text>
        ))}
      </View>
    </Card>
  );
}

function Series(props: LoopFigures & { channel: CompanionName }) {
  const { channel, point, summary, format, rangeName } = props;
  const t = useWords("loops");
  const query = useQuery(
    loopsQueries.companionSeries(point.id, channel, { from: summary.from, to: summary.to }, PIXELS),
  );
  if (query.error) return <FailedAnswer error={query.error} onRetry={() => void query.refetch()} />;
  if (!query.data) return <LoadingBlocks blocks={[{ width: "100%", height: HEIGHT }]} />;
  const { least, greatest } = query.data;
  const series = t(`beside.${channel}`);
  if (least === null || greatest === null)
    return <Text tone="ink2">{t("beside.none", { series, range: rangeName })}</Text>;
  const text = (value: number) => valueText(format, channel, value);
  const said = t("beside.said", { series, least: text(least), greatest: text(greatest) });
  return (
    <View style={{ gap: 6 }}>
      <Picture answer={query.data} label={said} />
      <Row justify="space-between">
        <Text variant="small" tone="ink2">
          {format.dateTime(query.data.fromMs)}
        </Text>
        <Text variant="small" tone="ink2">
          {format.dateTime(query.data.toMs)}
        </Text>
      </Row>
      <Text variant="small">{said}</Text>
    </View>
  );
}

function valueText(format: LoopFigures["format"], channel: CompanionName, value: number): string {
  if (channel === "outdoor") return format.withUnit(value, "temperature", 1);
  if (channel === "pressure") return format.withUnit(value / KPA_PER_MPA, "pressure", 2);
  return `${format.number(value, 2)} kW`;
}

function Picture({ answer, label }: { answer: CompanionSeriesAnswer; label: string }) {
  const { colour } = useTheme();
  const [width, onLayout] = useMeasuredWidth();
  const points = useMemo(
    () => ({ tMs: unpackNumbers(answer.tMs), values: unpackNumbers(answer.values) }),
    [answer],
  );
  const { fromMs, toMs, t0Ms } = answer;
  const least = answer.least ?? 0;
  const greatest = answer.greatest ?? 0;
  const room = greatest === least ? 1 : greatest - least;
  const plot = HEIGHT - 1;
  const x = (ms: number) => ((ms - fromMs) / (toMs - fromMs)) * width;
  const y = (value: number) => plot - 8 - ((value - least) / room) * (plot - 24);
  let path = "";
  let isDown = false;
  points.values.forEach((value, i) => {
    if (Number.isNaN(value)) {
      isDown = false;
      return;
    }
    const at = `${x(t0Ms + (points.tMs[i] ?? 0)).toFixed(1)} ${y(value).toFixed(1)}`;
    path += `${isDown ? "L" : "M"}${at}`;
    isDown = true;
  });
  return (
    <View role="img" aria-label={label} onLayout={onLayout} style={{ height: HEIGHT }}>
      {width > 0 ? (
        <Svg width={width} height={HEIGHT}>
          <Line x1={0} x2={width} y1={plot} y2={plot} stroke={colour.rule} />
          <Path d={path} fill="none" stroke={colour.ink} strokeWidth={1.5} strokeLinejoin="round" />
        </Svg>
      ) : null}
    </View>
  );
}
