import type { Fluid } from "@shared/contracts/places";
import { useFormat } from "./use-format";
import { useWords } from "./use-words";

/** “Water”, “Propylene glycol, 30 % by mass”. */
export function useFluidWords(): (fluid: Fluid) => string {
  const t = useWords("places");
  const format = useFormat();
  return (fluid) =>
    fluid.kind === "water"
      ? t("fluid.water")
      : t(`fluid.mixture.${fluid.basis}`, {
          kind: t(`fluid.${fluid.kind}`),
          percent: `${format.number(fluid.percent, Number.isInteger(fluid.percent) ? 0 : 1)}\u00A0%`,
        });
}
