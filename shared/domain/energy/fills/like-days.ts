import { addDays, localDateOf, weekdayOf } from "../../time/local-calendar";
import { DAY_MS } from "../../time/interval";
import { zoneOffsets } from "../../time/zone-offsets";
import {
  deviation,
  isWhole,
  openQuarters,
  percentOf,
  QUARTER_S,
  secondsOf,
  type CoveredQuarter,
  type FilledQuarter,
  type FillOutcome,
  type OpenQuarter,
} from "./fill";
import type { Interval } from "../../time/interval";

/** Days a fill is the mean of. */
export const LIKE_DAYS = 3;
/** How far back they are looked for. */
export const LOOK_BACK_DAYS = 60;

export interface LikeDaysOptions {
  readonly zone: string;
  /** 1 Monday to 7 Sunday: days people are in. The others are of the other type. */
  readonly workingDays: readonly number[];
  /** What readings hold of a quarter-hour; null where nothing. */
  readonly quarterAt: (startMs: number) => CoveredQuarter | null;
}

/**
 * Each quarter-hour of a gap as the mean of the same time of day on the three latest days before the
 * gap that are of the same type (working day or not) and measured whole at every time needed. Time
 * of day is the wall's, so a clock change between them shifts nothing.
 *
 * Uncertainty: for each filled day the sample deviation s of the three days' energies over the hours
 * filled, as a single day's spread about a mean of three, s·√(1 + 1/3); days add in quadrature.
 *
 * Example: 40, 42 and 44 kWh → 42 kWh ± 2·√(4/3) = 2.31 kWh, 5.5 %.
 */
export function likeDays(gaps: readonly Interval[], options: LikeDaysOptions): FillOutcome {
  const byDate = new Map<string, OpenQuarter[]>();
  for (const open of openQuarters(gaps)) {
    const date = localDateOf(open.startMs, options.zone);
    byDate.set(date, [...(byDate.get(date) ?? []), open]);
  }
  const [firstDate] = byDate.keys();
  if (firstDate === undefined) return { ok: false, problem: { code: "nothing-to-fill" } };
  const quarters: FilledQuarter[] = [];
  const used = new Set<string>();
  let variance = 0;
  for (const [date, open] of byDate) {
    const days = findLikeDays(date, firstDate, open, options);
    if (days.length < LIKE_DAYS)
      return { ok: false, problem: { code: "too-few-like-days", date, found: days.length } };
    const sums = days.map(() => 0);
    open.forEach((quarter, place) => {
      const share = secondsOf(quarter) / QUARTER_S;
      const found = days.map((day) => day.quarters[place]!);
      const mean = (of: (quarter: CoveredQuarter) => number) =>
        (share * found.reduce((sum, one) => sum + of(one), 0)) / LIKE_DAYS;
      const knowsVolume = found.every(({ volumeM3 }) => volumeM3 !== null);
      quarters.push({
        startMs: quarter.startMs,
        filledS: secondsOf(quarter),
        heatingKwh: mean(({ heatingKwh }) => heatingKwh),
        coolingKwh: mean(({ coolingKwh }) => coolingKwh),
        volumeM3: knowsVolume ? mean(({ volumeM3 }) => volumeM3 ?? 0) : null,
      });
      found.forEach(({ heatingKwh, coolingKwh }, day) => {
        sums[day] = sums[day]! + share * (heatingKwh + coolingKwh);
      });
    });
    variance += deviation(sums) ** 2 * (1 + 1 / LIKE_DAYS);
    for (const day of days) used.add(day.date);
  }
  const energy = quarters.reduce(
    (sum, { heatingKwh, coolingKwh }) => sum + heatingKwh + coolingKwh,
    0,
  );
  return {
    ok: true,
    fill: {
      quarters,
      uncertaintyPercent: percentOf(Math.sqrt(variance), energy),
      days: [...used].sort(),
    },
  };
}

interface LikeDay {
  readonly date: string;
  /** What it holds at the times of the open quarter-hours, in their order. */
  readonly quarters: readonly CoveredQuarter[];
}

/** The latest like days before the gap's own first day that are whole at every time needed. */
function findLikeDays(
  date: string,
  firstDate: string,
  open: readonly OpenQuarter[],
  { zone, workingDays, quarterAt }: LikeDaysOptions,
): LikeDay[] {
  const works = (day: string) => workingDays.includes(weekdayOf(day));
  const offsets = zoneOffsets(zone);
  const found: LikeDay[] = [];
  for (let back = 1; back <= LOOK_BACK_DAYS && found.length < LIKE_DAYS; back++) {
    const candidate = addDays(firstDate, -back);
    if (works(candidate) !== works(date)) continue;
    const apartMs = Date.parse(candidate) - Date.parse(date);
    const quarters = open.flatMap(({ startMs }) => {
      const meaning = offsets.fromLocal(offsets.toLocal(startMs) + apartMs);
      if (meaning.kind === "missing") return [];
      const quarter = quarterAt(meaning.kind === "unique" ? meaning.utcMs : meaning.earlierMs);
      return quarter && isWhole(quarter) ? [quarter] : [];
    });
    if (quarters.length === open.length) found.push({ date: candidate, quarters });
  }
  return found;
}

/** How far before a gap its like days may begin, ms. */
export const LOOK_BACK_MS = (LOOK_BACK_DAYS + 2) * DAY_MS;
