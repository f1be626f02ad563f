import { View } from "react-native";
import type { ComparedSide } from "@shared/contracts/meter-comparisons";
import { useFormat, useWords } from "@features/i18n";
import { Card, Table, Text, useBreakpoint } from "@features/ui";

/** How a permanent meter's ± came from its class: three limits, their sum, and the rectangle. */
export function ClassOrigin({ side }: { side: ComparedSide }) {
  const t = useWords("compare");
  const format = useFormat();
  const phone = useBreakpoint() === "phone";
  const { limits } = side;
  if (limits === null) return null;
  const percent = (value: number) => `±\u00A0${format.number(value, 2)}\u00A0%`;
  const rows = [
    { key: "flow", label: t("result.flowPart"), value: limits.flowPercent },
    { key: "pair", label: t("result.pairPart"), value: limits.pairPercent },
    { key: "calculator", label: t("result.calculatorPart"), value: limits.calculatorPercent },
    { key: "limit", label: t("result.limit"), value: limits.totalPercent },
    { key: "expanded", label: t("result.expanded"), value: limits.expandedPercent },
  ];
  const title = t("result.origin", { name: side.name });
  const table = (
    <Table
      caption={title}
      captionHidden
      columns={[
        { key: "part", header: t("result.meter"), render: ({ label }) => label },
        {
          key: "value",
          header: "%",
          align: "right",
          render: ({ value }) => percent(value),
        },
      ]}
      rows={rows}
      rowKey={({ key }) => key}
      card={{ title: ({ label }) => label, figure: ({ value }) => percent(value) }}
    />
  );
  return (
    <View style={{ gap: 8 }}>
      <Text variant="heading">{title}</Text>
      <Text tone="ink2">
        {t("result.originClass", {
          meterClass: limits.meterClass,
          ratio: format.number(limits.flowRatio, 2),
          deltaT: format.withUnit(limits.meanDeltaTK, "temperatureDifference", 1),
        })}
      </Text>
      {phone ? table : <Card pad={0}>{table}</Card>}
      <Text variant="small" tone="ink3">
        {t("result.originWords")}
      </Text>
    </View>
  );
}
