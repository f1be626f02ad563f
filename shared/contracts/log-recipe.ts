import { z } from "zod";
import { instant } from "./contract";
import { findingChoices, keptSpans } from "./import-findings";
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
  columnStarts: z
    .array(z.number().int().min(0).max(1000))
    .max(200)
    .refine(
      (starts) =>
        starts.every((start, i) => (i === 0 ? start === 0 : start > (starts[i - 1] ?? 0))),
      "must begin with 0 and ascend",
    )
    .readonly()
    .optional()
    .describe(
      "columns of fixed width: the 0-based character at which each begins, the first 0; the separator is then a tab. Left out where a separator parts the columns; empty: find them",
    ),
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
  "velocity",
  "pulses",
  "status",
  "outdoor",
  "electricPower",
  "pressure",
  "skip",
]);
export const flowUnit = z.enum(["m3/h", "L/s", "L/min", "US gpm", "L/h"]);
export const velocityUnit = z.enum(["m/s", "ft/s"]);
export const temperatureUnit = z.enum(["degC", "degF", "K"]);
export const meterPowerUnit = z.enum(["kW", "MW", "W", "MBH", "ton"]);
export const countedVolumeUnit = z.enum(["m3", "L", "US gal", "ft3"]);
export const countedEnergyUnit = z.enum(["kWh", "MWh", "MJ", "GJ", "kBtu", "MMBtu"]);
export const loopPressureUnit = z.enum(["kPa", "bar", "psi"]);
export const columnUnit = z.union([
  flowUnit,
  velocityUnit,
  loopPressureUnit,
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
  pulseValue: z
    .number()
    .gt(0)
    .max(1e6)
    .nullable()
    .optional()
    .describe("what one pulse stands for, in the column's unit of volume; never assumed"),
  badWords: z
    .array(z.string().max(60))
    .max(60)
    .optional()
    .describe("words of a status column that mean a bad reading; none is an answer too"),
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
  z
    .object({ kind: z.literal("siteStandard") })
    .describe("the site's winter time all year, without summer time"),
  z.object({ kind: z.literal("utc") }),
  z.object({ kind: z.literal("fixedOffset"), offsetMinutes: z.number().int().min(-840).max(840) }),
  z.object({ kind: z.literal("zone"), zone: ianaZone }),
]);
export const clockNote = z.object({
  loggerAt: instant.describe("what the logger showed, read as its rows are"),
  rightAt: instant.describe("what a right clock showed at that moment"),
});
export const fileRecipe = z.object({
  dialect,
  columns: z.array(columnRecipe).max(200),
  time: z.object({
    format: timeFormat,
    clock: loggerClock.nullable(),
    notes: z
      .array(clockNote)
      .max(2)
      .readonly()
      .optional()
      .describe(
        "what the logger's clock and a right one showed at start and end; of this file only",
      ),
  }),
  seriesKind,
  kindChosen: z
    .boolean()
    .optional()
    .describe("true: moments, though the header says the rows are means"),
  alikeChosen: z
    .boolean()
    .optional()
    .describe("true: none of the columns that nothing tells apart is read"),
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
  findings: findingChoices.optional().describe("what is done about what the readings show"),
  keptSpans: keptSpans.optional(),
});
