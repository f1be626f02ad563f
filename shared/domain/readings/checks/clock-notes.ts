import { DAY_MS } from "../../time/interval";
import type { ClockError } from "../corrections/clock";
import type { ReadingSegment } from "../reading-columns";
import { KEEP, type Finding } from "./finding";
import { wholePlace } from "./row-spans";

/** What the logger's clock showed when a reference clock showed something else: one photograph. */
export interface ClockNote {
  readonly loggerMs: number;
  readonly referenceMs: number;
}

/**
 * A logger's clock from the notes taken at start and end: t′ = t + a + b·(t − t₀), t₀ being the logger's
 * time in the first note, a what it lacked then, and b what it lost in each of its own milliseconds
 * until the last. A single note gives the offset and no drift. Null without a note, or where two notes
 * give no time between them or a clock that stands or runs backwards.
 *
 * Example: 12:00:00 where it was 12:01:30, and four days later 12:00:00 where it was 12:01:38 → 90 s and
 * 2 s a day.
 */
export function clockFromNotes(notes: readonly ClockNote[]): ClockError | null {
  const ordered = [...notes].sort((a, b) => a.loggerMs - b.loggerMs);
  const start = ordered[0];
  const end = ordered.at(-1);
  if (!start || !end) return null;
  const offsetMs = start.referenceMs - start.loggerMs;
  const referenceMs = start.loggerMs;
  if (ordered.length === 1) return { offsetMs, driftPerMs: 0, referenceMs };
  const betweenMs = end.loggerMs - start.loggerMs;
  if (betweenMs <= 0) return null;
  const driftPerMs = (end.referenceMs - end.loggerMs - offsetMs) / betweenMs;
  return Math.abs(driftPerMs) < 1 ? { offsetMs, driftPerMs, referenceMs } : null;
}

/** A clock further off than this is worth correcting, ms. */
export const CLOCK_WORTH_CORRECTING_MS = 30_000;

export type ClockFinding = Finding<
  "clockOff",
  {
    readonly offsetS: number;
    /** Null where only one note was taken: nobody knows whether it drifted. */
    readonly driftSPerDay: number | null;
    readonly atFirstRowS: number;
    readonly atLastRowS: number;
  }
>;

/**
 * Says that the notes put the clock off by more than 30 s, or by half a step, at either end of the
 * rows. More than half a step asks to look: readings then count in a neighbour's time.
 */
export function clockOff(
  segment: ReadingSegment,
  notes: readonly ClockNote[],
): ClockFinding | null {
  const error = clockFromNotes(notes);
  const { instantMs } = segment.columns;
  if (error === null || instantMs.length === 0) return null;
  const offAt = (loggerMs: number) =>
    error.offsetMs + error.driftPerMs * (loggerMs - error.referenceMs);
  const atFirstMs = offAt(instantMs[0]!);
  const atLastMs = offAt(instantMs.at(-1)!);
  const mostMs = Math.max(Math.abs(atFirstMs), Math.abs(atLastMs));
  const halfStepMs = segment.nominalStepMs / 2;
  const isOverHalfStep = halfStepMs > 0 && mostMs >= halfStepMs;
  if (!isOverHalfStep && mostMs <= CLOCK_WORTH_CORRECTING_MS) return null;
  return {
    code: "clockOff",
    weight: isOverHalfStep ? "look" : "note",
    channel: null,
    ...wholePlace(segment),
    figures: {
      offsetS: error.offsetMs / 1000,
      driftSPerDay: notes.length > 1 ? (error.driftPerMs * DAY_MS) / 1000 : null,
      atFirstRowS: atFirstMs / 1000,
      atLastRowS: atLastMs / 1000,
    },
    choices: [{ change: "clock", error }, KEEP],
  };
}
