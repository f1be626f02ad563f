import { HOUR_MS } from "./interval";
import { zoneOffsets, type ZoneOffsets } from "./zone-offsets";

/**
 * Reads the wall-clock times of one file, in file order, as UTC.
 *
 * On the day clocks go back an hour of labels occurs twice and nothing in the label says which pass
 * it is. The order of the rows does: of the two instants a label may mean, the one nearer to where
 * the file's own step leads is taken; where both are equally near, the one further along in the
 * file's direction. So the first pass keeps the earlier offset until the labels step back, a swapped
 * pair of rows inside one pass does not end it, an hourly file's two equal labels become two hours,
 * and a file written newest first is read as well. Without a row close before, the earlier is taken.
 *
 * Example, Europe/Paris 26 October 2025: 02:00, 02:30, 02:00, 02:30 → 00:00, 00:30, 01:00, 01:30 UTC.
 */
export type LocalKind = "unique" | "repeated" | "missing";

/** Beyond this a row says nothing about the one after it. */
const CONTINUITY_MS = 6 * HOUR_MS;

export class LocalClock {
  /** What the last time given to {@link toUtc} was. */
  lastKind: LocalKind = "unique";

  private readonly offsets: ZoneOffsets;
  // The stretch of local times that surely has one offset.
  private uniqueFrom = 0;
  private uniqueTo = 0;
  private offsetMs = 0;
  private previousMs = NaN;
  private lastStepMs = NaN;
  /** The file's usual step, signed; NaN until two rows have been read. */
  private stepMs = NaN;

  constructor(zone: string) {
    this.offsets = zoneOffsets(zone);
  }

  /** UTC ms of the next row's local time; NaN where the clock jumped over it or `localMs` is NaN. */
  toUtc(localMs: number): number {
    let utcMs: number;
    if (localMs >= this.uniqueFrom && localMs < this.uniqueTo) {
      this.lastKind = "unique";
      utcMs = localMs - this.offsetMs;
    } else {
      utcMs = this.lookUp(localMs);
      if (Number.isNaN(utcMs)) return NaN;
    }
    this.follow(utcMs);
    return utcMs;
  }

  /** A missing local time as the instant it would be if the clock had not been put forward. */
  asBeforeChange(localMs: number): number {
    const meaning = this.offsets.fromLocal(localMs);
    return meaning.kind === "missing" ? meaning.asBeforeChangeMs : NaN;
  }

  private follow(utcMs: number): void {
    const step = utcMs - this.previousMs;
    this.previousMs = utcMs;
    // One long step is a gap and one short one a jitter; a step seen twice, or a shorter one the
    // same way, is the file's.
    if (step !== 0 && step !== this.stepMs) {
      const shorter = step * this.stepMs > 0 && Math.abs(step) < Math.abs(this.stepMs);
      if (shorter || step === this.lastStepMs || Number.isNaN(this.stepMs)) this.stepMs = step;
    }
    this.lastStepMs = step;
  }

  private lookUp(localMs: number): number {
    if (Number.isNaN(localMs)) {
      this.lastKind = "unique";
      return NaN;
    }
    const meaning = this.offsets.fromLocal(localMs);
    this.lastKind = meaning.kind;
    if (meaning.kind === "missing") return NaN;
    if (meaning.kind === "repeated") return this.choose(meaning.earlierMs, meaning.laterMs);
    const segment = this.offsets.segmentAt(meaning.utcMs);
    const before = this.offsets.offsetAt(segment.startMs - 1);
    const after = this.offsets.offsetAt(segment.endMs);
    this.offsetMs = segment.offsetMs;
    this.uniqueFrom = segment.startMs + Math.max(before, this.offsetMs);
    this.uniqueTo = segment.endMs + Math.min(after, this.offsetMs);
    return meaning.utcMs;
  }

  private choose(earlierMs: number, laterMs: number): number {
    const step = Number.isNaN(this.stepMs) ? 0 : this.stepMs;
    const expected = this.previousMs + step;
    const toEarlier = Math.abs(earlierMs - expected);
    const toLater = Math.abs(laterMs - expected);
    // NaN where no row came before: neither test holds and the earlier is taken.
    if (!(Math.min(toEarlier, toLater) <= CONTINUITY_MS + Math.abs(step))) return earlierMs;
    if (toLater === toEarlier) {
      // The very label of the row before, half an hour from either reading: a repeated row.
      if (earlierMs === this.previousMs || laterMs === this.previousMs) return this.previousMs;
      return step < 0 ? earlierMs : laterMs;
    }
    return toLater < toEarlier ? laterMs : earlierMs;
  }
}

/** A clock for one file; make a new one for each. @throws RangeError for an unknown zone. */
export function createLocalClock(zone: string): LocalClock {
  return new LocalClock(zone);
}
