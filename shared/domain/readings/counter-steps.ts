import { HOUR_MS } from "../time/interval";
import {
  COUNTER_CHANNELS,
  RowQuality,
  type ReadingColumns,
  type SeriesKind,
} from "./reading-columns";

/**
 * Counters of a permanent meter (volume, heating energy, cooling energy) as means over the step from
 * one row to the next, labelled with the step's end.
 *
 * The mean is the difference of two neighbouring rows over the time between them. A difference is
 * believed only where the physical maximum allows it: a fall is a rollover if the counter's capacity
 * is known and the step it implies stays within the maximum, else the counter was reset or the meter
 * exchanged; a rise above the maximum is another meter too. What moved in such a step is unknown: it
 * becomes a hole, is listed and counted, and is never |difference|. The same holds for the step in
 * which somebody says the meter was exchanged. Without a known maximum no fall is a rollover.
 *
 * The channels beside a counter are brought to the same step: instantaneous ones by the mean of both
 * ends, means labelled with their start from the row before, means labelled with their end as they
 * are. The first row, and a row after a gap, only open a step.
 *
 * Example: 9 998.2, 9 999.6, 0.9 m³ at quarter-hours, capacity 10 000 m³, at most 50 m³/h →
 * 1.4 and 1.3 m³, so 5.6 and 5.2 m³/h, with one rollover.
 */
export interface CounterLimits {
  /** Where the counter starts from zero again, in its stored unit (m³, kWh); null if unknown. */
  readonly capacity: number | null;
  /** The most that can pass in an hour, m³/h or kW; null if unknown. */
  readonly mostPerHour: number | null;
}

export interface CounterFacts {
  readonly volume: CounterLimits;
  readonly heating: CounterLimits;
  readonly cooling: CounterLimits;
  /** Instants at which the meter was exchanged, as somebody said; UTC ms. */
  readonly exchangesMs: readonly number[];
  /** A step over this many nominal steps is a hole. */
  readonly gapFactor: number;
}

export type CounterEventKind = "rollover" | "reset" | "jump" | "exchange";
export type CounterChannel = (typeof COUNTER_CHANNELS)[number];

export interface CounterEvent {
  readonly kind: CounterEventKind;
  readonly channel: CounterChannel;
  /** The row that ends the step. */
  readonly instantMs: number;
  readonly before: number;
  readonly after: number;
}

/** What passed between two readings of a counter; `passed` null is unknown. */
export interface CounterStep {
  readonly passed: number | null;
  readonly event: Exclude<CounterEventKind, "exchange"> | null;
}

/** The last digit of a rate: 1.3 m³ in a quarter of an hour may be 5.2000000001 m³/h. */
const DECIMAL_NOISE = 1e-9;

export function counterStep(
  before: number,
  after: number,
  hours: number,
  { capacity, mostPerHour }: CounterLimits,
): CounterStep {
  const fits = (passed: number) =>
    mostPerHour !== null && passed <= mostPerHour * hours * (1 + DECIMAL_NOISE);
  const difference = after - before;
  if (difference >= 0) {
    return mostPerHour === null || fits(difference)
      ? { passed: difference, event: null }
      : { passed: null, event: "jump" };
  }
  const wrapped = capacity === null ? -1 : difference + capacity;
  return wrapped >= 0 && fits(wrapped)
    ? { passed: wrapped, event: "rollover" }
    : { passed: null, event: "reset" };
}

/**
 * Where a counter starts again, from what somebody typed: a display that ends at 99 999.99 starts
 * again at 100 000; any other number is the capacity itself. Null for what no counter can have.
 */
export function counterCapacity(typed: number): number | null {
  if (!Number.isFinite(typed) || typed <= 0) return null;
  const text = String(typed);
  const digits = text.replace(".", "");
  if (![...digits].every((digit) => digit === "9")) return typed;
  const decimals = text.length - digits.length === 0 ? 0 : text.length - text.indexOf(".") - 1;
  return Number((typed + 10 ** -decimals).toFixed(decimals));
}

export interface CounterMeans {
  /** Of the kind `meanToLabel`: flow and powers in place of the counters. */
  readonly columns: ReadingColumns;
  readonly events: readonly CounterEvent[];
}

const LIMITS_OF = {
  volumeCounterM3: "volume",
  heatingCounterKwh: "heating",
  coolingCounterKwh: "cooling",
} as const;

export function hasCounters(columns: ReadingColumns): boolean {
  return COUNTER_CHANNELS.some((channel) => !!columns[channel]);
}

/** @param kind how the channels beside the counters relate to their labels */
export function counterMeans(
  columns: ReadingColumns,
  kind: SeriesKind,
  nominalStepMs: number,
  facts: CounterFacts,
): CounterMeans {
  const { instantMs } = columns;
  const events: CounterEvent[] = [];
  const quality = columns.quality.slice();
  const longestMs = facts.gapFactor * nominalStepMs;
  for (let i = 0; i < quality.length; i++) {
    const opens = i === 0 || (instantMs[i] as number) - (instantMs[i - 1] as number) > longestMs;
    if (opens && quality[i] === RowQuality.measured) quality[i] = RowQuality.opening;
  }
  const rate = (channel: CounterChannel): Float64Array | null => {
    const counter = columns[channel];
    return counter ? ratesOf(counter, channel, columns, quality, facts, events) : null;
  };
  const volumeRate = rate("volumeCounterM3");
  const heatingKw = rate("heatingCounterKwh");
  const coolingKw = rate("coolingCounterKwh");
  const beside = (values: Float64Array | null | undefined) => values && onSteps(values, kind);
  const result: ReadingColumns = {
    instantMs,
    flowM3PerHour: volumeRate ?? beside(columns.flowM3PerHour) ?? null,
    supplyC: beside(columns.supplyC) ?? null,
    returnC: beside(columns.returnC) ?? null,
    signalPercent: columns.signalPercent,
    powerKw: beside(columns.powerKw) ?? null,
    heatingKw,
    coolingKw,
    quality,
  };
  unknowIncomplete(heatingKw, coolingKw);
  markUnknown(result, quality);
  events.sort((a, b) => a.instantMs - b.instantMs);
  return { columns: result, events };
}

function ratesOf(
  counter: Float64Array,
  channel: CounterChannel,
  { instantMs, quality: asRead }: ReadingColumns,
  quality: Uint8Array,
  facts: CounterFacts,
  events: CounterEvent[],
): Float64Array {
  const rates = new Float64Array(counter.length).fill(NaN);
  const limits = facts[LIMITS_OF[channel]];
  for (let i = 1; i < counter.length; i++) {
    const before = counter[i - 1] as number;
    const after = counter[i] as number;
    const known = before === before && after === after;
    if (!known || quality[i] === RowQuality.opening) continue;
    // What somebody excluded opens no step: part of it belongs to the excluded time.
    if (asRead[i - 1] === RowQuality.excluded) continue;
    const fromMs = instantMs[i - 1] as number;
    const toMs = instantMs[i] as number;
    const exchanged = facts.exchangesMs.some((ms) => ms > fromMs && ms <= toMs);
    const hours = (toMs - fromMs) / HOUR_MS;
    const { passed, event } = exchanged
      ? { passed: null, event: "exchange" as const }
      : counterStep(before, after, hours, limits);
    if (event !== null) events.push({ kind: event, channel, instantMs: toMs, before, after });
    if (passed !== null) rates[i] = passed / hours;
  }
  return rates;
}

/** A row of two counters of which one is unknown says nothing: half of its heat would be missing. */
function unknowIncomplete(heatingKw: Float64Array | null, coolingKw: Float64Array | null): void {
  if (!heatingKw || !coolingKw) return;
  for (let i = 0; i < heatingKw.length; i++) {
    if (Number.isNaN((heatingKw[i] as number) + (coolingKw[i] as number)))
      heatingKw[i] = coolingKw[i] = NaN;
  }
}

/** A measured row whose step is unknown has no reading to count. */
function markUnknown(columns: ReadingColumns, quality: Uint8Array): void {
  const counted = [columns.heatingKw, columns.coolingKw].filter((channel) => !!channel);
  const rates = counted.length > 0 ? counted : [columns.flowM3PerHour];
  for (let i = 0; i < quality.length; i++) {
    if (quality[i] !== RowQuality.measured) continue;
    if (rates.every((rate) => Number.isNaN(rate?.[i] ?? NaN))) quality[i] = RowQuality.noReading;
  }
}

function onSteps(values: Float64Array, kind: SeriesKind): Float64Array {
  if (kind === "meanToLabel") return values;
  const onStep = new Float64Array(values.length).fill(NaN);
  for (let i = 1; i < values.length; i++) {
    const before = values[i - 1] as number;
    onStep[i] = kind === "meanFromLabel" ? before : (before + (values[i] as number)) / 2;
  }
  return onStep;
}

/** Nothing known of the meter: no rollover is believed, no rise doubted. */
export const NO_COUNTER_FACTS: Omit<CounterFacts, "gapFactor"> = {
  volume: { capacity: null, mostPerHour: null },
  heating: { capacity: null, mostPerHour: null },
  cooling: { capacity: null, mostPerHour: null },
  exchangesMs: [],
};
