import { useQueryClient } from "@tanstack/react-query";
import { useRouter } from "expo-router";
import { useMemo } from "react";
import { View } from "react-native";

import { saveFile } from "@features/api";
import { useWords } from "@features/i18n";
import { ChartKey } from "@features/charts/chart-key";
import { LoopChart } from "@features/charts/loop-chart";
import {
  Card,
  QualityKey,
  Row,
  Segments,
  TapChip,
  Text,
  TextLink,
  useBreakpoint,
} from "@features/ui";

import { correctionsPaths } from "@features/corrections/corrections-paths";
import { downloadAddress } from "./downloads-menu";
import { EnergyTable } from "./energy-table";
import type { LoopFigures } from "./loop-context";
import { seriesLoader } from "./loops-queries";
import { ReadingsTable } from "./readings-table";
import { energyQuantity, registersOf, tagService } from "./register-words";

export type TableStep = "day" | "hour" | "row";

export interface ChartCardProps extends LoopFigures {
  shows: "chart" | "table";
  step: TableStep;
  onShow: (shows: "chart" | "table") => void;
  onStep: (step: TableStep) => void;
}

/** Supply, return and flow of the range, as a chart or as a table of the same data. */
export function ChartCard(props: ChartCardProps) {
  const { shows, onShow, loop } = props;
  const t = useWords("loops");
  const phone = useBreakpoint() === "phone";
  const service = tagService(loop.service);
  const draws = isMeterOnly(props.summary) ? "power" : "water";
  const title = t(draws === "power" ? "chart.meterTitle" : "chart.title");
  const segments = (
    <Segments
      label={t("chart.as")}
      value={shows}
      size="dense"
      options={[
        { value: "chart", label: t("chart.chart") },
        { value: "table", label: t("chart.table") },
      ]}
      onChange={onShow}
    />
  );
  return (
    <Card label={title} pad={phone ? 3 : 4}>
      <Row justify="space-between" wrap gap={3} style={{ marginBottom: 8 }}>
        <Text variant={phone ? "subhead" : "heading"} level={2}>
          {title}
        </Text>
        {phone ? (
          segments
        ) : (
          <Row gap={4} wrap>
            <ChartKey service={service} draws={draws} />
            {segments}
          </Row>
        )}
      </Row>
      {draws === "power" ? (
        <Text variant="small" tone="ink2" style={{ marginBottom: 8 }}>
          {t("chart.meterOnly")}
        </Text>
      ) : null}
      {shows === "chart" ? <Picture {...props} draws={draws} /> : <Rows {...props} />}
    </Card>
  );
}

/** Energy without any water measured: a permanent meter gave its power alone, and that is drawn. */
function isMeterOnly({ totals, basis }: LoopFigures["summary"]): boolean {
  const hasEnergy = totals.heating.energyKwh !== null || totals.cooling.energyKwh !== null;
  return basis.blockedBy === null && hasEnergy && totals.volumeM3 === null;
}

function Picture(props: ChartCardProps & { draws: "water" | "power" }) {
  const { draws } = props;
  const { loop, point, summary, format, site } = props;
  const t = useWords("loops");
  const client = useQueryClient();
  const phone = useBreakpoint() === "phone";
  const router = useRouter();
  const place = { siteId: site.id, loopId: loop.id, pointId: point.id };
  const load = useMemo(() => seriesLoader(client, point.id), [client, point.id]);
  const range = useMemo(
    () => ({ startMs: Date.parse(summary.from), endMs: Date.parse(summary.to) }),
    [summary.from, summary.to],
  );
  return (
    <LoopChart
      foot={
        <View style={{ gap: 6 }}>
          {phone ? <ChartKey service={tagService(loop.service)} draws={draws} /> : null}
          <QualityKey
            only={
              summary.totals.filled === null
                ? ["measured", "excluded", "missing"]
                : ["measured", "estimated", "excluded", "missing"]
            }
          />
        </View>
      }
      key={`${point.id} ${summary.from} ${summary.to}`}
      label={`${t(draws === "power" ? "chart.meterTitle" : "chart.title")}, ${loop.tag}`}
      draws={draws}
      summary={useChartSummary(props)}
      service={loop.service}
      range={range}
      zone={site.zone}
      format={format}
      days={summary.basis.blockedBy ? null : summary.days}
      load={load}
      viewAction={
        summary.can.correct
          ? {
              label: t("chart.excludeSpan"),
              onPress: (view) => router.push(correctionsPaths.exclude(place, view)),
            }
          : undefined
      }
    />
  );
}

/** What the picture shows, in one sentence, for those who do not see it. */
function useChartSummary({ summary, loop, format, rangeName }: LoopFigures): string {
  const t = useWords("loops");
  const { busiest, totals } = summary;
  if (totals.coveredS === 0) return t("chart.saidEmpty", { tag: loop.tag, range: rangeName });
  const ofMeter = isMeterOnly(summary);
  if (busiest === null && !ofMeter)
    return t("chart.saidReadings", { tag: loop.tag, range: rangeName });
  const energies = registersOf(loop.service)
    .map((register) =>
      t(`chart.saidEnergy.${register}`, {
        energy: format.withUnit(totals[register].energyKwh, energyQuantity[register]),
      }),
    )
    .join(", ");
  const of = { tag: loop.tag, range: rangeName, energies };
  if (busiest === null) return t("chart.saidMeter", of);
  const when = format.dateTime(Date.parse(busiest.from));
  if (ofMeter) {
    const quantity = busiest.register === "heating" ? "heatingPower" : "coolingPower";
    return t("chart.saidPower", {
      ...of,
      when,
      power: format.withUnit(busiest.powerKw, quantity),
    });
  }
  return t("chart.said", {
    ...of,
    when,
    supply: format.withUnit(busiest.supplyC, "temperature", 1),
    return: format.withUnit(busiest.returnC, "temperature", 1),
    flow: format.withUnit(busiest.flowM3PerHour, "flow", 1),
  });
}

function Rows(props: ChartCardProps) {
  const { step, onStep, point, range, format, summary } = props;
  const t = useWords("loops");
  const phone = useBreakpoint() === "phone";
  const steps = [
    ["day", t("table.day")],
    ["hour", t("table.hour")],
    ["row", rowName()],
  ] as const;
  const download = () =>
    saveFile(downloadAddress(point.id, range, step === "row" ? "readings" : step));
  const chips = (
    <Row gap={2} wrap>
      <Text variant="table" tone="ink2">
        {t("table.rowsOf")}
      </Text>
      {steps.map(([key, label]) => (
        <TapChip
          key={key}
          label={label}
          picked={step === key}
          size={phone ? "default" : "dense"}
          onPress={() => onStep(key)}
        />
      ))}
    </Row>
  );
  return (
    <View style={{ gap: 12 }}>
      {/* Cards are many and tall: what they are stands above them on a phone. */}
      {phone ? chips : null}
      <View style={{ marginHorizontal: phone ? 0 : -16 }}>
        {step === "row" ? (
          <ReadingsTable {...props} />
        ) : (
          <EnergyTable key={step} {...props} step={step} />
        )}
      </View>
      <Row justify="space-between" wrap gap={3}>
        {phone ? null : chips}
        <TextLink label={t("table.download")} variant="bodyWide" onPress={download} />
      </Row>
    </View>
  );
  function rowName(): string {
    const { rows, expectedS } = summary.totals;
    const meanS = rows.expected ? expectedS / rows.expected : NaN;
    const stepS = usualStepsS.find((step) => Math.abs(meanS - step) < step * 0.02);
    return stepS === undefined ? t("table.asRead") : format.duration(stepS);
  }
}

/** Steps loggers are set to; a range in which it changed has no one step to name. */
const usualStepsS = [1, 2, 5, 10, 15, 20, 30, 60, 120, 300, 600, 900, 1800, 3600] as const;
