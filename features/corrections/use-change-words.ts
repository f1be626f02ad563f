import type { CorrectionChange } from "@shared/contracts/corrections";
import { useFluidWords, useWords } from "@features/i18n";
import type { Format } from "@shared/formats/format";
import { quantityOf } from "./change-draft";

/** A correction as one sentence of what it does, and the time it does it for. */
export function useChangeWords(format: Format) {
  const t = useWords("corrections");
  const fluid = useFluidWords();
  // With the year: a correction is read long after the time it speaks of.
  const at = (instant: string) => {
    const ms = Date.parse(instant);
    return `${format.date(ms, "dayMonthYear")}, ${format.time(ms)}`;
  };
  const says = (change: CorrectionChange): string => {
    switch (change.kind) {
      case "exclude": {
        if (change.parts) return t("says.excludeParts", { count: change.parts.length });
        if (change.rule === null) return t("says.excludeAll");
        const { channel, is, value } = change.rule;
        const quantity = quantityOf[channel];
        const bound =
          quantity === null ? `${format.number(value)} %` : format.withUnit(value, quantity);
        return t(`says.exclude.${is}`, { channel: t(`channel.${channel}`), bound });
      }
      case "swapSides":
        return t(`says.swap.${change.swapped}`);
      case "flipFlow":
        return t("says.flipFlow");
      case "scaleByBore": {
        const factor = (change.trueBoreMm / change.enteredBoreMm) ** 2;
        return t("says.scaleByBore", {
          entered: format.withUnit(change.enteredBoreMm, "pipeSize", 2),
          bore: format.withUnit(change.trueBoreMm, "pipeSize", 2),
          factor: format.number(factor, 4),
        });
      }
      case "probeOffset":
        return t("says.probeOffset", {
          offset: format.withUnit(change.addK, "temperatureDifference", 2),
        });
      case "clock":
        return t("says.clock", {
          offset: format.number(change.offsetS, 0),
          drift: format.number(change.driftSPerDay, 1),
        });
      case "unit":
        return t("says.unit", { channel: t(`channel.${change.channel}`), unit: change.unit });
      case "fluid":
        return t("says.fluid", { fluid: fluid(change.fluid) });
      case "split":
        return t("says.split");
    }
  };
  const when = (change: CorrectionChange): string => {
    if (change.kind === "split") return t("when.at", { at: at(change.at) });
    if (!("from" in change)) return t("when.file");
    return change.to === null
      ? t("when.since", { from: at(change.from) })
      : t("when.span", { from: at(change.from), to: at(change.to) });
  };
  return { says, when, at };
}
