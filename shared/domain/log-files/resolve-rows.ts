import type { ReadingColumns } from "../readings/reading-columns";
import { blankSentinels, Gathering } from "./clean-values";
import { columnToStoredUnit, convertInPlace, isCounter, storedUnitOf } from "./column-units";
import { findGaps, nominalStepMs } from "./find-gaps";
import { orderRows } from "./order-rows";
import {
  newTally,
  type ChannelMeaning,
  type RawChannel,
  type RawRows,
  type Tally,
} from "./raw-rows";
import type {
  ColumnUnit,
  CountedVolumeUnit,
  FileRecipe,
  RepairChoices,
  VelocityUnit,
} from "./recipe";
import type { Gap, RepairStep, RepairStepCode, RowExample } from "./repair-step";
import { unitQuestionOf } from "./open-questions";
import { resolveTimes } from "./resolve-times";
import { countRows, excludeBadStatus, judgeRows, noReadings, type RowCounts } from "./row-quality";
import { flowFromPulses, flowFromVelocity, type BoreSpan, type DerivedFlow } from "./water-flow";

/** A choice that must be made before the rows can be stored. */
export type RepairQuestion =
  | { readonly code: "loggerClock" }
  | { readonly code: "flowUnit" | "temperatureUnit" | "columnUnit"; readonly columnIndex: number }
  | {
      readonly code: "pulseValue" | "statusWords" | "pointBore";
      readonly columnIndex: number;
    }
  | {
      readonly code: "conflictingRepeats" | "weakSignal";
      readonly count: number;
      readonly examples: readonly RowExample[];
    };

/** A channel as the file has it, one value a kept row: stored beside the converted one. */
export interface OriginalChannel {
  readonly meaning: ChannelMeaning;
  readonly unit: ColumnUnit;
  readonly decimals: number;
  readonly values: Float64Array;
}

export interface ResolvedRows {
  /** Null while a question is open: nothing may be stored then. */
  readonly columns: ReadingColumns | null;
  /**
   * The same, with the first reading of each open conflict and weak signals kept, for a picture of
   * what is asked; null while another question is open.
   */
  readonly shown: ReadingColumns | null;
  /** Resolved in place, those of counters alone: the others have been converted where they lay. */
  readonly original: readonly OriginalChannel[];
  /** Line in the file of each kept row. */
  readonly line: Uint32Array;
  readonly steps: readonly RepairStep[];
  readonly questions: readonly RepairQuestion[];
  readonly gaps: readonly Gap[];
  readonly nominalStepMs: number | null;
  readonly firstInstantMs: number | null;
  readonly lastInstantMs: number | null;
  readonly counts: RowCounts;
}

/** The rows kept, as the file has them. */
export interface WrittenRows {
  readonly instantMs: Float64Array;
  readonly quality: Uint8Array;
  readonly original: readonly OriginalChannel[];
}

/** How a file is resolved whose copies would not fit: in the memory of `raw`, which is used up. */
export interface InPlace {
  /** Called after each step; may throw to stop the work. */
  onStep(): void;
  /** Given the rows before their units are converted; nothing of them may be kept. */
  onWritten(rows: WrittenRows): void;
}

/** What is known of the metering point a file is read for. */
export interface PointFacts {
  /** By ascending time; empty where the pipe is not known. */
  readonly bores: readonly BoreSpan[];
}
export const NO_POINT_FACTS: PointFacts = { bores: [] };

/**
 * Turns the raw rows of one file into readings: UTC, ascending, m³/h and °C, every step listed and counted.
 * Pure: preview and import call it alike, and other choices on the same rows undo any step.
 *
 * Order: times by file order → out-of-order rows → repeats → sentinels → flow from speed or pulses →
 * weak signal and bad status → units.
 * With an open question `columns` is null; steps, gaps and counts are then provisional.
 * Columns may share memory with `raw` and each other: do not write to them. Given `inPlace`, the
 * result is the same but for `original`, and `raw` cannot be used again.
 */
export function resolveRows(
  raw: RawRows,
  recipe: FileRecipe,
  choices: RepairChoices,
  siteZone: string,
  facts: PointFacts = NO_POINT_FACTS,
  inPlace: InPlace | null = null,
): ResolvedRows {
  const questions: RepairQuestion[] = columnQuestions(raw, recipe, facts);
  const { clock } = recipe.time;
  const times = resolveTimes(raw, clock, choices.missingHour, siteZone, inPlace && raw.timeMs);
  if (times === null) {
    return {
      ...nothing(raw),
      steps: rawSteps(raw),
      questions: [{ code: "loggerClock" }, ...questions],
    };
  }
  inPlace?.onStep();
  const ordered = orderRows(raw, times.instantMs, choices);
  inPlace?.onStep();
  const cleaned = blankSentinels(raw, times.instantMs, choices.sentinels, inPlace !== null);
  inPlace?.onStep();
  const gathering = new Gathering(ordered.order, inPlace !== null);
  const instantMs = gathering.gather(times.instantMs);
  const line =
    ordered.order === null ? raw.line : ordered.order.map((row) => raw.line[row] as number);
  const stepMs = nominalStepMs(instantMs);
  const written = raw.channels.map((channel, i): OriginalChannel => ({
    meaning: channel.meaning,
    unit: channel.unit ?? storedUnitOf(channel.meaning),
    decimals: channel.decimals,
    // Words are looked up by their places in the file once more.
    values: gathering.gather(cleaned.values[i] as Float64Array, channel.meaning === "status"),
  }));
  inPlace?.onStep();
  const rows = { instantMs, line };
  const derived = deriveFlow(written, recipe, rows, stepMs, facts);
  const original = written.flatMap((channel) => {
    if (channel.meaning === "status") return [];
    return isDerived(channel.meaning) ? flowChannel(derived) : [channel];
  });
  const channelOf = (meaning: ChannelMeaning) =>
    original.find((other) => other.meaning === meaning);
  const asWritten = (meaning: ChannelMeaning) => channelOf(meaning)?.values ?? null;
  const { quality, weakSignal } = judgeRows(
    instantMs,
    line,
    noReadings(
      instantMs.length,
      [asWritten("volumeCounter") ?? asWritten("flow"), asWritten("supply"), asWritten("return")],
      [asWritten("power"), asWritten("heatingCounter"), asWritten("coolingCounter")],
    ),
    asWritten("signal"),
    choices,
  );
  const badStatus = excludeBadStatus(raw, recipe, ordered.order, rows, quality);
  inPlace?.onWritten({ instantMs, quality, original });

  const conversion = newTally();
  const stored = (meaning: ChannelMeaning): Float64Array | null => {
    const channel = channelOf(meaning);
    if (channel === undefined) return null;
    countConversion(conversion, channel);
    inPlace?.onStep();
    return inPlace !== null && !isCounter(meaning)
      ? convertInPlace(channel.values, channel.unit)
      : columnToStoredUnit(channel.values, channel.unit);
  };
  const flowM3PerHour = stored("flow");
  const supplyC = stored("supply");
  const returnC = stored("return");
  const signalPercent = stored("signal");
  const powerKw = stored("power");
  const volumeCounterM3 = stored("volumeCounter");
  const heatingCounterKwh = stored("heatingCounter");
  const coolingCounterKwh = stored("coolingCounter");
  const companions = {
    outdoorC: stored("outdoor"),
    electricKw: stored("electricPower"),
    pressureKpa: stored("pressure"),
  };
  // Only these two have an answer to go on with meanwhile.
  const isShown = questions.length === 0;
  if (choices.conflictingRepeats === null && ordered.conflictingRepeats.count > 0) {
    questions.push(asQuestion("conflictingRepeats", ordered.conflictingRepeats));
  }
  if (choices.weakSignal === null && weakSignal.count > 0)
    questions.push(asQuestion("weakSignal", weakSignal));

  const gaps = stepMs === null ? [] : findGaps(instantMs, flowM3PerHour, stepMs);
  const columns: ReadingColumns = {
    instantMs,
    flowM3PerHour,
    supplyC,
    returnC,
    signalPercent,
    ...(powerKw && { powerKw }),
    ...(volumeCounterM3 && { volumeCounterM3 }),
    ...(heatingCounterKwh && { heatingCounterKwh }),
    ...(coolingCounterKwh && { coolingCounterKwh }),
    ...(companions.outdoorC && { outdoorC: companions.outdoorC }),
    ...(companions.electricKw && { electricKw: companions.electricKw }),
    ...(companions.pressureKpa && { pressureKpa: companions.pressureKpa }),
    quality,
  };
  return {
    columns: questions.length > 0 ? null : columns,
    shown: isShown ? columns : null,
    original: inPlace ? original.filter(({ meaning }) => isCounter(meaning)) : original,
    line,
    steps: [
      ...rawSteps(raw),
      ...listed("repeatedHour", times.repeatedHour),
      ...listed("missingHour", times.missingHour),
      ...listed("outOfOrder", ordered.outOfOrder),
      ...listed("identicalRepeats", ordered.identicalRepeats),
      ...listed("conflictingRepeats", ordered.conflictingRepeats),
      ...listed("sentinels", cleaned.sentinels),
      ...(derived === null ? [] : derivedSteps(written, derived)),
      ...listed("weakSignal", weakSignal),
      ...listed("badStatus", badStatus),
      ...listed("unitConversion", conversion),
    ],
    questions,
    gaps,
    nominalStepMs: stepMs,
    firstInstantMs: instantMs[0] ?? null,
    lastInstantMs: instantMs[instantMs.length - 1] ?? null,
    counts: countRows(raw.rowCount, instantMs, quality, stepMs),
  };
}

function columnQuestions(raw: RawRows, recipe: FileRecipe, facts: PointFacts): RepairQuestion[] {
  return raw.channels.flatMap(({ unit, meaning, columnIndex }: RawChannel): RepairQuestion[] => {
    const column = recipe.columns.find(({ index }) => index === columnIndex);
    if (meaning === "status")
      return column?.badWords === undefined ? [{ code: "statusWords", columnIndex }] : [];
    if (meaning === "pulses")
      return unit === null || (column?.pulseValue ?? null) === null
        ? [{ code: "pulseValue", columnIndex }]
        : [];
    const open: RepairQuestion[] = [];
    if (meaning === "velocity" && facts.bores.length === 0)
      open.push({ code: "pointBore", columnIndex });
    if (unit === null && meaning !== "signal")
      open.push({ code: unitQuestionOf(meaning), columnIndex });
    return open;
  });
}

function isDerived(meaning: ChannelMeaning): boolean {
  return meaning === "velocity" || meaning === "pulses";
}

/** Flow of a file that has water speed or pulses in its place; null where it has neither or lacks an answer. */
function deriveFlow(
  channels: readonly OriginalChannel[],
  recipe: FileRecipe,
  rows: { readonly instantMs: Float64Array; readonly line: Uint32Array },
  stepMs: number | null,
  facts: PointFacts,
): DerivedFlow | null {
  const channel = channels.find(({ meaning }) => isDerived(meaning));
  if (channel === undefined) return null;
  const { values, unit } = channel;
  if (channel.meaning === "velocity")
    return flowFromVelocity(rows, values, unit as VelocityUnit, facts.bores);
  const value = recipe.columns.find(({ meaning }) => meaning === "pulses")?.pulseValue ?? null;
  if (value === null) return null;
  const worth = { value, unit: unit as CountedVolumeUnit };
  return flowFromPulses(rows, values, worth, stepMs, recipe.seriesKind);
}

function flowChannel(derived: DerivedFlow | null): OriginalChannel[] {
  if (derived === null) return [];
  return [{ meaning: "flow", unit: "m3/h", decimals: 0, values: derived.flowM3PerHour }];
}

function derivedSteps(channels: readonly OriginalChannel[], derived: DerivedFlow): RepairStep[] {
  const isSpeed = channels.some(({ meaning }) => meaning === "velocity");
  return [
    ...listed(isSpeed ? "velocityTimesBore" : "pulsesToFlow", derived.made),
    ...listed("pulseOpening", derived.opening),
  ];
}

function nothing(raw: RawRows): Omit<ResolvedRows, "steps" | "questions"> {
  return {
    columns: null,
    shown: null,
    original: [],
    line: new Uint32Array(0),
    gaps: [],
    nominalStepMs: null,
    firstInstantMs: null,
    lastInstantMs: null,
    counts: {
      read: raw.rowCount,
      kept: 0,
      measured: 0,
      excluded: 0,
      noReading: 0,
      leftOut: 0,
      expected: null,
      missing: null,
    },
  };
}

/** What the reader could not read, as steps. */
function rawSteps(raw: RawRows): RepairStep[] {
  return [
    ...listed("unreadableTimes", raw.unreadableTimes),
    ...listed("shortRows", raw.shortRows),
    ...listed("unreadableCells", raw.unreadableCells),
    ...listed("footer", raw.footer),
  ];
}

function listed(code: RepairStepCode, { count, examples, countByKind }: Tally): RepairStep[] {
  return count === 0 ? [] : [{ code, count, examples, countByKind }];
}

function asQuestion(
  code: "conflictingRepeats" | "weakSignal",
  { count, examples }: Tally,
): RepairQuestion {
  return { code, count, examples };
}

function countConversion(into: Tally, { unit, values, meaning }: OriginalChannel): void {
  const target = storedUnitOf(meaning);
  if (unit === target) return;
  let cells = 0;
  for (let i = 0; i < values.length; i++) if (values[i] === values[i]) cells++;
  into.count += cells;
  into.countByKind[`${meaning}: ${unit} → ${target}`] = cells;
}
