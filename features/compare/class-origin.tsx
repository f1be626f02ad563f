import { View } from "react-native";
import type { ComparedSide } from "@shared/contracts/meter-comparisons";
import { useFormat, useWords } from "@features/i18n";
import { Card, DefinitionRows, Text } from "@features/ui";

/** How a permanent meter's ± came from its class: three limits, their sum, and the rectangle. */
export function ClassOrigin({ side }: { side: ComparedSide }) {
  const t = useWords("compare");
  const format = useFormat();
  const { limits } = side;
  if (limits === null) return null;
  const percent = (value: number) => `±\u00A0${format.number(value, 2)}\u00A0%`;
  const title = t("result.origin", { name: side.name });
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
      <Card pad={3}>
        <DefinitionRows
          label={title}
          rows={[
            { label: t("result.flowPart"), value: percent(limits.flowPercent) },
            { label: t("result.pairPart"), value: percent(limits.pairPercent) },
            { label: t("result.calculatorPart"), value: percent(limits.calculatorPercent) },
            { label: t("result.limit"), value: percent(limits.totalPercent) },
            { label: t("result.expanded"), value: percent(limits.expandedPercent) },
          ]}
        />
      </Card>
      <Text variant="small" tone="ink3">
        {t("result.originWords")}
      </Text>
    </View>
  );
}
