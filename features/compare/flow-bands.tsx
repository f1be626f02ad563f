import { View } from "react-native";
import type { FlowBandAnswer, MeterComparisonResult } from "@shared/contracts/meter-comparisons";
import { useFormat, useWords } from "@features/i18n";
import { Banner, Card, MarkedText, Table, Text, useBreakpoint, type Column } from "@features/ui";
import { energyQuantityOf, verdictMarks } from "./compare-words";
import { shownFigure } from "./shown-figure";

/** Agreement of two metering points at low, middle and high flow. */
export function FlowBands({ result }: { result: MeterComparisonResult }) {
  const t = useWords("compare");
  const format = useFormat();
  const phone = useBreakpoint() === "phone";
  const { byFlow, first, second } = result;
  if (byFlow === null) return null;
  const quantity = energyQuantityOf(result);
  const { unit } = format.unit(quantity);
  const band = ({ fromM3PerHour, toM3PerHour }: FlowBandAnswer) => {
    const from = format.withUnit(fromM3PerHour, "flow", 1);
    return toM3PerHour === null
      ? t("result.bandFrom", { from })
      : t("result.bandFromTo", { from, to: format.withUnit(toM3PerHour, "flow", 1) });
  };
  const verdict = ({ agreement }: FlowBandAnswer) => (
    <MarkedText kind={verdictMarks[agreement.code]} variant="table">
      {t(`verdictShort.${agreement.code}`)}
    </MarkedText>
  );
  const figureOf = (known: FlowBandAnswer["first"]) =>
    shownFigure(format, known.value, known.expanded, quantity);
  const percent = ({ agreement }: FlowBandAnswer) =>
    agreement.differencePercent === null
      ? "—"
      : `${format.number(agreement.differencePercent, 1)}\u00A0%`;
  const columns: Column<FlowBandAnswer>[] = [
    { key: "band", header: t("result.flowBand"), render: band },
    { key: "first", header: first.name, unit, figure: (row) => figureOf(row.first) },
    { key: "second", header: second.name, unit, figure: (row) => figureOf(row.second) },
    { key: "difference", header: t("result.difference"), align: "right", render: percent },
    {
      key: "count",
      header: t("result.quarterHours"),
      align: "right",
      wideOnly: true,
      render: ({ quarterHours }) => format.number(quarterHours, 0),
    },
    { key: "verdict", header: t("result.verdict"), render: verdict },
  ];
  const table = (
    <Table
      caption={t("result.byFlow")}
      captionHidden
      columns={columns}
      rows={byFlow.bands}
      rowKey={({ fromM3PerHour }) => String(fromM3PerHour)}
      tone={({ agreement }) => (agreement.code === "disagree" ? "look" : null)}
      card={{
        title: band,
        figure: percent,
        lines: (row) => [
          `${first.name}: ${format.figure(row.first.value, row.first.expanded, quantity)}`,
          `${second.name}: ${format.figure(row.second.value, row.second.expanded, quantity)}`,
          verdict(row),
        ],
      }}
    />
  );
  const { line } = byFlow;
  return (
    <View style={{ gap: 8 }}>
      <Text variant="heading">{t("result.byFlow")}</Text>
      {byFlow.compensating ? (
        <Banner kind="look" lead={t("result.compensatingLead")}>
          {t("result.compensating")}
        </Banner>
      ) : null}
      {phone ? table : <Card pad={0}>{table}</Card>}
      {line === null ? null : (
        <Text variant="small" tone="ink2">
          {t("result.line", {
            slope: format.number(line.slope, 3),
            sign: line.intercept < 0 ? "−" : "+",
            intercept: format.withUnit(Math.abs(line.intercept), "flow", 2),
          })}
        </Text>
      )}
    </View>
  );
}
