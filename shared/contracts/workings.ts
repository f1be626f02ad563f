import { z } from "zod";
import { contract, id, instant, nothing } from "./contract";
import { budgetTerm, verdict } from "./evidence";
import { correction, fill } from "./corrections";
import { fluid } from "./places";
import { plusMinus } from "./plus-minus";

/*
 * The workings of one figure: one model that the screen, the PDF, the CSV and a script read. Codes
 * are stable; words for them are in shared/words, for the screen and the server alike.
 */
export const workingsFigure = z.enum([
  "energy",
  "volume",
  "deltaT",
  "power",
  "nightBase",
  "completeness",
]);
export type WorkingsFigure = z.infer<typeof workingsFigure>;

const source = z.object({
  instrument: z.string().nullable().describe("serial"),
  file: z.object({ id, name: z.string() }).nullable(),
  rows: z.number().int().nullable(),
  /** Where the value is neither read nor certified: assumed, worked out, from the loop's record. */
  code: z.enum(["read", "computed", "record", "assumed", "certificate"]),
});

export const workingsInput = z.object({
  symbol: z.enum([
    "flow",
    "supply",
    "return",
    "deltaT",
    "density",
    "enthalpy",
    "power",
    "pressure",
    "bore",
  ]),
  code: z.string().describe("what it is, such as flowOnReturn or supplyMeanByFlow"),
  value: z.number().nullable(),
  /** For what varies: least and greatest reading. */
  range: z.tuple([z.number(), z.number()]).nullable(),
  unit: z.string(),
  source,
});

export const workings = z.object({
  figure: workingsFigure,
  register: z.enum(["heating", "cooling"]),
  subject: z.object({
    pointId: id,
    pointCode: z.string(),
    loopId: id,
    loopTag: z.string(),
    loopName: z.string(),
    siteId: id,
    siteName: z.string(),
    zone: z.string(),
    unitSystem: z.enum(["si", "inchPound"]),
    isDemo: z.boolean(),
  }),
  from: instant,
  to: instant,
  value: z.number().nullable(),
  unit: z.enum(["kWh", "m³", "K", "kW", "%"]),
  plusMinus: plusMinus.nullable(),
  formula: z.enum([
    "sumOfSteps",
    "trapezoid",
    "heatCoefficient",
    "sumOfPower",
    "counterDifference",
    "sumOfFlow",
    "flowWeightedDeltaT",
    "meanOverWindow",
    "coveredShare",
  ]),
  meterSide: z.enum(["supply", "return"]),
  /** A rough check with a pencil: the factors multiply to `result`. */
  byHand: z
    .object({
      factors: z.array(z.object({ value: z.number(), unit: z.string(), code: z.string() })),
      result: z.number(),
      unit: z.string(),
      differencePercent: z.number().nullable(),
    })
    .nullable(),
  inputs: z.array(workingsInput),
  budget: z
    .object({
      terms: z
        .array(
          z.object({
            term: budgetTerm,
            percent: z.number().describe("standard, of the figure"),
            absolute: z.number().describe("standard, in the figure's unit"),
          }),
        )
        .describe("largest first"),
      systematicPercent: z.number(),
      randomPercent: z.number(),
      combinedPercent: z.number(),
      k: z.number(),
      expandedPercent: z.number(),
      expanded: z.number(),
      samples: z.number(),
      effectiveSamples: z.number(),
      autocorrelation: z.number(),
      /** Means the systematic terms were put to. */
      flowWeightedDeltaTK: z.number().nullable(),
      deltaTWeightedVelocityMPerS: z.number().nullable(),
      boreMm: z.number().nullable(),
    })
    .nullable()
    .describe("null where nothing can be said, with the reason among the cautions"),
  /** Installations that speak for the range; the rest of it stands on defaults. */
  installations: z.array(
    z.object({
      id,
      version: z.number().int(),
      startsAt: instant,
      endsAt: instant.nullable(),
      recordedBy: z.string(),
      flowMeterSerial: z.string().nullable(),
      supplyProbeSerial: z.string().nullable(),
      returnProbeSerial: z.string().nullable(),
      bathCheckId: id.nullable(),
      share: z.number().describe("of the figure's covered time, 0 to 1"),
      verdicts: z.array(verdict),
    }),
  ),
  rows: z.object({
    measured: z.number().int(),
    filled: z.number().int(),
    excluded: z.number().int(),
    noReading: z.number().int(),
    missing: z.number().int().nullable(),
    expected: z.number().int().nullable(),
  }),
  coverage: z.number().nullable(),
  corrections: z.array(
    correction.pick({ id: true, change: true, reason: true, appliedAt: true, appliedBy: true }),
  ),
  fills: z.array(
    fill.pick({
      id: true,
      from: true,
      to: true,
      method: true,
      heatingKwh: true,
      coolingKwh: true,
      uncertaintyPercent: true,
      state: true,
    }),
  ),
  files: z.array(
    z.object({ id, name: z.string(), sha256: z.string(), rows: z.number().int().nullable() }),
  ),
  basis: z.object({
    engineVersion: z.number().int().nullable(),
    resultId: id.nullable(),
    revision: z.number().int(),
    calculatedAt: instant.nullable(),
    pointVersion: z.string().nullable(),
    absoluteMPa: z.number(),
    pressureAssumed: z.boolean(),
    fluid,
    /** The loop's cut-offs: what falls below either counts in no register. Null: not set. */
    cutOffs: z.object({
      flowM3PerHour: z.number().nullable(),
      deltaTK: z.number().nullable(),
      suppressedKwh: z.number().describe("held back in the range"),
      suppressedS: z.number(),
      /** With two registers the cut-offs are also the band in which neither runs. */
      separatesRegisters: z.boolean(),
    }),
    meansOnly: z.boolean(),
    recalculating: z.boolean(),
  }),
  /** Published methods used, with edition: "formulas from", never a claim to comply. */
  formulasFrom: z.array(
    z.object({
      name: z.string(),
      edition: z.string(),
      forWhat: z.enum([
        "waterProperties",
        "heatCoefficient",
        "uncertainty",
        "probeClass",
        "glycolProperties",
        "meterLimits",
      ]),
    }),
  ),
  cautions: z.array(z.string()).describe("codes, such as indicativeOnly, defaultsOnly, meansOnly"),
});
export type Workings = z.infer<typeof workings>;

const pointId = z.object({ pointId: id });
const asked = z.object({
  figure: workingsFigure,
  register: z
    .enum(["heating", "cooling"])
    .optional()
    .describe("left out: the register of the loop's service"),
  from: z.union([instant, z.iso.date()]),
  to: z.union([instant, z.iso.date()]).describe("exclusive"),
});
export const getWorkings = contract({
  operationId: "getWorkings",
  summary: "How a figure came about, down to its rows",
  tag: "Workings",
  method: "get",
  path: "/points/:pointId/workings",
  params: pointId,
  query: asked,
  answer: workings,
});
export const downloadWorkingsCsv = contract({
  operationId: "downloadWorkingsCsv",
  summary: "The workings of a figure as CSV",
  tag: "Workings",
  method: "get",
  path: "/points/:pointId/workings.csv",
  params: pointId,
  query: asked,
  answer: nothing,
  answerKind: "csv",
});
export const downloadWorkingsPdf = contract({
  operationId: "downloadWorkingsPdf",
  summary: "The workings of a figure as an A4 page",
  tag: "Workings",
  method: "get",
  path: "/points/:pointId/workings.pdf",
  params: pointId,
  query: asked.extend({ language: z.enum(["en", "de"]).default("en") }),
  answer: nothing,
  answerKind: "file",
});
