import type { z } from "zod";
import type { needsALook } from "@shared/contracts/energy";
import { DAY_MS } from "@shared/domain/time/interval";
import { addDays, localDay, rangeOfDates } from "@shared/domain/time/local-calendar";
import { selectMany } from "@server/database/bulk";
import type { Database } from "@server/database/connect";
import { instantText } from "@server/database/conversions";
import type { SiteLoop } from "./site-loops";

export type Finding = z.input<typeof needsALook>;

/** Under this share of covered time a week's total says too little. */
const leastCoverage = 0.95;
/** A pump that moves water over so little difference moves no heat worth its power. */
const wastefulDeltaTK = 1;
const leastWastefulHours = 2;

export const loopOf = ({ loop }: SiteLoop): Finding["loop"] => ({
  id: loop.id,
  tag: loop.tag,
  service: loop.service,
});

function toLoop({ loop }: SiteLoop, from: string | null, until: string | null): Finding["link"] {
  return { to: "loop", loopId: loop.id, from, until };
}

interface When {
  readonly zone: string;
  /** The site's day: findings look at the week that ends with it. */
  readonly day: string;
  readonly nowMs: number;
}

/** What is wrong with the readings of one loop. */
export async function readingFindings(
  database: Database,
  siteLoop: SiteLoop,
  when: When,
): Promise<Finding[]> {
  const { loop, point, readings, week } = siteLoop;
  if (!point || !readings || readings.lastMs === null || readings.firstMs === null) return [];
  const from = addDays(when.day, -6);
  const until = addDays(when.day, 1);
  const found: Finding[] = [];
  if (readings.blockedBy !== null) {
    found.push({
      weight: "look",
      code: "energyBlocked",
      loop: loopOf(siteLoop),
      values: { name: loop.name, reason: readings.blockedBy },
      link: toLoop(siteLoop, null, null),
    });
    return found;
  }
  // A loop that ended days before the others lost something they did not.
  if (localDay(when.day, when.zone).endMs - readings.lastMs > 1.5 * DAY_MS) {
    found.push({
      weight: "stop",
      code: "noRecentReadings",
      loop: loopOf(siteLoop),
      values: { name: loop.name, since: instantText(new Date(readings.lastMs)) },
      link: toLoop(siteLoop, null, null),
    });
    return found;
  }
  const expected = rangeOfDates(from, until, when.zone);
  const fromMs = Math.max(expected.startMs, readings.firstMs);
  const expectedS = (Math.min(expected.endMs, when.nowMs) - fromMs) / 1000;
  const coveredS = week.reduce((sum, day) => sum + day.totals.coveredS, 0);
  const excluded = week.reduce((sum, day) => sum + day.totals.excludedRows, 0);
  const share = expectedS > 0 ? coveredS / expectedS : 1;
  if (share < leastCoverage || excluded > 0) {
    found.push({
      weight: share < leastCoverage ? "stop" : "look",
      code: share < leastCoverage ? "lowCoverage" : "excludedRows",
      loop: loopOf(siteLoop),
      values: { name: loop.name, share: Math.min(1, share), excluded, from, until },
      link: toLoop(siteLoop, from, until),
    });
  }
  const hours = await hoursWithoutDeltaT(database, siteLoop, expected.startMs, expected.endMs);
  if (hours >= leastWastefulHours) {
    found.push({
      weight: "look",
      code: "pumpWithoutDeltaT",
      loop: loopOf(siteLoop),
      values: { name: loop.name, hours, from, until },
      link: toLoop(siteLoop, from, until),
    });
  }
  return found;
}

/** Hours in which water ran, by mean flow of a quarter-hour, over less than one kelvin. */
async function hoursWithoutDeltaT(
  database: Database,
  { loop, week, point }: SiteLoop,
  fromMs: number,
  toMs: number,
): Promise<number> {
  const greatest = Math.max(0, ...week.map((day) => day.totals.maxFlowM3PerHour ?? 0));
  const running = Math.max(0.05 * greatest, 0.02 * (loop.designFlowM3PerHour ?? 0));
  if (!point || running <= 0) return 0;
  const [row] = await selectMany(
    database,
    `SELECT SUM(COALESCE(covered_s, 900)) / 3600 FROM interval_energy
      WHERE point_id = ? AND start_s >= ? AND start_s < ? AND min_flow > ?
        AND ABS(supply_c - return_c) < ?`,
    [point.id, fromMs / 1000, toMs / 1000, running, wastefulDeltaTK],
  );
  return Math.round(Number(row?.[0] ?? 0) * 10) / 10;
}

/** One sentence for the whole site where nothing has come from any loop for over a day. */
export function siteSilence(loops: readonly SiteLoop[], siteId: string, nowMs: number): Finding[] {
  const lasts = loops.flatMap(({ readings }) => readings?.lastMs ?? []);
  const lastMs = Math.max(...lasts);
  if (lasts.length === 0 || nowMs - lastMs <= DAY_MS) return [];
  return [
    {
      weight: "look",
      code: "noRecentReadings",
      loop: null,
      values: {
        since: instantText(new Date(lastMs)),
        days: Math.floor((nowMs - lastMs) / DAY_MS),
        loops: lasts.length,
      },
      link: { to: "site", siteId },
    },
  ];
}
