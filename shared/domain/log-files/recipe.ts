import type { PositivePower } from "../readings/orient-power";
import type { SeriesKind } from "../readings/reading-columns";

/**
 * A recipe says how to read one logger file: everything the bytes do not say by themselves.
 * Recognition proposes one, a person settles what could not be proved, preview and import use it alike.
 */
export interface FileRecipe {
  readonly dialect: Dialect;
  readonly columns: readonly ColumnRecipe[];
  readonly time: TimeRecipe;
  readonly seriesKind: SeriesKind;
  /** Somebody chose the kind, though the header says otherwise. */
  readonly kindChosen?: boolean;
  /** Somebody left out all columns that nothing tells apart. */
  readonly alikeChosen?: boolean;
  /** Only for files of a permanent meter. */
  readonly meter?: MeterRecipe;
}

export interface MeterRecipe {
  /** What a positive power is; asked where the loop changes over and no temperature tells. */
  readonly positivePower: PositivePower | null;
  /** UTC instants (ISO 8601) at which the meter was exchanged. */
  readonly exchangedAt: readonly string[];
}

export type TextEncoding = "utf-8" | "utf-16le" | "utf-16be" | "windows-1252";
export type Separator = "," | ";" | "\t" | "|" | " ";

export interface Dialect {
  readonly encoding: TextEncoding;
  readonly separator: Separator;
  readonly quote: '"' | "'" | null;
  /** 1-based line numbers in the file as written; null where there is none. */
  readonly headerLine: number | null;
  readonly unitsLine: number | null;
  readonly firstDataLine: number;
  /**
   * Columns of fixed width begin at these 0-based characters (code points), the first at 0; `separator`
   * is then a tab, which takes the place of the boundaries before rows are split, and `quote` is null.
   * Left out where a separator parts the columns. Empty: to be found.
   */
  readonly columnStarts?: readonly number[];
}

export type ColumnMeaning =
  | "time"
  | "date"
  | "timeOfDay"
  | "flow"
  | "supply"
  | "return"
  | "signal"
  /** Heat power of a permanent meter. */
  | "power"
  | "volumeCounter"
  | "heatingCounter"
  | "coolingCounter"
  /** Water speed; flow once it is multiplied with the point's bore. */
  | "velocity"
  /** Pulses counted since the row before; flow once their worth is known. */
  | "pulses"
  /** Words of the logger about the row, some of which mean a bad reading. */
  | "status"
  /** Companion series: kept beside the readings, never part of energy. */
  | "outdoor"
  | "electricPower"
  | "pressure"
  | "skip";

export type FlowUnit = "m3/h" | "L/s" | "L/min" | "US gpm" | "L/h";
export type VelocityUnit = "m/s" | "ft/s";
export type OutdoorUnit = "degC" | "degF";
export type ElectricPowerUnit = "kW" | "W";
export type LoopPressureUnit = "kPa" | "bar" | "psi";
export type TemperatureUnit = "degC" | "degF" | "K";
/** MBH is a thousand Btu an hour, ton a ton of refrigeration. */
export type MeterPowerUnit = "kW" | "MW" | "W" | "MBH" | "ton";
export type CountedVolumeUnit = "m3" | "L" | "US gal" | "ft3";
export type CountedEnergyUnit = "kWh" | "MWh" | "MJ" | "GJ" | "kBtu" | "MMBtu";
export type ColumnUnit =
  | FlowUnit
  | VelocityUnit
  | TemperatureUnit
  | "%"
  | MeterPowerUnit
  | CountedVolumeUnit
  | CountedEnergyUnit
  | LoopPressureUnit;

export type DecimalMark = "." | ",";

export interface ColumnRecipe {
  /** 0-based position in the row. */
  readonly index: number;
  /** As the header line has it, or "" where there is none. */
  readonly header: string;
  readonly meaning: ColumnMeaning;
  /** Null for times and skipped columns, and for a quantity whose unit is still to be chosen. */
  readonly unit: ColumnUnit | null;
  readonly decimalMark: DecimalMark;
  /** Where a counter starts from zero again, in the column's unit; null or left out where unknown. */
  readonly capacity?: number | null;
  /** What one pulse stands for, in the column's unit of volume; null or left out while it is asked. */
  readonly pulseValue?: number | null;
  /** Words of a status column that mean a bad reading; left out while it is asked. */
  readonly badWords?: readonly string[];
}

export type DateOrder = "dayMonthYear" | "monthDayYear" | "yearMonthDay";

/** How a timestamp cell is written. `order` null means nothing in the file proves it: ask. */
export type TimeFormat =
  | { readonly kind: "calendar"; readonly order: DateOrder | null }
  | { readonly kind: "epochSeconds" }
  | { readonly kind: "epochMilliseconds" }
  | { readonly kind: "spreadsheetDays" };

/** Which clock the logger was set to. Ignored for cells that carry their own offset, and for epochs. */
export type LoggerClock =
  | { readonly kind: "site" }
  /** The site's winter time all year: no summer time, no repeated and no missing hour. */
  | { readonly kind: "siteStandard" }
  | { readonly kind: "utc" }
  | { readonly kind: "fixedOffset"; readonly offsetMinutes: number }
  | { readonly kind: "zone"; readonly zone: string };

export interface TimeRecipe {
  readonly format: TimeFormat;
  /** Null until somebody says; never needed when every cell carries its own offset or the format is an epoch. */
  readonly clock: LoggerClock | null;
  /** What the logger's clock and a right one showed at start and end, UTC (ISO 8601). Of one file only. */
  readonly notes?: readonly ClockReading[];
}

export interface ClockReading {
  /** What the logger showed, read as its rows are. */
  readonly loggerAt: string;
  readonly rightAt: string;
}

/** What to do with each kind of defect. A null is a question that stops the import when the defect occurs. */
export interface RepairChoices {
  /** Rows that repeat an instant with the same values. */
  readonly identicalRepeats: "dropRepeats" | "leaveOutAll";
  /** Rows that repeat an instant with other values. */
  readonly conflictingRepeats: "keepFirst" | "keepLast" | "leaveOutAll" | null;
  /** Rows earlier than the row before. */
  readonly outOfOrder: "sort" | "leaveOut";
  /** Tokens and numbers that mean "no reading". */
  readonly sentinels: "noReading" | "asWritten";
  /** Local times that do not exist on the day clocks go forward. */
  readonly missingHour: "leaveOut" | "readAsBeforeChange";
  /** Rows whose signal is under the threshold. */
  readonly weakSignal: "exclude" | "keep" | null;
  readonly weakSignalBelowPercent: number;
  /** Instants that an earlier import of this point already holds with other values. */
  readonly overlap: "keepEarlier" | "useThis" | null;
  /** What is done about what the readings show: a finding's key to the key of one of its choices. */
  readonly findings?: Readonly<Record<string, string>>;
  /** Spans of a chosen exclusion that stay in, by finding; named by their first instant, ISO 8601. */
  readonly keptSpans?: Readonly<Record<string, readonly string[]>>;
}

export const DEFAULT_REPAIR_CHOICES: RepairChoices = {
  identicalRepeats: "dropRepeats",
  conflictingRepeats: null,
  outOfOrder: "sort",
  sentinels: "noReading",
  missingHour: "leaveOut",
  weakSignal: null,
  weakSignalBelowPercent: 40,
  overlap: null,
};
