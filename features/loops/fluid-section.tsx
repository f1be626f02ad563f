import { View } from "react-native";

import { fluidFacts } from "@shared/domain/fluids/fluid-facts";
import { useFluidWords, useWords } from "@features/i18n";
import { MarkedText, Text } from "@features/ui";

import type { LoopView } from "./loop-context";

/** What the loop is filled with; of glycol also how cold it may get and how well that is known. */
export function FluidSection({ loop, format }: Pick<LoopView, "loop" | "format">) {
  const t = useWords("loops");
  const fluidWords = useFluidWords();
  const { fluid } = loop;
  const facts = fluidFacts(fluid, loop.gaugePressureMPa);
  return (
    <View style={{ gap: 4 }}>
      <Text variant="subhead" level={3}>
        {t("fluid.title")}
      </Text>
      <Text>{fluidWords(fluid)}</Text>
      {fluid.kind === "water" ? null : (
        <>
          {facts ? (
            <Text variant="small" tone="ink2">
              {t("fluid.freezes", {
                temperature: format.withUnit(facts.freezesAtC, "temperature", 1),
              })}
            </Text>
          ) : null}
          <Text variant="small" tone="ink2">
            {testedWords(fluid)}
          </Text>
          {facts?.interpolated ? (
            <MarkedText kind="look" variant="small">
              {t("fluid.interpolated")}
            </MarkedText>
          ) : null}
        </>
      )}
    </View>
  );

  function testedWords({ testedOn, testMethod }: Exclude<typeof fluid, { kind: "water" }>) {
    if (testedOn === null) return t("fluid.notTested");
    const day = format.day(testedOn, "dayMonthYear");
    return testMethod === null
      ? t("fluid.testedOn", { day })
      : t("fluid.tested", { day, method: t(`fluid.method.${testMethod}`) });
  }
}
