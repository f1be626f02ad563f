import type { IntervalEnergyColumns } from "@shared/domain/energy/interval-energy";
import { sumIntervals } from "@shared/domain/energy/totals";
import {
  addDays,
  localHoursBetween,
  rangeOfDates,
  weekdayOf,
} from "@shared/domain/time/local-calendar";
import type { Database } from "@server/database/connect";
import { loadIntervals } from "@server/readings/interval-rows";
import { loopOf, type Finding } from "./reading-findings";
import type { SiteLoop } from "./site-loops";

/** More of the main's energy than this in no branch is worth a walk along the pipes. */
const remarkableShare = 0.05;
/** An hour counts where each meter covers nearly all of it. */
const fullHour = 0.99;
/** Fewer common hours than a day say nothing about a week. */
const leastHours = 24;

/**
 * Main against branches over the last whole week, hour by hour and only over hours that all of them
 * cover: a branch with a gap would otherwise look like an unmetered one.
 */
export async function balanceFindings(
  database: Database,
  loops: readonly SiteLoop[],
  { zone, day }: { zone: string; day: string },
): Promise<Finding[]> {
  const monday = addDays(day, weekdayOf(day) === 7 ? -6 : -6 - weekdayOf(day));
  const until = addDays(monday, 7);
  const hours = localHoursBetween(rangeOfDates(monday, until, zone), zone);
  const [first, last] = [hours[0], hours.at(-1)];
  if (!first || !last) return [];
  const found: Finding[] = [];
  for (const main of loops) {
    const branches = loops.filter(({ loop }) => loop.parentLoopId === main.loop.id);
    const meters = [main, ...branches];
    if (branches.length === 0 || meters.some(({ readings }) => readings?.blockedBy)) continue;
    const columns = await Promise.all(
      meters.map(({ point }) =>
        point ? loadIntervals(database, point.id, first.startMs, last.endMs) : null,
      ),
    );
    const balance = commonHours(columns, hours, main.loop.service === "hot");
    if (balance === null || balance.hours < leastHours || balance.mainKwh <= 0) continue;
    const remainderKwh = balance.mainKwh - balance.branchesKwh;
    const share = remainderKwh / balance.mainKwh;
    if (Math.abs(share) <= remarkableShare) continue;
    found.push({
      weight: "look",
      code: "unmeteredRemainder",
      loop: loopOf(main),
      values: {
        name: main.loop.name,
        remainderKwh,
        share,
        mainKwh: balance.mainKwh,
        hours: balance.hours,
        branches: branches.length,
        service: main.loop.service,
        from: monday,
        until,
      },
      link: { to: "loop", loopId: main.loop.id, from: monday, until },
    });
  }
  return found;
}

function commonHours(
  columns: readonly (IntervalEnergyColumns | null)[],
  hours: readonly { startMs: number; endMs: number }[],
  heating: boolean,
): { hours: number; mainKwh: number; branchesKwh: number } | null {
  const sums = columns.map((of) => of && sumIntervals(of, hours));
  if (sums.some((of) => of === null)) return null;
  let count = 0;
  let mainKwh = 0;
  let branchesKwh = 0;
  hours.forEach(({ startMs, endMs }, index) => {
    const all = sums.map((of) => of?.[index]);
    const lengthS = (endMs - startMs) / 1000;
    if (!all.every((hour) => hour && hour.coveredS >= fullHour * lengthS)) return;
    count++;
    all.forEach((hour, meter) => {
      const kwh = hour?.[heating ? "heating" : "cooling"].energyKwh ?? 0;
      if (meter === 0) mainKwh += kwh;
      else branchesKwh += kwh;
    });
  });
  return { hours: count, mainKwh, branchesKwh };
}
