import { useMemo } from "react";

import type { TodayAnswer } from "@shared/contracts/energy";
import { addDays } from "@shared/domain/time/local-calendar";
import { useWords, type Format } from "@features/i18n";

export type Finding = TodayAnswer["needsALook"][number];

/** A finding as a title and a sentence; the server sends values, the words are here. */
export function useFindingWords(format: Format) {
  const t = useWords("today");
  return useMemo(() => {
    const text = (finding: Finding, name: string) => String(finding.values[name] ?? "");
    const number = (finding: Finding, name: string) => Number(finding.values[name] ?? NaN);
    const span = (finding: Finding) => {
      const until = text(finding, "until");
      return {
        from: format.day(text(finding, "from"), "dayMonth"),
        to: until === "" ? "" : format.day(addDays(until, -1), "dayMonth"),
      };
    };
    const percent = (value: number) => format.number(Math.abs(value) * 100, 1);
    const since = (finding: Finding) => format.dateTime(Date.parse(text(finding, "since")));
    const file = (finding: Finding) => {
      const count = number(finding, "moreFiles");
      const first = text(finding, "file");
      return count > 0 ? t("files", { file: first, count }) : first;
    };
    return (finding: Finding): { title: string; detail: string } => {
      const name = text(finding, "name");
      switch (finding.code) {
        case "importAsks":
        case "importFailed":
          return {
            title: t(`find.${finding.code}.title`),
            detail: t(`find.${finding.code}.detail`, { file: file(finding) }),
          };
        case "importDone":
          return {
            title: t("find.importDone.title"),
            detail: t("find.importDone.detail", {
              rows: format.number(number(finding, "rows"), 0),
              file: file(finding),
            }),
          };
        case "noRecentReadings":
          return finding.loop === null
            ? {
                title: t("find.siteSilent.title", { since: since(finding) }),
                detail: t("find.siteSilent.detail", { count: number(finding, "days") }),
              }
            : {
                title: t("find.noRecentReadings.title", { name }),
                detail: t("find.noRecentReadings.detail", { since: since(finding) }),
              };
        case "lowCoverage":
          return {
            title: t("find.lowCoverage.title", { name }),
            detail: t("find.lowCoverage.detail", {
              share: percent(number(finding, "share")),
              ...span(finding),
            }),
          };
        case "excludedRows":
          return {
            title: t("find.excludedRows.title", { name }),
            detail: t("find.excludedRows.detail", {
              count: number(finding, "excluded"),
              ...span(finding),
            }),
          };
        case "energyBlocked":
          return {
            title: t("find.energyBlocked.title", { name }),
            detail: t(`find.energyBlocked.reason.${text(finding, "reason")}`),
          };
        case "pumpWithoutDeltaT":
          return {
            title: t("find.pumpWithoutDeltaT.title", { name }),
            detail: t("find.pumpWithoutDeltaT.detail", {
              hours: format.number(number(finding, "hours"), 1),
              ...span(finding),
            }),
          };
        case "unmeteredRemainder": {
          const remainder = number(finding, "remainderKwh");
          const hot = text(finding, "service") === "hot";
          return {
            title: t("find.unmeteredRemainder.title"),
            detail: t(`find.unmeteredRemainder.${remainder < 0 ? "under" : "over"}`, {
              energy: format.withUnit(
                Math.abs(remainder),
                hot ? "heatingEnergy" : "coolingEnergy",
                0,
              ),
              share: percent(number(finding, "share")),
              hours: format.number(number(finding, "hours"), 0),
              ...span(finding),
            }),
          };
        }
      }
    };
  }, [format, t]);
}
