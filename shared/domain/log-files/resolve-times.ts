import { standardOffsetMs } from "../time/standard-offset";
import { createLocalClock, type LocalClock } from "../time/local-clock";
import { zoneOffsets } from "../time/zone-offsets";
import { nominalStepMs } from "./find-gaps";
import { newTally, tally, type RawRows, type Tally } from "./raw-rows";
import { sameReadings } from "./order-rows";
import type { LoggerClock, RepairChoices } from "./recipe";
import { choosePasses } from "./repeated-hour";

const MS_PER_MINUTE = 60_000;
/** The rows of a repeated hour are judged together with this many after it. */
const ROWS_AFTER = 8;
/** In a log with gaps and misplaced stretches most steps still lead on; in a shuffled one, about half. */
const SHARE_IN_ORDER = 0.6;

export interface ResolvedTimes {
  /** UTC ms of each row in file order; NaN for a row left out because its local time never was. */
  readonly instantMs: Float64Array;
  /**
   * Rows in an hour the clock showed twice, by the offset they got; "unclear" where a gap or shuffled rows
   * hide which pass it is.
   */
  readonly repeatedHour: Tally;
  /** Rows in an hour the clock jumped over. */
  readonly missingHour: Tally;
}

/**
 * Turns the times of a file into UTC, in file order: the repeated hour can only be told apart by the rows
 * round it. Null if some row needs a clock and none is chosen.
 * @param into room for the instants, `raw.timeMs` itself where it is of no more use; else new
 */
export function resolveTimes(
  raw: RawRows,
  clock: LoggerClock | null,
  choice: RepairChoices["missingHour"],
  siteZone: string,
  into: Float64Array | null = null,
): ResolvedTimes | null {
  const needsClock = raw.isUtc.includes(0);
  if (!needsClock || clock?.kind === "utc") return withoutChanges(raw.timeMs);
  if (clock === null) return null;
  if (clock.kind === "site" || clock.kind === "zone")
    return new WallClockReading(
      raw,
      clock.kind === "site" ? siteZone : clock.zone,
      choice,
      into ?? new Float64Array(raw.rowCount),
    ).read();
  const { rowCount, timeMs, isUtc } = raw;
  const instantMs = into ?? new Float64Array(rowCount);
  const offsetMs =
    clock.kind === "siteStandard"
      ? standardOffsetMs(siteZone, timeMs[0] ?? 0)
      : clock.offsetMinutes * MS_PER_MINUTE;
  for (let i = 0; i < rowCount; i++)
    instantMs[i] = (timeMs[i] as number) - (isUtc[i] === 1 ? 0 : offsetMs);
  return withoutChanges(instantMs);
}

function withoutChanges(instantMs: Float64Array): ResolvedTimes {
  return { instantMs, repeatedHour: newTally(), missingHour: newTally() };
}

class WallClockReading {
  private readonly repeatedHour = newTally();
  private readonly missingHour = newTally();
  private readonly clock: LocalClock;
  private readonly stepMs: number;
  /** Rows of a repeated hour and right after it, waiting to be judged together. */
  private chain: number[] = [];
  /** What the clock showed in them; the rows' own times may be written over by then. */
  private chainTimeMs: number[] = [];
  private chainIsRepeated: boolean[] = [];
  private sinceRepeated = 0;
  /** Rows of repeated hours by label, kept only where the rows are shuffled; else null. */
  private readonly rowsByLabel: Map<number, number[]> | null;

  constructor(
    private readonly raw: RawRows,
    private readonly zone: string,
    private readonly choice: RepairChoices["missingHour"],
    private readonly instantMs: Float64Array,
  ) {
    this.clock = createLocalClock(zone);
    this.stepMs = nominalStepMs(raw.timeMs) ?? 0;
    this.rowsByLabel = isShuffled(raw.timeMs) ? new Map() : null;
  }

  read(): ResolvedTimes {
    const { raw, clock, instantMs } = this;
    const { timeMs, isUtc, rowCount } = raw;
    for (let i = 0; i < rowCount; i++) {
      const ms = timeMs[i] as number;
      if (isUtc[i] === 1) {
        instantMs[i] = ms;
        continue;
      }
      instantMs[i] = clock.toUtc(ms);
      if (clock.lastKind !== "unique") {
        if (clock.lastKind === "missing") this.readMissing(i, ms);
        else if (this.rowsByLabel !== null) this.rememberLabel(this.rowsByLabel, i, ms);
        else this.link(i, ms, true);
      } else if (this.chain.length > 0) this.link(i, ms, false);
    }
    this.judgeChain();
    if (this.rowsByLabel !== null) this.judgeLabels(this.rowsByLabel);
    return { instantMs, repeatedHour: this.repeatedHour, missingHour: this.missingHour };
  }

  private readMissing(row: number, localMs: number): void {
    const before = this.clock.asBeforeChange(localMs);
    if (this.choice === "readAsBeforeChange") this.instantMs[row] = before;
    const line = this.raw.line[row] as number;
    tally(this.missingHour, this.choice, () => ({
      line,
      column: null,
      cell: null,
      instantMs: before,
    }));
  }

  private rememberLabel(rowsByLabel: Map<number, number[]>, row: number, localMs: number): void {
    const rows = rowsByLabel.get(localMs);
    if (rows === undefined) rowsByLabel.set(localMs, [row]);
    else rows.push(row);
  }

  /**
   * Shuffled rows tell nothing of the passes by where they stand, but a label that stands twice is once
   * of each: both hours stay covered and their sum right, though either row may be the other's.
   */
  private judgeLabels(rowsByLabel: ReadonlyMap<number, readonly number[]>): void {
    const offsets = zoneOffsets(this.zone);
    for (const [localMs, rows] of rowsByLabel) {
      const meaning = offsets.fromLocal(localMs);
      if (meaning.kind !== "repeated") continue;
      rows.forEach((row, k) => {
        const at = k % 2 === 0 ? meaning.earlierMs : meaning.laterMs;
        this.instantMs[row] = at;
        this.count(row, "unclear", at);
      });
    }
  }

  private count(row: number, kind: string, at: number): void {
    const line = this.raw.line[row] as number;
    tally(this.repeatedHour, kind, () => ({ line, column: null, cell: null, instantMs: at }));
  }

  private link(row: number, timeMs: number, isRepeated: boolean): void {
    this.chain.push(row);
    this.chainTimeMs.push(timeMs);
    this.chainIsRepeated.push(isRepeated);
    this.sinceRepeated = isRepeated ? 0 : this.sinceRepeated + 1;
    if (this.sinceRepeated >= ROWS_AFTER) this.judgeChain();
  }

  private judgeChain(): void {
    const { chain, chainTimeMs, chainIsRepeated, raw, instantMs } = this;
    this.chain = [];
    this.chainTimeMs = [];
    this.chainIsRepeated = [];
    this.sinceRepeated = 0;
    const [first] = chain;
    if (first === undefined) return;
    const offsets = zoneOffsets(this.zone);
    const earlier: number[] = [];
    const later: number[] = [];
    // A row written twice in a row is in one pass with itself; it must not look like the next one.
    const place: number[] = [];
    for (let k = 0; k < chain.length; k++) {
      const row = chain[k] as number;
      const timeMs = chainTimeMs[k] as number;
      const meaning = chainIsRepeated[k] === true ? offsets.fromLocal(timeMs) : null;
      const isRepeated = meaning?.kind === "repeated";
      const shiftMs = isRepeated ? meaning.laterMs - meaning.earlierMs : 0;
      if (
        k > 0 &&
        Math.abs(this.stepMs) < shiftMs &&
        timeMs === chainTimeMs[k - 1] &&
        sameReadings(raw, row, chain[k - 1] as number)
      ) {
        place.push(earlier.length - 1);
        continue;
      }
      place.push(earlier.length);
      earlier.push(isRepeated ? meaning.earlierMs : (instantMs[row] as number));
      later.push(isRepeated ? meaning.laterMs : (instantMs[row] as number));
    }
    const previousMs = first > 0 ? (instantMs[first - 1] as number) : NaN;
    const { instantMs: chosen, isUnclear } = choosePasses(previousMs, earlier, later, this.stepMs);
    for (let k = 0; k < chain.length; k++) {
      if (chainIsRepeated[k] !== true) continue;
      const row = chain[k] as number;
      const at = chosen[place[k] as number] as number;
      instantMs[row] = at;
      this.count(row, isUnclear ? "unclear" : offsetName((chainTimeMs[k] as number) - at), at);
    }
  }
}

/** True where the times lead neither on nor back: the order of the rows says nothing of them. */
function isShuffled(timeMs: Float64Array): boolean {
  let forward = 0;
  let backward = 0;
  for (let i = 1; i < timeMs.length; i++) {
    const step = (timeMs[i] as number) - (timeMs[i - 1] as number);
    if (step > 0) forward++;
    else if (step < 0) backward++;
  }
  return Math.max(forward, backward) < SHARE_IN_ORDER * (forward + backward);
}

/** `+02:00` */
function offsetName(offsetMs: number): string {
  const minutes = Math.round(Math.abs(offsetMs) / MS_PER_MINUTE);
  const two = (n: number): string => String(n).padStart(2, "0");
  return `${offsetMs < 0 ? "-" : "+"}${two(Math.floor(minutes / 60))}:${two(minutes % 60)}`;
}
