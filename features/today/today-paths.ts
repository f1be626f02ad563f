import { addDays } from "@shared/domain/time/local-calendar";
import type { TodayAnswer } from "@shared/contracts/energy";

type Link = TodayAnswer["needsALook"][number]["link"];

/** Where a sentence leads. */
export function linkPath(link: Link): string {
  if (link.to === "import") return `/logs/${link.importId}`;
  if (link.to === "site") return todayPaths.site(link.siteId);
  if (link.from === null || link.until === null) return todayPaths.loop(link.loopId);
  return `${todayPaths.loop(link.loopId)}?from=${link.from}&to=${addDays(link.until, -1)}`;
}

export const todayPaths = {
  loop: (loopId: string) => `/loops/${loopId}`,
  site: (siteId: string) => `/sites/${siteId}`,
  newSite: "/sites/new",
  importLog: "/logs/new",
} as const;
