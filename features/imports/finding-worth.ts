import type { ImportFinding, ImportFindingChoice } from "@shared/contracts/import-findings";
import type { ImportDetail } from "@shared/contracts/imports";
import { useFormat, useWords } from "@features/i18n";

/** Less than this is no change anybody could see, kWh. */
const LEAST_KWH = 0.005;

/** What choices are called, and what each is worth against keeping the readings. */
export function useChoiceWords(detail: ImportDetail) {
  const t = useWords("findings");
  const units = useWords("imports");
  const format = useFormat(detail.site.zone);

  const name = (choice: ImportFindingChoice): string => {
    switch (choice.change) {
      case "swapSides":
        return t(choice.swapped === "channels" ? "choice.swapChannels" : "choice.swapProbes");
      case "unit":
        return t("choice.unit", { unit: units(`columns.unit.${choice.unit?.unit ?? ""}`) });
      case "cutOff":
        return t("cutOff.open");
      default:
        return t(`choice.${choice.change}`);
    }
  };

  const energy = (choice: ImportFindingChoice): string => {
    const change = choice.energyChangeKwh;
    if (change === null) return t("worth.unknown");
    const changed = (["cooling", "heating"] as const).filter(
      (register) => Math.abs(change[register]) >= LEAST_KWH,
    );
    const parts = changed.map((register) => {
      const kwh = change[register];
      const quantity = register === "cooling" ? "coolingEnergy" : "heatingEnergy";
      const size = format.withUnit(Math.abs(kwh), quantity);
      // The loop's own energy goes without saying, unless the other kind changes beside it.
      const goesWithoutSaying =
        changed.length === 1 &&
        detail.loop.service !== "changeover" &&
        (detail.loop.service === "hot") === (register === "heating");
      const says =
        kwh > 0
          ? t("worth.more", { energy: size })
          : choice.change === "exclude"
            ? t("worth.leavesOut", { energy: size })
            : t("worth.less", { energy: size });
      return goesWithoutSaying
        ? says
        : t("worth.named", { change: says, register: t(`worth.${register}`) });
    });
    return parts.length === 0 ? t("worth.none") : parts.join(" · ");
  };

  /** What a choice means besides its energy: the water's speed, the window, the clock. */
  const meaning = ({ unit, clock }: ImportFindingChoice): string | null => {
    if (clock)
      return t("worth.clock", {
        offset: format.number(clock.offsetS, 0),
        drift: format.number(clock.driftSPerDay, 1),
      });
    if (!unit) return null;
    if (unit.channel === "flow")
      return unit.medianMPerS === null
        ? null
        : t("worth.speed", {
            median: format.withUnit(unit.medianMPerS, "velocity", 2),
            high: format.withUnit(unit.highMPerS, "velocity", 2),
          });
    return unit.lowC === null
      ? null
      : t("worth.window", {
          low: format.withUnit(unit.lowC, "temperature", 1),
          high: format.withUnit(unit.highC, "temperature", 1),
        });
  };

  return {
    name,
    detail(choice: ImportFindingChoice): string | undefined {
      if (choice.change === "keep") return undefined;
      return [meaning(choice), energy(choice)].filter((text) => text !== null).join(" · ");
    },
  };
}

/** The choices a person picks from: a cut-off belongs to the loop and is set there. */
export const pickable = ({ choices }: ImportFinding): readonly ImportFindingChoice[] =>
  choices.filter(({ change }) => change !== "cutOff");
