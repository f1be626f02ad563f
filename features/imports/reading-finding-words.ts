import type { ImportFinding } from "@shared/contracts/import-findings";
import type { ImportDetail } from "@shared/contracts/imports";
import type { Quantity } from "@shared/domain/units/display-units";
import { useFormat, useWords } from "@features/i18n";

const QUANTITY_OF = {
  flowM3PerHour: "flow",
  supplyC: "temperature",
  returnC: "temperature",
  powerKw: "coolingPower",
} as const satisfies Partial<Record<string, Quantity>>;

/** What a finding says: its title and a sentence with its figures. */
export function useReadingFindingWords(detail: ImportDetail) {
  const t = useWords("findings");
  const units = useWords("imports");
  const format = useFormat(detail.site.zone);

  return (finding: ImportFinding): { readonly title: string; readonly text: string } => {
    const { code, figures, channel } = finding;
    const number = (name: string) => {
      const value = figures[name];
      return typeof value === "number" ? value : null;
    };
    const text = (name: string) => String(figures[name] ?? "");
    const at = (ms: number | null) => (ms === null ? "—" : format.dateTime(ms));
    const quantity = QUANTITY_OF[channel as keyof typeof QUANTITY_OF] as Quantity | undefined;
    const reading = (value: number | null) =>
      quantity ? format.withUnit(value, quantity, 2) : format.number(value);
    const flow = (name: string) => format.withUnit(number(name), "flow");
    const speed = (name: string) => format.withUnit(number(name), "velocity", 2);
    const celsius = (name: string) => format.withUnit(number(name), "temperature", 1);
    const percent = (name: string) => format.number(number(name), 0);
    const named = channel === null ? "" : t(`channel.${channel}`);
    const from = at(finding.spans[0] ? Date.parse(finding.spans[0].from) : null);
    const last = finding.spans[finding.spans.length - 1];
    const to = at(last ? Date.parse(last.to) : null);
    const clock = (seconds: number | null) =>
      seconds === null
        ? "—"
        : t(seconds >= 0 ? "text.slow" : "text.fast", { by: format.duration(Math.abs(seconds)) });
    const written = (unit: string) => units(`columns.unit.${unit}`);
    const several = detail.files.length > 1;
    const file = detail.files.find(({ id }) => id === finding.fileId);
    const inFile = several && file ? ` ${t("text.inFile", { name: file.name })}` : "";

    switch (code) {
      case "farDates":
        return {
          title: t("title.farDates", { count: finding.rowCount }),
          text:
            t("text.farDates", { from: at(number("firstMs")), to: at(number("lastMs")) }) + inFile,
        };
      case "flowUnit":
        return {
          title: t("title.flowUnit", { unit: written(text("unit")) }),
          text:
            t(figures.otherUnit === null ? "text.flowUnitNone" : "text.flowUnit", {
              median: speed("medianMPerS"),
              high: speed("highMPerS"),
            }) + inFile,
        };
      case "temperatureUnit":
        return {
          title: t("title.temperatureUnit", { unit: written(text("unit")) }),
          text:
            t("text.temperatureUnit", { low: celsius("lowC"), high: celsius("highC") }) + inFile,
        };
      case "spikes":
        return {
          title: t("title.spikes", { count: finding.spanCount, channel: named }),
          text:
            t("text.spikes", {
              worst: reading(number("worst")),
              at: at(number("worstAtMs")),
              median: reading(number("medianThere")),
              rate:
                channel === "flowM3PerHour"
                  ? speed("worstRate")
                  : `${format.withUnit(number("worstRate"), "temperatureDifference", 1)}/min`,
            }) + inFile,
        };
      case "clockOff":
        return {
          title: t("title.clockOff"),
          text:
            (figures.driftSPerDay === null
              ? t("text.clockOffOne", { first: clock(number("offsetS")) })
              : t("text.clockOff", {
                  first: clock(number("atFirstRowS")),
                  last: clock(number("atLastRowS")),
                })) + inFile,
        };
      case "clockHint": {
        const lag = number("lagMinutes") ?? 0;
        return {
          title: t("title.clockHint"),
          text: t(lag >= 0 ? "text.clockHint" : "text.clockHintEarlier", {
            lag: format.duration(Math.abs(lag) * 60),
            percent: percent("agreeingPercent"),
            edges: percent("edges"),
          }),
        };
      }
      case "swappedSides":
        return {
          title: t("title.swappedSides"),
          text: [
            t("text.swappedSides", {
              percent: percent("wrongSharePercent"),
              deltaT: format.withUnit(number("deltaTK"), "temperatureDifference", 1),
            }),
            t(`text.${standingOf(text("standing"))}`, {
              standing: format.withUnit(number("standingDeltaTK"), "temperatureDifference", 1),
            }),
          ].join(" "),
        };
      case "reversedFlow":
        return {
          title: t("title.reversedFlow"),
          text: t("text.reversedFlow", {
            percent: percent("negativeSharePercent"),
            median: flow("medianM3PerHour"),
          }),
        };
      case "backflow":
        return {
          title: t("title.backflow", { count: finding.spanCount }),
          text: t("text.backflow", { median: flow("medianM3PerHour") }),
        };
      case "flowTurns":
        return {
          title: t("title.flowTurns", { count: finding.spanCount }),
          text: t("text.flowTurns", { from, to, median: flow("medianM3PerHour") }),
        };
      case "stepChange":
        return {
          title: t("title.stepChange", { channel: named }),
          text: t("text.stepChange", {
            at: at(number("atMs")),
            before: reading(number("before")),
            after: reading(number("after")),
          }),
        };
      case "stuckChannel":
        return {
          title: t("title.stuckChannel", { count: finding.spanCount, channel: named }),
          text: t("text.stuckChannel", {
            value: reading(number("value")),
            readings: format.number(number("readings"), 0),
            companion: t(`channel.${text("companion")}`),
            percent: percent("companionVariationPercent"),
          }),
        };
      case "noFlowNoise":
        return {
          title: t("title.noFlowNoise"),
          text: t("text.noFlowNoise", {
            hours: format.number(number("hours"), 1),
            mean: flow("meanM3PerHour"),
            zero: flow("zeroUncertaintyM3PerHour"),
          }),
        };
    }
  };
}

function standingOf(standing: string): "comesTogether" | "staysApart" | "noStop" {
  return standing === "comesTogether" || standing === "staysApart" ? standing : "noStop";
}
