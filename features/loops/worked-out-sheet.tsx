import { View } from "react-native";

import { useWords } from "@features/i18n";
import { DefinitionRows, Sheet, Text, TextLink, useTheme, type Definition } from "@features/ui";

import type { LoopFigures } from "./loop-context";
import { leading } from "./supporting-figures";

/** How the figures of this page were worked out: only what is true of these figures. */
export function WorkedOutSheet(props: LoopFigures & { open: boolean; onClose: () => void }) {
  const { summary, format, point, open, onClose } = props;
  const t = useWords("loops");
  const { colour } = useTheme();
  const { basis, totals } = summary;
  const register = leading(props);
  const means = totals[register];
  const kelvin = (value: number | null) => format.withUnit(value, "temperatureDifference", 2);
  const energyRows: Definition[] = [
    { label: t("workings.water"), value: t("workings.waterValue") },
    {
      label: t("workings.pressure"),
      value: t(basis.pressure.assumed ? "workings.pressureAssumed" : "workings.pressureGiven", {
        pressure: format.number(basis.pressure.absoluteMPa, 3),
      }),
    },
    { label: t("workings.density"), value: t(`workings.densityAt.${basis.meterSide}`) },
    { label: t("workings.sum"), value: t("workings.sumValue") },
    {
      label: t("workings.covered"),
      value: t("workings.coveredValue", {
        time: format.duration(totals.coveredS),
        of: format.duration(totals.expectedS),
      }),
    },
    {
      label: t("workings.rows"),
      value: t("workings.rowsValue", {
        measured: format.number(totals.rows.measured, 0),
        excluded: format.number(totals.rows.excluded, 0),
        noReading: format.number(totals.rows.noReading, 0),
      }),
    },
    ...(basis.engineVersion === null
      ? []
      : [{ label: t("workings.engine"), value: String(basis.engineVersion) }]),
  ];
  return (
    <Sheet kind="side" title={t("workings.title")} open={open} onClose={onClose}>
      <View style={{ gap: 18 }}>
        <View style={{ backgroundColor: colour.pad, borderRadius: 8, padding: 14, gap: 6 }}>
          <Text variant="formula">{t(`workings.formula.${register}`)}</Text>
          <Text variant="small" tone="ink2">
            {t("workings.formulaWords")}
          </Text>
        </View>
        <DefinitionRows title={t("workings.used")} rows={energyRows} />
        <View style={{ gap: 6 }}>
          <DefinitionRows
            title={t("workings.means")}
            rows={[
              { label: t("workings.flowWeighted"), value: kelvin(means.flowWeightedDeltaTK) },
              { label: t("workings.energyWeighted"), value: kelvin(means.energyWeightedDeltaTK) },
              { label: t("workings.timeMean"), value: kelvin(means.timeMeanDeltaTK) },
            ]}
          />
          <Text variant="small" tone="ink2">
            {t("workings.meansNote")}
          </Text>
        </View>
        <Text variant="small" tone="ink2">
          {t("workings.noUncertainty")}
        </Text>
        <TextLink label={t("workings.files")} href={`/logs?point=${point.id}`} variant="small" />
      </View>
    </Sheet>
  );
}
