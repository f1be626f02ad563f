import { DAY_MS, HOUR_MS, type Interval } from "./interval";

/**
 * UTC offsets of one IANA zone, read once from the platform's zone database and kept.
 *
 * Asking the database for every row takes a hundred times longer than reading the row, so a stretch
 * with one offset is found once and then only compared with. Local instants are "local
 * milliseconds": the wall clock's fields as if they were UTC, `Date.UTC(2025, 9, 26, 2, 30)`.
 */
export interface OffsetSegment extends Interval {
  /** Local − UTC, ms. */
  readonly offsetMs: number;
}

/** What a wall-clock time means in a zone. */
export type LocalMeaning =
  | { readonly kind: "unique"; readonly utcMs: number }
  /** The clock showed it twice. */
  | { readonly kind: "repeated"; readonly earlierMs: number; readonly laterMs: number }
  /** The clock never showed it. */
  | {
      readonly kind: "missing";
      /** The instant at which the clock jumped over it. */
      readonly changeMs: number;
      /** The instant it would be if the clock had not been put forward. */
      readonly asBeforeChangeMs: number;
    };

/** No zone is further from UTC than this, and no zone changes twice within it. */
const REACH_MS = 15 * HOUR_MS;
/** Offsets are looked up by this stretch. */
const WINDOW_MS = 366 * DAY_MS;
/** Two changes closer than this would be missed; the closest since 1970 are four weeks apart. */
const PROBE_MS = 3 * DAY_MS;

const OFFSET_TEXT = /GMT(?:([+-])(\d{1,2}):?(\d{2})?(?::(\d{2}))?)?$/;

export class ZoneOffsets {
  readonly zone: string;
  private readonly format: Intl.DateTimeFormat;
  private readonly windows = new Map<number, readonly OffsetSegment[]>();
  private current: OffsetSegment = { startMs: 0, endMs: 0, offsetMs: 0 };

  /** @throws RangeError for a zone the platform does not know; ask {@link isKnownZone} first. */
  constructor(zone: string) {
    this.zone = zone;
    this.format = new Intl.DateTimeFormat("en-US", { timeZone: zone, timeZoneName: "longOffset" });
  }

  /** Local − UTC at an instant, ms. */
  offsetAt(utcMs: number): number {
    const segment = this.current;
    return utcMs >= segment.startMs && utcMs < segment.endMs
      ? segment.offsetMs
      : this.segmentAt(utcMs).offsetMs;
  }

  /** A stretch round the instant in which the offset does not change (it may go on beyond it). */
  segmentAt(utcMs: number): OffsetSegment {
    const index = Math.floor(utcMs / WINDOW_MS);
    let segments = this.windows.get(index);
    if (!segments) {
      segments = this.readWindow(index * WINDOW_MS);
      this.windows.set(index, segments);
    }
    const found = segments.find((segment) => utcMs < segment.endMs);
    if (!found) throw new RangeError(`${utcMs} is not an instant.`);
    this.current = found;
    return found;
  }

  toLocal(utcMs: number): number {
    return utcMs + this.offsetAt(utcMs);
  }

  /** What a wall-clock time means; see {@link LocalMeaning}. */
  fromLocal(localMs: number): LocalMeaning {
    const candidates: number[] = [];
    let change: { atMs: number; before: number } | null = null;
    let before: OffsetSegment | null = null;
    let segment = this.segmentAt(localMs - REACH_MS);
    for (;;) {
      const utcMs = localMs - segment.offsetMs;
      if (utcMs >= segment.startMs && utcMs < segment.endMs) candidates.push(utcMs);
      if (
        before &&
        localMs >= segment.startMs + before.offsetMs &&
        localMs < segment.startMs + segment.offsetMs
      ) {
        change = { atMs: segment.startMs, before: before.offsetMs };
      }
      if (segment.endMs > localMs + REACH_MS) break;
      before = segment;
      segment = this.segmentAt(segment.endMs);
    }
    const [first, second] = candidates;
    if (first !== undefined) {
      return second === undefined
        ? { kind: "unique", utcMs: first }
        : { kind: "repeated", earlierMs: first, laterMs: second };
    }
    if (!change) throw new RangeError(`${localMs} is not a local time.`);
    return { kind: "missing", changeMs: change.atMs, asBeforeChangeMs: localMs - change.before };
  }

  private readWindow(fromMs: number): readonly OffsetSegment[] {
    const segments: OffsetSegment[] = [];
    const toMs = fromMs + WINDOW_MS;
    let startMs = fromMs;
    let offsetMs = this.ask(fromMs);
    for (let low = fromMs; low < toMs; low += PROBE_MS) {
      const high = Math.min(low + PROBE_MS, toMs);
      const next = this.ask(high);
      if (next === offsetMs) continue;
      const changeMs = this.findChange(low, high, offsetMs);
      // A change on the window's very end belongs to the next window.
      if (changeMs >= toMs) continue;
      segments.push({ startMs, endMs: changeMs, offsetMs });
      startMs = changeMs;
      offsetMs = next;
    }
    segments.push({ startMs, endMs: toMs, offsetMs });
    return segments;
  }

  /** The whole second at which the offset stops being `before`. */
  private findChange(lowMs: number, highMs: number, before: number): number {
    let low = lowMs / 1000;
    let high = highMs / 1000;
    while (high - low > 1) {
      const middle = Math.floor((low + high) / 2);
      if (this.ask(middle * 1000) === before) low = middle;
      else high = middle;
    }
    return high * 1000;
  }

  private ask(utcMs: number): number {
    const text = this.format.format(utcMs);
    const match = OFFSET_TEXT.exec(text);
    if (!match) throw new RangeError(`No offset in "${text}" for ${this.zone}.`);
    const [, sign, hours = "0", minutes = "0", seconds = "0"] = match;
    const ms = ((Number(hours) * 60 + Number(minutes)) * 60 + Number(seconds)) * 1000;
    return sign === "-" ? -ms : ms;
  }
}

const kept = new Map<string, ZoneOffsets>();

/** The offsets of a zone, kept between calls. @throws RangeError for an unknown zone. */
export function zoneOffsets(zone: string): ZoneOffsets {
  let offsets = kept.get(zone);
  if (!offsets) {
    offsets = new ZoneOffsets(zone);
    kept.set(zone, offsets);
  }
  return offsets;
}

/** Whether the platform's zone database has this name. */
export function isKnownZone(zone: string): boolean {
  try {
    return zone !== "" && zoneOffsets(zone).zone === zone;
  } catch (error) {
    if (error instanceof RangeError) return false;
    throw error;
  }
}
