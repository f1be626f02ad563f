import { isCounter } from "./column-units";
import { newTally, tally, type RawChannel, type RawRows, type Tally } from "./raw-rows";
import type { ColumnUnit, RepairChoices } from "./recipe";
import {
  findRepeatedExtremes,
  HIGHEST_USUAL,
  isNumericSentinel,
  LOWEST_USUAL,
  sentinelName,
} from "./sentinels";

/** Colder or hotter than any probe on a loop can be, °C. */
const POSSIBLE_C = { min: -60, max: 400 };

/** What stands at the ends of a channel in its own unit. */
function possibleRange(unit: ColumnUnit | null): { readonly min: number; readonly max: number } {
  switch (unit) {
    case "degC":
      return POSSIBLE_C;
    case "degF":
      return { min: POSSIBLE_C.min * 1.8 + 32, max: POSSIBLE_C.max * 1.8 + 32 };
    case "K":
      return { min: POSSIBLE_C.min + 273.15, max: POSSIBLE_C.max + 273.15 };
    case "%":
      return { min: 0, max: 100 };
    default:
      return { min: -Infinity, max: Infinity };
  }
}

export interface CleanChannels {
  /** In the order of the raw channels, file order; the raw array itself where nothing had to change, or in place. */
  readonly values: readonly Float64Array[];
  readonly sentinels: Tally;
}

/**
 * Blanks the numbers that mean "no reading" and counts them with the words that do. Nothing becomes zero.
 * @param inPlace whether the raw arrays may be written to
 */
export function blankSentinels(
  raw: RawRows,
  instantMs: Float64Array,
  choice: RepairChoices["sentinels"],
  inPlace = false,
): CleanChannels {
  const sentinels = newTally();
  sentinels.count = raw.tokens.count;
  sentinels.examples.push(...raw.tokens.examples);
  Object.assign(sentinels.countByKind, raw.tokens.countByKind);
  const values = raw.channels.map((channel) =>
    blankChannel(raw, channel, instantMs, choice, sentinels, inPlace),
  );
  return { values, sentinels };
}

function blankChannel(
  raw: RawRows,
  channel: RawChannel,
  instantMs: Float64Array,
  choice: RepairChoices["sentinels"],
  sentinels: Tally,
  inPlace: boolean,
): Float64Array {
  // Places of words are no readings.
  if (channel.meaning === "status") return channel.values;
  // A counter rests at any number, and at its last one for as long as nothing moves.
  const extremes = isCounter(channel.meaning)
    ? []
    : findRepeatedExtremes(channel.values, possibleRange(channel.unit));
  let blanked: Float64Array | null = null;
  const lowest = LOWEST_USUAL;
  const highest = HIGHEST_USUAL;
  for (let i = 0; i < channel.values.length; i++) {
    const value = channel.values[i] as number;
    // Nearly every reading leaves here; the rest is looked at with care.
    if (extremes.length === 0 && value > lowest && value < highest) continue;
    if (!isNumericSentinel(value) && !extremes.includes(value)) continue;
    const name = sentinelName(value);
    tally(sentinels, name, () => ({
      line: raw.line[i] as number,
      column: channel.header,
      cell: name,
      instantMs: Number.isNaN(instantMs[i]) ? null : (instantMs[i] as number),
    }));
    if (choice === "asWritten") continue;
    blanked ??= inPlace ? channel.values : channel.values.slice();
    blanked[i] = NaN;
  }
  return blanked ?? channel.values;
}

/** Takes the rows of an order out of column after column; null keeps all rows as they stand. */
export class Gathering {
  private spare: Float64Array | null = null;

  /** @param inPlace whether a column that was gathered may be written over with the next one's rows */
  constructor(
    private readonly order: Uint32Array | null,
    private readonly inPlace: boolean,
  ) {}

  /** The column itself where all rows stay. @param isKept whether the column must stay as it is */
  gather(values: Float64Array, isKept = false): Float64Array {
    const { order } = this;
    if (order === null) return values;
    const room = this.spare ?? new Float64Array(this.inPlace ? values.length : order.length);
    for (let i = 0; i < order.length; i++) room[i] = values[order[i] as number] as number;
    if (this.inPlace) this.spare = isKept ? null : values;
    return room.subarray(0, order.length);
  }
}
