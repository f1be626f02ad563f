import { createLocalClock } from "../time/local-clock";
import type { RawRows, Tally } from "./raw-rows";
import { newTally, tally } from "./raw-rows";
import type { LoggerClock, RepairChoices } from "./recipe";

const MS_PER_MINUTE = 60_000;

export interface ResolvedTimes {
  /** UTC ms of each row in file order; NaN for a row left out because its local time never was. */
  readonly instantMs: Float64Array;
  /** Rows in an hour the clock showed twice, by the offset they got. */
  readonly repeatedHour: Tally;
  /** Rows in an hour the clock jumped over. */
  readonly missingHour: Tally;
}

/**
 * Turns the times of a file into UTC, in file order: the repeated hour can only be told apart by the rows
 * round it. Null if some row needs a clock and none is chosen.
 */
export function resolveTimes(
  raw: RawRows,
  clock: LoggerClock | null,
  choice: RepairChoices["missingHour"],
  siteZone: string,
): ResolvedTimes | null {
  const repeatedHour = newTally();
  const missingHour = newTally();
  const result = { repeatedHour, missingHour };
  const needsClock = raw.isUtc.includes(0);
  if (!needsClock || clock?.kind === "utc") return { ...result, instantMs: raw.timeMs };
  if (clock === null) return null;
  const { rowCount, timeMs, isUtc, line } = raw;
  const instantMs = new Float64Array(rowCount);
  if (clock.kind === "fixedOffset") {
    const offsetMs = clock.offsetMinutes * MS_PER_MINUTE;
    for (let i = 0; i < rowCount; i++)
      instantMs[i] = (timeMs[i] as number) - (isUtc[i] === 1 ? 0 : offsetMs);
    return { ...result, instantMs };
  }
  const local = createLocalClock(clock.kind === "site" ? siteZone : clock.zone);
  for (let i = 0; i < rowCount; i++) {
    const ms = timeMs[i] as number;
    if (isUtc[i] === 1) {
      instantMs[i] = ms;
      continue;
    }
    let utcMs = local.toUtc(ms);
    if (local.lastKind !== "unique") {
      const at = line[i] as number;
      if (local.lastKind === "repeated") {
        const instant = utcMs;
        tally(repeatedHour, offsetName(ms - utcMs), () => ({
          line: at,
          column: null,
          cell: null,
          instantMs: instant,
        }));
      } else {
        const before = local.asBeforeChange(ms);
        if (choice === "readAsBeforeChange") utcMs = before;
        tally(missingHour, choice, () => ({
          line: at,
          column: null,
          cell: null,
          instantMs: before,
        }));
      }
    }
    instantMs[i] = utcMs;
  }
  return { ...result, instantMs };
}

/** `+02:00` */
function offsetName(offsetMs: number): string {
  const minutes = Math.round(Math.abs(offsetMs) / MS_PER_MINUTE);
  const two = (n: number): string => String(n).padStart(2, "0");
  return `${offsetMs < 0 ? "-" : "+"}${two(Math.floor(minutes / 60))}:${two(minutes % 60)}`;
}
