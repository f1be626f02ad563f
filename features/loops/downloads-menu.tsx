import { downloadIntervals, downloadReadings } from "@shared/contracts/energy";
import { addressOf, saveFile } from "@features/api";
import { useWords } from "@features/i18n";
import { Menu, useToast } from "@features/ui";

import type { ShownRange } from "./shown-range";

export type DownloadStep = "quarterHour" | "hour" | "day" | "readings";

/** Where a range's file is: energy by step, or the cleaned readings. */
export function downloadAddress(pointId: string, range: ShownRange, step: DownloadStep): string {
  const dates = { from: range.from, to: range.until };
  return step === "readings"
    ? addressOf(downloadReadings, { params: { pointId }, query: dates })
    : addressOf(downloadIntervals, { params: { pointId }, query: { ...dates, step } });
}

/** Takes the range away: as CSV, or as an address to send. */
export function DownloadsMenu({ pointId, range }: { pointId: string; range: ShownRange }) {
  const t = useWords("loops");
  const toast = useToast();
  const file = (step: DownloadStep) => ({
    key: step,
    label: t(`download.${step}`),
    icon: "download" as const,
    onPress: () => saveFile(downloadAddress(pointId, range, step)),
  });
  const copy = {
    key: "link",
    label: t("download.link"),
    icon: "share" as const,
    onPress: () => {
      navigator.clipboard.writeText(window.location.href).then(
        () => toast({ message: t("download.linkCopied") }),
        () => toast({ message: t("download.linkNotCopied") }),
      );
    },
  };
  return (
    <Menu
      label={t("download.menu")}
      icon="share"
      iconOnly
      items={[file("day"), file("hour"), file("quarterHour"), file("readings"), copy]}
    />
  );
}
