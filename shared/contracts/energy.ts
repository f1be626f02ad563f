import { z } from "zod";
import { contract, id, instant, nothing } from "./contract";
import { certificateState } from "./evidence";
import { fluid, fluidBlock } from "./places";
import { energyPlusMinus, plusMinus, rangePlusMinus } from "./plus-minus";

/*
 * Energy and readings of one metering point. Ranges are half-open. A range may be given as UTC
 * instants, or as days of the site's zone; both ends in the same manner.
 */
const pointId = z.object({ pointId: id });
const edge = z.union([z.iso.datetime({ offset: true }), z.iso.date()]);
const range = z.object({ from: edge, to: edge.describe("exclusive") });

/** Nothing covered is not nothing used: a script must be able to tell a hole from a still pump. */
const figure = z
  .number()
  .nullable()
  .describe("null where energy was worked out for none of the range");
const register = z.object({
  energyKwh: figure,
  volumeM3: figure,
  /** Seconds this register ran. */
  runningS: z.number(),
  flowWeightedDeltaTK: z.number().nullable(),
  energyWeightedDeltaTK: z.number().nullable(),
  timeMeanDeltaTK: z.number().nullable(),
});

export const energyTotals = z.object({
  heating: register,
  cooling: register,
  volumeM3: figure,
  suppressedKwh: figure,
  suppressedS: z.number(),
  coveredS: z.number(),
  expectedS: z.number(),
  coverage: z.number().nullable().describe("covered / expected, 0 to 1"),
  rows: z.object({
    measured: z.number(),
    excluded: z.number(),
    noReading: z.number(),
    expected: z.number().nullable(),
  }),
  apportioned: z.boolean(),
  /** Beside what was measured, never in it; null where nothing is filled. */
  filled: z
    .object({
      heatingKwh: z.number(),
      coolingKwh: z.number(),
      heatingExpandedKwh: z.number().describe("the ± of it, k = 2"),
      coolingExpandedKwh: z.number().describe("the ± of it, k = 2"),
      volumeM3: z.number().nullable(),
      filledS: z.number().describe("time without readings that a fill stands for"),
      approvedOnly: z.boolean().describe("false while a proposal is among them"),
    })
    .nullable(),
});
export type EnergyTotals = z.infer<typeof energyTotals>;

/** Why a point's readings give no energy: its loop's fluid, what was not measured, what cannot be. */
export const energyBlock = z.enum([
  ...fluidBlock.options,
  "noTemperature",
  "noFlow",
  "outsideFluid",
  /** A meter's power in a changeover loop, and nobody has said which heat it is. */
  "powerRegister",
]);
export type EnergyBlock = z.infer<typeof energyBlock>;

export const energyBasis = z.object({
  engineVersion: z.number().int().nullable(),
  pressure: z.object({ absoluteMPa: z.number(), assumed: z.boolean() }),
  meterSide: z.enum(["supply", "return"]),
  fluid: fluid.describe("what fills the loop"),
  liquidC: z
    .object({ lowest: z.number(), highest: z.number() })
    .nullable()
    .describe("the fluid is liquid and known between these, °C; null where it gives no energy"),
  blockedBy: energyBlock.nullable(),
  meansOnly: z
    .boolean()
    .describe(
      "the logger stored only means: mean flow × mean ΔT leaves out how they move together",
    ),
  rowsAgainstRegister: z
    .number()
    .int()
    .describe("rows of a meter's power of the other sign than the loop's service; no energy"),
  recalculating: z.boolean(),
});

/** Columns, one entry a row, all the same length; null where nothing is covered. */
const energyColumns = z.object({
  startMs: z.array(z.number()),
  lengthS: z.array(z.number()),
  coveredS: z.array(z.number()),
  heatingKwh: z.array(z.number().nullable()),
  coolingKwh: z.array(z.number().nullable()),
  volumeM3: z.array(z.number().nullable()),
  meanSupplyC: z.array(z.number().nullable()),
  meanReturnC: z.array(z.number().nullable()),
  /** Of the register that ran longer; null where none ran. */
  flowWeightedDeltaTK: z.array(z.number().nullable()),
  suppressedKwh: z.array(z.number()),
  minPowerKw: z.array(z.number().nullable()),
  maxPowerKw: z.array(z.number().nullable()),
});

export const getEnergy = contract({
  operationId: "getEnergy",
  summary: "Energy of a metering point by quarter-hour, hour, local day or as one total",
  tag: "Energy",
  method: "get",
  path: "/points/:pointId/energy",
  params: pointId,
  query: range.extend({ step: z.enum(["quarterHour", "hour", "day", "total"]).default("day") }),
  answer: z.object({
    zone: z.string(),
    from: instant,
    to: instant,
    basis: energyBasis,
    totals: energyTotals,
    plusMinus: rangePlusMinus.nullable().describe("of the totals; only for `total`"),
    /** Absent for `total`. */
    columns: energyColumns.nullable(),
  }),
});
export type EnergyAnswer = z.infer<(typeof getEnergy)["answer"]>;

const measured = z
  .number()
  .nullable()
  .describe("null where a permanent meter gives the power and the water was not measured");
export const loadCard = z.object({
  from: instant,
  to: instant,
  supplyC: measured,
  returnC: measured,
  flowM3PerHour: measured,
  deltaTK: measured,
  powerKw: z.number().describe("≥ 0, of the register named"),
  plusMinus: plusMinus.nullable().describe("of the power"),
  register: z.enum(["heating", "cooling"]),
});

/** An installation that speaks for part of a range, as far as a loop's page names it. */
const measuredBy = z.object({
  installationId: id,
  from: instant,
  to: instant.nullable().describe("null while the kit is on the pipe"),
  flowMeter: z
    .object({
      serial: z.string(),
      certificate: z
        .object({ dueOn: z.iso.date().nullable(), state: certificateState })
        .nullable()
        .describe("as it stood on the last day of the range that the installation speaks for"),
    })
    .nullable(),
  /** A permanent heat meter that gives power or energy by itself. */
  meterClass: z.union([z.literal(1), z.literal(2), z.literal(3)]).nullable(),
  probes: z
    .object({
      supplySerial: z.string(),
      returnSerial: z.string(),
      checkedOn: z.iso.date().nullable().describe("both in one bath; null: never"),
    })
    .nullable(),
});
export type MeasuredBy = z.infer<typeof measuredBy>;

/** What the loop page shows of a range, in one answer. */
export const getPointSummary = contract({
  operationId: "getPointSummary",
  summary:
    "Totals, days, busiest half hour, night base and what was left out, over a range of local days",
  tag: "Energy",
  method: "get",
  path: "/points/:pointId/summary",
  params: pointId,
  query: z.object({ from: z.iso.date(), to: z.iso.date() }),
  answer: z.object({
    zone: z.string(),
    from: instant,
    to: instant,
    basis: energyBasis,
    totals: energyTotals,
    plusMinus: rangePlusMinus.describe("of the totals"),
    days: z.array(
      z.object({
        date: z.iso.date(),
        heatingKwh: z.number().nullable(),
        coolingKwh: z.number().nullable(),
        volumeM3: z.number().nullable(),
        coveredS: z.number(),
        lengthS: z.number(),
        plusMinus: energyPlusMinus,
      }),
    ),
    busiest: loadCard.nullable().describe("busiest fully covered half hour"),
    busiestDay: z
      .object({
        date: z.iso.date(),
        energyKwh: z.number(),
        plusMinus: plusMinus.nullable(),
      })
      .nullable()
      .describe("the day that holds the busiest half hour, by the same register"),
    nightBase: z
      .object({
        fromHour: z.number(),
        toHour: z.number(),
        powerKw: z.number(),
        register: z.enum(["heating", "cooling"]),
        coverage: z.number(),
        plusMinus: plusMinus.nullable(),
      })
      .nullable()
      .describe("mean power over the named night hours of the range"),
    leftOut: z.array(
      z.object({
        kind: z.enum(["filled", "excluded", "noReading", "missing"]),
        from: instant,
        to: instant,
        rows: z.number().nullable(),
        reason: z.enum(["weakSignal", "correction", "noReading", "noRows", "noTemperature"]),
      }),
    ),
    leftOutCount: z.number().int(),
    can: z.object({ correct: z.boolean().describe("propose corrections and fills") }),
    evidence: z
      .object({
        installations: z.array(measuredBy).describe("that speak for the range, oldest first"),
        can: z.object({ record: z.boolean() }),
      })
      .nullable()
      .describe("null for those who may not see evidence"),
    firstReadingAt: instant.nullable(),
    lastReadingAt: instant.nullable(),
  }),
});
export type PointSummary = z.infer<(typeof getPointSummary)["answer"]>;

const drawn = z
  .object({ decimals: z.number().int(), differences: z.string() })
  .describe(
    "Numbers packed for a chart, one a column: each as the difference from the one before, in units of the last decimal, as Base64 VLQ (ECMA-426); a full stop where there is none, which lifts the pen",
  );
/** Columns as a chart draws them: one number a column, all of one length, unknown lifts the pen. */
export const getSeries = contract({
  operationId: "getSeries",
  summary: "What a chart of the given width can draw of the readings",
  tag: "Energy",
  method: "get",
  path: "/points/:pointId/series",
  params: pointId,
  query: range.extend({
    pixels: z.coerce
      .number()
      .int()
      .min(50)
      .max(4000)
      .describe("width to draw on; there is at most one column for every two"),
  }),
  answer: z.object({
    zone: z.string(),
    /** The range asked for. */
    fromMs: z.number(),
    toMs: z.number(),
    nominalStepS: z.number().nullable(),
    rows: z.number().int().describe("rows behind the picture"),
    /** Length of each column, whose values are means of its rows; null where columns are rows. */
    averagedOverS: z.number().nullable(),
    /** Start of the first column; column i starts `averagedOverS` × i later. */
    t0Ms: z.number(),
    /** Offsets from `t0Ms` where columns are rows; else null. */
    tMs: drawn.nullable(),
    supplyC: drawn,
    returnC: drawn,
    flowM3PerHour: drawn,
    powerKw: drawn.describe("heating positive, cooling negative"),
    /** Least and greatest row of each column; null where columns are rows. */
    envelope: z
      .object({
        supplyLeastC: drawn,
        supplyGreatestC: drawn,
        returnLeastC: drawn,
        returnGreatestC: drawn,
        flowGreatestM3PerHour: drawn,
      })
      .nullable(),
    quality: z.array(
      z.object({
        fromMs: z.number(),
        toMs: z.number(),
        kind: z.enum(["measured", "filled", "excluded", "missing"]),
      }),
    ),
    yExtent: z.object({
      temperatureC: z.tuple([z.number(), z.number()]).nullable(),
      flowM3PerHour: z.tuple([z.number(), z.number()]).nullable(),
    }),
  }),
});
export type SeriesAnswer = z.infer<(typeof getSeries)["answer"]>;

export const getReadings = contract({
  operationId: "getReadings",
  summary: "Cleaned readings as rows, a page at a time, for the table view",
  tag: "Energy",
  method: "get",
  path: "/points/:pointId/readings",
  params: pointId,
  query: range.extend({
    cursor: z.string().max(40).optional(),
    limit: z.coerce.number().int().min(1).max(1000).default(200),
  }),
  answer: z.object({
    zone: z.string(),
    items: z.array(
      z.object({
        at: instant,
        flowM3PerHour: z.number().nullable(),
        supplyC: z.number().nullable(),
        returnC: z.number().nullable(),
        powerKw: z.number().nullable(),
        quality: z.enum(["measured", "excluded", "noReading"]),
      }),
    ),
    nextCursor: z.string().nullable(),
  }),
});

export const downloadIntervals = contract({
  operationId: "downloadIntervals",
  summary: "Energy intervals as CSV: UTC and local time, units in the headers",
  tag: "Energy",
  method: "get",
  path: "/points/:pointId/energy.csv",
  params: pointId,
  query: range.extend({ step: z.enum(["quarterHour", "hour", "day"]).default("quarterHour") }),
  answer: nothing,
  answerKind: "csv",
});
export const downloadReadings = contract({
  operationId: "downloadReadings",
  summary: "Cleaned readings as CSV: UTC and local time, units in the headers",
  tag: "Energy",
  method: "get",
  path: "/points/:pointId/readings.csv",
  params: pointId,
  query: range,
  answer: nothing,
  answerKind: "csv",
});

/** A week picker's month: one mark a day. */
export const getDayMarks = contract({
  operationId: "getDayMarks",
  summary: "How well each local day of a range is covered",
  tag: "Energy",
  method: "get",
  path: "/points/:pointId/days",
  params: pointId,
  query: z.object({ from: z.iso.date(), to: z.iso.date() }),
  answer: z.object({
    zone: z.string(),
    days: z.array(
      z.object({
        date: z.iso.date(),
        kind: z.enum(["measured", "filled", "excluded", "missing", "none"]),
        coverage: z.number(),
      }),
    ),
    firstReadingAt: instant.nullable(),
    lastReadingAt: instant.nullable(),
  }),
});

// Today ---------------------------------------------------------------------------------------
export const needsALook = z.object({
  weight: z.enum(["stop", "look", "note"]),
  code: z.enum([
    "importAsks",
    "importFailed",
    "importDone",
    "noRecentReadings",
    "lowCoverage",
    "excludedRows",
    "energyBlocked",
    "pumpWithoutDeltaT",
    "unmeteredRemainder",
  ]),
  loop: z
    .object({ id, tag: z.string(), service: z.enum(["chilled", "hot", "changeover"]) })
    .nullable(),
  /** Values for the sentence, by name; the client has the words. */
  values: z.record(z.string(), z.union([z.string(), z.number()])),
  link: z.discriminatedUnion("to", [
    z.object({
      to: z.literal("loop"),
      loopId: id,
      from: z.iso.date().nullable(),
      until: z.iso.date().nullable(),
    }),
    z.object({ to: z.literal("import"), importId: id }),
    z.object({ to: z.literal("site"), siteId: id }),
  ]),
});
export const getToday = contract({
  operationId: "getToday",
  summary: "What needs a look at a site, and each loop's last whole day",
  tag: "Energy",
  method: "get",
  path: "/sites/:siteId/today",
  params: z.object({ siteId: id }),
  answer: z.object({
    site: z.object({ id, name: z.string(), zone: z.string(), isDemo: z.boolean() }),
    now: instant,
    today: z.iso.date().describe("in the site's zone"),
    needsALook: z.array(needsALook),
    /** The last local day that any loop has readings for. */
    day: z.iso.date().nullable(),
    loops: z.array(
      z.object({
        loop: z.object({
          id,
          tag: z.string(),
          name: z.string(),
          service: z.enum(["chilled", "hot", "changeover"]),
          buildingName: z.string().nullable(),
          isMain: z.boolean(),
        }),
        pointId: id.nullable(),
        nominalSizeDn: z.number().nullable(),
        meterSide: z.enum(["supply", "return"]).nullable(),
        card: loadCard.nullable().describe("means over the day"),
        energyKwh: z.number().nullable(),
        energyPlusMinus: plusMinus.nullable(),
        emptyReason: z
          .enum([
            "noPoint",
            "noReadings",
            "noReadingsThatDay",
            "noReadingInFile",
            ...fluidBlock.options,
          ])
          .nullable(),
        lastReadingAt: instant.nullable(),
      }),
    ),
  }),
});
export type TodayAnswer = z.infer<(typeof getToday)["answer"]>;
