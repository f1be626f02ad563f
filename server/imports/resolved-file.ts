import type {
  CountedEnergyUnit,
  CountedVolumeUnit,
  ElectricPowerUnit,
  FileRecipe,
  FlowUnit,
  LoopPressureUnit,
  MeterPowerUnit,
  OutdoorUnit,
  RepairChoices,
  TemperatureUnit,
} from "@shared/domain/log-files/recipe";
import type { RawRows } from "@shared/domain/log-files/raw-rows";
import type { RepairStep } from "@shared/domain/log-files/repair-step";
import {
  resolveRows,
  type InPlace,
  type OriginalChannel,
  type PointFacts,
  type ResolvedRows,
  type WrittenRows,
} from "@shared/domain/log-files/resolve-rows";
import type { ReadingColumns, SeriesKind } from "@shared/domain/readings/reading-columns";
import type { StoredChannel, StoredRows } from "@server/readings/stored-rows";

/** One file of an import, read and brought to UTC and SI units. */
export interface ResolvedFile {
  readonly fileId: string;
  readonly kind: SeriesKind;
  readonly resolved: ResolvedRows;
  /** The rows with provisional choices where `resolved` is still undecided; null without a clock. */
  readonly columns: ReadingColumns | null;
  /** Of counters alone. */
  readonly original: readonly OriginalChannel[];
  readonly line: Uint32Array;
}

/** Resolves the rows of a file where they lie: five million of them leave no room for copies. */
export function resolveFile(
  fileId: string,
  raw: RawRows,
  recipe: FileRecipe,
  choices: RepairChoices,
  zone: string,
  facts: PointFacts,
  inPlace: InPlace,
): ResolvedFile {
  const resolved = resolveRows(raw, recipe, choices, zone, facts, inPlace);
  const { shown: columns, original, line } = resolved;
  return { fileId, kind: recipe.seriesKind, resolved, columns, original, line };
}

/** The rows as they are stored: the numbers the logger wrote in its own units, and their quality. */
export function storedRowsOf({ instantMs, quality, original }: WrittenRows): StoredRows {
  const channel = <Unit extends string>(
    meaning: OriginalChannel["meaning"],
  ): StoredChannel<Unit> | null => {
    const found = original.find((other) => other.meaning === meaning);
    return found ? { unit: found.unit as string as Unit, values: found.values } : null;
  };
  return {
    instantMs,
    flow: channel<FlowUnit>("flow"),
    supply: channel<TemperatureUnit>("supply"),
    return: channel<TemperatureUnit>("return"),
    signal: channel<"%">("signal"),
    power: channel<MeterPowerUnit>("power"),
    volumeCounter: channel<CountedVolumeUnit>("volumeCounter"),
    heatingCounter: channel<CountedEnergyUnit>("heatingCounter"),
    coolingCounter: channel<CountedEnergyUnit>("coolingCounter"),
    outdoor: channel<OutdoorUnit>("outdoor"),
    electricPower: channel<ElectricPowerUnit>("electricPower"),
    pressure: channel<LoopPressureUnit>("pressure"),
    quality,
  };
}

/** Steps with counts of nothing left out, in the order of the list. */
export function withSteps(steps: readonly RepairStep[], more: readonly RepairStep[]): RepairStep[] {
  return [...steps, ...more.filter(({ count }) => count > 0)];
}
