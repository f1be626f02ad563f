import type { LoopService } from "../../energy/power";
import { FLOW_UNITS, TEMPERATURE_UNITS } from "../../log-files/column-units";
import type { FlowUnit, TemperatureUnit } from "../../log-files/recipe";
import { velocityMPerS } from "../../pipes/bore";
import { fromM3PerHour, toM3PerHour } from "../../units/flow";
import { fromCelsius, toCelsius } from "../../units/temperature";
import type { ReadingSegment } from "../reading-columns";
import { KEEP, type Finding, type FindingChoice } from "./finding";
import { readRows, sampleOf } from "./read-rows";
import { wholePlace } from "./row-spans";

/**
 * Which units the numbers of a column can be in, by what they would mean in this pipe and this loop.
 *
 * Flow: the water's speed in this bore, of the readings above a twentieth of their 95th percentile of
 * size (so that a pump that stands says nothing). `usual` is a median of 0.3 to 3 m/s, `possible` one
 * of at least 0.05 m/s, both with a 95th percentile of at most 5 m/s. Where the design flow is known,
 * the 95th percentile must also be 0.05 to 2 times it to be usual and 0.02 to 3 times it to be
 * possible. Temperatures: at least 90 % of the readings lie in the loop's window. Percentiles come
 * from at most 4 001 readings from across the series. These bounds are common practice, without a
 * published source.
 *
 * Example: 130 in a bore of 102.26 mm: as m³/h 4.40 m/s (possible), as L/s 15.8 m/s (no), as L/min
 * 0.264 m/s (possible), as US gpm 1.00 m/s (usual).
 */
export type UnitVerdict = "usual" | "possible" | "no";

export interface FlowUnitCandidate {
  readonly unit: FlowUnit;
  readonly medianMPerS: number;
  readonly highMPerS: number;
  readonly verdict: UnitVerdict;
}

export interface TemperatureUnitCandidate {
  readonly unit: TemperatureUnit;
  /** 5th and 95th percentile, °C. */
  readonly lowC: number;
  readonly highC: number;
  readonly insidePercent: number;
  readonly verdict: UnitVerdict;
}

export interface TemperatureWindow {
  readonly minC: number;
  readonly maxC: number;
}

/** Water and brine in loops of a service; a condenser's loop is a cold one here. */
export const LOOP_WINDOW_C: Readonly<Record<LoopService, TemperatureWindow>> = {
  cooling: { minC: -10, maxC: 40 },
  heating: { minC: 18, maxC: 130 },
  changeover: { minC: -10, maxC: 130 },
};

const MOST_SAMPLES = 4001;
const HIGHEST_M_PER_S = 5;
const INSIDE_SHARE = 0.9;

/**
 * A verdict on each flow unit. `readings` are the numbers as written, NaN allowed, `boreMm` > 0. Empty
 * where no reading differs from 0.
 */
export function flowUnitCandidates(
  readings: Float64Array,
  boreMm: number,
  designFlowM3PerHour: number | null = null,
): FlowUnitCandidate[] {
  const sizes = sampled(readings).map(Math.abs).sort();
  const floor = quantile(sizes, 0.95) / 20;
  const flowing = sizes.filter((size) => size > floor);
  if (flowing.length === 0) return [];
  const median = quantile(flowing, 0.5);
  const high = quantile(flowing, 0.95);
  return FLOW_UNITS.map((unit) => {
    const medianMPerS = velocityMPerS(toM3PerHour(median, unit), boreMm);
    const highMPerS = velocityMPerS(toM3PerHour(high, unit), boreMm);
    const ofDesign =
      designFlowM3PerHour === null ? 1 : toM3PerHour(high, unit) / designFlowM3PerHour;
    const isPossible =
      medianMPerS >= 0.05 && highMPerS <= HIGHEST_M_PER_S && ofDesign >= 0.02 && ofDesign <= 3;
    const isUsual = medianMPerS >= 0.3 && medianMPerS <= 3 && ofDesign >= 0.05 && ofDesign <= 2;
    return {
      unit,
      medianMPerS,
      highMPerS,
      verdict: !isPossible ? "no" : isUsual ? "usual" : "possible",
    };
  });
}

/** A verdict on each temperature unit. `readings` are the numbers as written. Empty of none. */
export function temperatureUnitCandidates(
  readings: Float64Array,
  window: TemperatureWindow,
): TemperatureUnitCandidate[] {
  const values = sampled(readings).sort();
  if (values.length === 0) return [];
  return TEMPERATURE_UNITS.map((unit) => {
    const inside = values.filter((value) => {
      const celsius = toCelsius(value, unit);
      return celsius >= window.minC && celsius <= window.maxC;
    }).length;
    return {
      unit,
      lowC: toCelsius(quantile(values, 0.05), unit),
      highC: toCelsius(quantile(values, 0.95), unit),
      insidePercent: (inside / values.length) * 100,
      verdict: inside >= INSIDE_SHARE * values.length ? "usual" : "no",
    };
  });
}

/** What the columns were converted from, and what they ran in. */
export interface UnitLimits {
  readonly boreMm: number | null;
  readonly designFlowM3PerHour: number | null;
  readonly service: LoopService;
  /** The unit the flow was read in; m³/h unless given, null where it comes from no such column. */
  readonly flowUnit?: FlowUnit | null;
  /** The unit both temperatures were read in; °C unless given, null where they differ. */
  readonly temperatureUnit?: TemperatureUnit | null;
  /** Instead of the service's own window. */
  readonly windowC?: TemperatureWindow;
}

export type UnitFinding =
  | Finding<
      "flowUnit",
      {
        readonly unit: FlowUnit;
        readonly medianMPerS: number;
        readonly highMPerS: number;
        /** The unit that fits best and its speed; null where none fits, and the bore may be wrong. */
        readonly otherUnit: FlowUnit | null;
        readonly otherMedianMPerS: number | null;
      }
    >
  | Finding<
      "temperatureUnit",
      {
        readonly unit: TemperatureUnit;
        readonly lowC: number;
        readonly highC: number;
        readonly otherUnit: TemperatureUnit | null;
        readonly otherLowC: number | null;
        readonly otherHighC: number | null;
      }
    >;

/** One finding for flow, one for the temperatures, where the unit they were read in cannot be. */
export function unitPlausibility(segment: ReadingSegment, limits: UnitLimits): UnitFinding[] {
  return [flowUnitFinding(segment, limits), temperatureUnitFinding(segment, limits)].filter(
    (finding) => finding !== null,
  );
}

function flowUnitFinding(segment: ReadingSegment, limits: UnitLimits): UnitFinding | null {
  const flow = segment.columns.flowM3PerHour;
  const rows = readRows(segment, flow);
  if (!flow || !rows || limits.boreMm === null || limits.flowUnit === null) return null;
  const unit = limits.flowUnit ?? "m3/h";
  const written = Float64Array.from(sampleOf(rows, MOST_SAMPLES), (row) =>
    fromM3PerHour(flow[row]!, unit),
  );
  const candidates = flowUnitCandidates(written, limits.boreMm, limits.designFlowM3PerHour);
  const own = candidates.find((candidate) => candidate.unit === unit);
  if (!own || own.verdict !== "no") return null;
  const others = bestFirst(candidates);
  const [best] = others;
  return {
    code: "flowUnit",
    weight: best ? "stop" : "look",
    channel: "flowM3PerHour",
    ...wholePlace(segment),
    figures: {
      unit,
      medianMPerS: own.medianMPerS,
      highMPerS: own.highMPerS,
      otherUnit: best?.unit ?? null,
      otherMedianMPerS: best?.medianMPerS ?? null,
    },
    choices: [
      ...others.map((other): FindingChoice => ({
        change: "unit",
        channel: "flow",
        unit: other.unit,
      })),
      KEEP,
    ],
  };
}

function temperatureUnitFinding(segment: ReadingSegment, limits: UnitLimits): UnitFinding | null {
  if (limits.temperatureUnit === null) return null;
  const unit = limits.temperatureUnit ?? "degC";
  const { supplyC, returnC } = segment.columns;
  const written = [supplyC, returnC].flatMap((values) => {
    const rows = readRows(segment, values);
    if (!values || !rows) return [];
    return Array.from(sampleOf(rows, MOST_SAMPLES), (row) => fromCelsius(values[row]!, unit));
  });
  const window = limits.windowC ?? LOOP_WINDOW_C[limits.service];
  const candidates = temperatureUnitCandidates(Float64Array.from(written), window);
  const own = candidates.find((candidate) => candidate.unit === unit);
  if (!own || own.verdict !== "no") return null;
  const others = bestFirst(candidates);
  const [best] = others;
  return {
    code: "temperatureUnit",
    weight: best ? "stop" : "look",
    channel: null,
    ...wholePlace(segment),
    figures: {
      unit,
      lowC: own.lowC,
      highC: own.highC,
      otherUnit: best?.unit ?? null,
      otherLowC: best?.lowC ?? null,
      otherHighC: best?.highC ?? null,
    },
    choices: [
      ...others.map((other): FindingChoice => ({
        change: "unit",
        channel: "temperatures",
        unit: other.unit,
      })),
      KEEP,
    ],
  };
}

function bestFirst<Candidate extends { readonly verdict: UnitVerdict }>(
  candidates: readonly Candidate[],
): Candidate[] {
  return [
    ...candidates.filter(({ verdict }) => verdict === "usual"),
    ...candidates.filter(({ verdict }) => verdict === "possible"),
  ];
}

/** Readings from across a column, without the missing ones. */
function sampled(readings: Float64Array): Float64Array {
  const known = readings.filter((value) => !Number.isNaN(value));
  if (known.length <= MOST_SAMPLES) return known;
  const step = known.length / MOST_SAMPLES;
  return Float64Array.from({ length: MOST_SAMPLES }, (_, i) => known[Math.floor(i * step)]!);
}

function quantile(sorted: Float64Array, share: number): number {
  return sorted.length === 0 ? NaN : sorted[Math.round(share * (sorted.length - 1))]!;
}
