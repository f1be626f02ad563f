import { z } from "zod";
import { instant } from "./contract";
import { ianaZone } from "./places";

/* How one file is read and mended: the same shape as shared/domain/log-files/recipe.ts. */
export const seriesKind = z.enum(["instantaneous", "meanFromLabel", "meanToLabel"]);
export const dialect = z.object({
  encoding: z.enum(["utf-8", "utf-16le", "utf-16be", "windows-1252"]),
  separator: z.enum([",", ";", "\t", "|", " "]),
  quote: z.enum(['"', "'"]).nullable(),
  headerLine: z.number().int().min(1).nullable(),
  unitsLine: z.number().int().min(1).nullable(),
  firstDataLine: z.number().int().min(1),
});
export const columnMeaning = z.enum([
  "time",
  "date",
  "timeOfDay",
  "flow",
  "supply",
  "return",
  "signal",
  "power",
  "volumeCounter",
  "heatingCounter",
  "coolingCounter",
  "skip",
]);
export const flowUnit = z.enum(["m3/h", "L/s", "L/min", "US gpm"]);
export const temperatureUnit = z.enum(["degC", "degF", "K"]);
export const meterPowerUnit = z.enum(["kW", "MW", "W", "MBH", "ton"]);
export const countedVolumeUnit = z.enum(["m3", "L", "US gal", "ft3"]);
export const countedEnergyUnit = z.enum(["kWh", "MWh", "MJ", "GJ", "kBtu", "MMBtu"]);
export const columnUnit = z.union([
  flowUnit,
  temperatureUnit,
  z.literal("%"),
  meterPowerUnit,
  countedVolumeUnit,
  countedEnergyUnit,
]);
export const columnRecipe = z.object({
  index: z.number().int().min(0),
  header: z.string(),
  meaning: columnMeaning,
  unit: columnUnit.nullable(),
  decimalMark: z.enum([".", ","]),
  capacity: z
    .number()
    .gt(0)
    .max(1e15)
    .nullable()
    .optional()
    .describe("where a counter starts from zero again, in the column's unit; 9999.9 means 10000"),
});
export const meterRecipe = z.object({
  positivePower: z
    .enum(["heating", "cooling", "byTemperature"])
    .nullable()
    .describe("what a positive power is; only asked where the loop changes over"),
  exchangedAt: z.array(instant).max(50).describe("when the meter was exchanged"),
});
export const dateOrder = z.enum(["dayMonthYear", "monthDayYear", "yearMonthDay"]);
export const timeFormat = z.discriminatedUnion("kind", [
  z.object({ kind: z.literal("calendar"), order: dateOrder.nullable() }),
  z.object({ kind: z.literal("epochSeconds") }),
  z.object({ kind: z.literal("epochMilliseconds") }),
  z.object({ kind: z.literal("spreadsheetDays") }),
]);
export const loggerClock = z.discriminatedUnion("kind", [
  z.object({ kind: z.literal("site") }),
  z.object({ kind: z.literal("utc") }),
  z.object({ kind: z.literal("fixedOffset"), offsetMinutes: z.number().int().min(-840).max(840) }),
  z.object({ kind: z.literal("zone"), zone: ianaZone }),
]);
export const fileRecipe = z.object({
  dialect,
  columns: z.array(columnRecipe).max(200),
  time: z.object({ format: timeFormat, clock: loggerClock.nullable() }),
  seriesKind,
  kindChosen: z
    .boolean()
    .optional()
    .describe("true: moments, though the header says the rows are means"),
  meter: meterRecipe.optional().describe("of a permanent meter's file"),
});
export const repairChoices = z.object({
  identicalRepeats: z.enum(["dropRepeats", "leaveOutAll"]),
  conflictingRepeats: z.enum(["keepFirst", "keepLast", "leaveOutAll"]).nullable(),
  outOfOrder: z.enum(["sort", "leaveOut"]),
  sentinels: z.enum(["noReading", "asWritten"]),
  missingHour: z.enum(["leaveOut", "readAsBeforeChange"]),
  weakSignal: z.enum(["exclude", "keep"]).nullable(),
  weakSignalBelowPercent: z.number().min(0).max(100),
  overlap: z.enum(["keepEarlier", "useThis"]).nullable(),
});
