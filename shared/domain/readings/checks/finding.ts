import type { FlowUnit, TemperatureUnit } from "../../log-files/recipe";
import type { Interval } from "../../time/interval";
import type { ClockError } from "../corrections/clock";
import type { RowRange } from "../corrections/correction-span";
import type { SwappedThing } from "../corrections/swap-sides";
import type { ReadingChannel } from "../reading-columns";

/**
 * What a check of readings found: a value that says where, how much, and what could be done about it.
 * A check changes nothing. Rows are indexes into the columns that were checked; spans are the same
 * rows as time, so that they can be handed to a correction.
 */
export interface Finding<
  Code extends string = string,
  Figures extends FindingFigures = FindingFigures,
> {
  readonly code: Code;
  readonly weight: FindingWeight;
  /** The channel it is about; null where it is about time or several channels. */
  readonly channel: ReadingChannel | null;
  /** Ascending; touching rows are one range. Empty where it is about time without rows. */
  readonly rows: readonly RowRange[];
  readonly rowCount: number;
  /** As long as `rows`, or the stretches of time it is about where there are no rows. */
  readonly spans: readonly Interval[];
  /** Numbers for the sentence; names carry their units. Null is unknown. */
  readonly figures: Figures;
  /** In the order in which they should be offered; `keep` is always among them. */
  readonly choices: readonly FindingChoice[];
}

export type FindingFigures = Readonly<Record<string, number | string | null>>;

/**
 * `stop`: figures would be wrong by far, so somebody has to choose first. `look`: probably wrong.
 * `note`: worth knowing; nothing has to be done.
 */
export type FindingWeight = "stop" | "look" | "note";

/** One way to settle a finding; names the change it would make. */
export type FindingChoice =
  /** Leave rows out; each span is one exclusion, and somebody may take some of them only. */
  | { readonly change: "exclude"; readonly spans: readonly Interval[] }
  | { readonly change: "swapSides"; readonly span: Interval; readonly swapped: SwappedThing }
  | { readonly change: "flipFlow"; readonly span: Interval }
  | { readonly change: "unit"; readonly channel: "flow"; readonly unit: FlowUnit }
  | {
      readonly change: "unit";
      readonly channel: "temperatures";
      readonly unit: TemperatureUnit;
    }
  | { readonly change: "clock"; readonly error: ClockError }
  /** Two segments, the second from this instant on. */
  | { readonly change: "split"; readonly atMs: number }
  /** The least flow the loop counts; what it suppresses stays shown. */
  | { readonly change: "cutOff"; readonly flowM3PerHour: number }
  | { readonly change: "keep" };

export const KEEP: FindingChoice = { change: "keep" };
