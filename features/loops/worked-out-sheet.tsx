import { useQuery } from "@tanstack/react-query";
import { View } from "react-native";

import { fluidFacts } from "@shared/domain/fluids/fluid-facts";
import { useFluidWords, useWords } from "@features/i18n";
import { DefinitionRows, Sheet, Text, TextLink, useTheme, type Definition } from "@features/ui";

import type { LoopFigures } from "./loop-context";
import { loopsPaths } from "./loops-paths";
import { loopsQueries } from "./loops-queries";
import { leading } from "./supporting-figures";

/** How the figures of this page were worked out: only what is true of these figures. */
export function WorkedOutSheet(props: LoopFigures & { open: boolean; onClose: () => void }) {
  const { summary, format, point, open, onClose } = props;
  const t = useWords("loops");
  const { colour } = useTheme();
  const fluidWords = useFluidWords();
  const { basis, totals } = summary;
  const register = leading(props);
  const means = totals[register];
  const kelvin = (value: number | null) => format.withUnit(value, "temperatureDifference", 2);
  const named = { fluid: fluidWords(basis.fluid) };
  const fluidSource =
    basis.fluid.kind === "water"
      ? t("workings.fluidWater")
      : fluidFacts(basis.fluid, null)?.interpolated
        ? t("workings.fluidInterpolated", named)
        : t("workings.fluidGlycol", named);
  const energyRows: Definition[] = [
    { label: t("workings.fluid"), value: fluidSource },
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
        hours: format.number(totals.coveredS / 3600, 1),
        of: format.number(totals.expectedS / 3600, 1),
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
        {open ? <Files point={point} summary={summary} /> : null}
      </View>
    </Sheet>
  );
}

/** Files whose rows lie in the range; the first and last row of each say so. */
function Files({ point, summary }: Pick<LoopFigures, "point" | "summary">) {
  const t = useWords("loops");
  const answer = useQuery(loopsQueries.imports(point.id));
  const from = Date.parse(summary.from);
  const to = Date.parse(summary.to);
  const files = (answer.data?.items ?? []).filter(
    ({ firstInstant, lastInstant }) =>
      firstInstant !== null &&
      lastInstant !== null &&
      Date.parse(firstInstant) < to &&
      Date.parse(lastInstant) >= from,
  );
  if (files.length === 0) return null;
  return (
    <View style={{ gap: 8 }}>
      <Text variant="subhead" level={3}>
        {t("workings.files")}
      </Text>
      {files.map(({ id, fileNames }) => (
        <TextLink
          key={id}
          label={fileNames.join(", ")}
          href={loopsPaths.import(id)}
          variant="small"
        />
      ))}
    </View>
  );
}
