import type {
  CountedEnergyUnit,
  CountedVolumeUnit,
  FileRecipe,
  FlowUnit,
  MeterPowerUnit,
  RepairChoices,
  TemperatureUnit,
} from "@shared/domain/log-files/recipe";
import type { RawRows } from "@shared/domain/log-files/raw-rows";
import type { RepairStep } from "@shared/domain/log-files/repair-step";
import {
  resolveRows,
  type OriginalChannel,
  type ResolvedRows,
} from "@shared/domain/log-files/resolve-rows";
import type { ReadingColumns, SeriesKind } from "@shared/domain/readings/reading-columns";
import type { StoredChannel, StoredRows } from "@server/readings/stored-rows";

/** Choices with a stand-in where somebody has still to choose, so that a check can show a picture. */
export function provisional(choices: RepairChoices): RepairChoices {
  return {
    ...choices,
    conflictingRepeats: choices.conflictingRepeats ?? "keepFirst",
    weakSignal: choices.weakSignal ?? "keep",
  };
}

/** One file of an import, read and brought to UTC and SI units. */
export interface ResolvedFile {
  readonly fileId: string;
  readonly kind: SeriesKind;
  readonly resolved: ResolvedRows;
  /** The rows with provisional choices where `resolved` is still undecided; null without a clock. */
  readonly columns: ReadingColumns | null;
  readonly original: readonly OriginalChannel[];
  readonly line: Uint32Array;
}

export function resolveFile(
  fileId: string,
  raw: RawRows,
  recipe: FileRecipe,
  choices: RepairChoices,
  zone: string,
): ResolvedFile {
  const resolved = resolveRows(raw, recipe, choices, zone);
  const shown =
    resolved.columns === null ? resolveRows(raw, recipe, provisional(choices), zone) : resolved;
  return {
    fileId,
    kind: recipe.seriesKind,
    resolved,
    columns: shown.columns,
    original: shown.original,
    line: shown.line,
  };
}

/** The rows as they are stored: the numbers the logger wrote in its own units, and their quality. */
export function storedRowsOf(
  columns: ReadingColumns,
  original: readonly OriginalChannel[],
): StoredRows {
  const channel = <Unit extends string>(
    meaning: OriginalChannel["meaning"],
  ): StoredChannel<Unit> | null => {
    const found = original.find((other) => other.meaning === meaning);
    return found ? { unit: found.unit as string as Unit, values: found.values } : null;
  };
  return {
    instantMs: columns.instantMs,
    flow: channel<FlowUnit>("flow"),
    supply: channel<TemperatureUnit>("supply"),
    return: channel<TemperatureUnit>("return"),
    signal: channel<"%">("signal"),
    power: channel<MeterPowerUnit>("power"),
    volumeCounter: channel<CountedVolumeUnit>("volumeCounter"),
    heatingCounter: channel<CountedEnergyUnit>("heatingCounter"),
    coolingCounter: channel<CountedEnergyUnit>("coolingCounter"),
    quality: columns.quality,
  };
}

/** Steps with counts of nothing left out, in the order of the list. */
export function withSteps(steps: readonly RepairStep[], more: readonly RepairStep[]): RepairStep[] {
  return [...steps, ...more.filter(({ count }) => count > 0)];
}
