import { z } from "zod";
import { contract, id, instant, nothing } from "./contract";
import { energyBasis } from "./energy";
import { occupiedHours } from "./places";
import { plusMinus } from "./plus-minus";

/*
 * The shape of a load: what a total hides. Of the register that the loop's service names; on a
 * changeover loop of the one that moved more heat. In steps of a quarter-hour, or of the log's own
 * step where that is longer. Null is unknown, never nothing.
 */
const pointId = z.object({ pointId: id });
const edge = z.union([z.iso.datetime({ offset: true }), z.iso.date()]);
const range = z.object({ from: edge, to: edge.describe("exclusive") });

const known = plusMinus.nullable().describe("null where none can be worked out");
const peak = z.object({
  from: instant,
  to: instant,
  powerKw: z.number(),
  plusMinus: known,
  loadFactor: z.number().nullable().describe("mean power over covered time / this peak"),
  fullLoadHours: z.number().nullable().describe("energy / this peak"),
});
export type ShapePeak = z.infer<typeof peak>;

const stretch = z.object({ from: instant, to: instant });

export const getPointShape = contract({
  operationId: "getPointShape",
  summary:
    "Peak demand, load factor, duration curve, temperature differences, base load and excess flow of a range",
  tag: "Energy",
  method: "get",
  path: "/points/:pointId/shape",
  params: pointId,
  query: range.extend({
    windowMinutes: z.enum(["15", "30", "60"]).default("60").describe("length of the peak"),
    hours: z.enum(["all", "unoccupied"]).default("all").describe("hours of the base load"),
    qMin: z.coerce
      .number()
      .min(0)
      .max(10_000)
      .optional()
      .describe("least flow in m3/h, instead of the one stored for the loop's pump"),
    lowDeltaTK: z.coerce
      .number()
      .gt(0)
      .max(40)
      .optional()
      .describe("limit of low temperature difference; two thirds of the design where left out"),
  }),
  answer: z.object({
    zone: z.string(),
    from: instant,
    to: instant,
    basis: energyBasis,
    register: z.enum(["heating", "cooling"]),
    stepMinutes: z.number().int(),
    windowMinutes: z.number().int(),
    coveredS: z.number(),
    expectedS: z.number(),
    energyKwh: z.number().nullable(),
    volumeM3: z.number().nullable(),
    meanKw: z.number().nullable(),
    meanPlusMinus: known,
    peaks: z.object({
      fixed: peak.nullable().describe("blocks of the wall clock"),
      rolling: peak.nullable().describe("any window of that length, from any step"),
    }),
    design: z
      .object({
        powerKw: z.number().describe("design flow at the design difference from the mean supply"),
        fullLoadHours: z.number().nullable(),
      })
      .nullable(),
    curve: z
      .array(z.object({ hours: z.number(), powerKw: z.number() }))
      .describe("hours at or above each power, from most to least; 200 points at most"),
    deltaT: z.object({
      flowWeightedK: z.number().nullable(),
      energyWeightedK: z.number().nullable(),
      timeMeanK: z.number().nullable(),
      fromEnergyK: z.number().nullable().describe("E / (k V), k at the mean temperatures"),
      plusMinus: z.object({ flowWeighted: known, energyWeighted: known, timeMean: known }),
    }),
    specificFlow: z
      .object({
        m3PerKwh: z.number(),
        litresPerSecondPerKw: z.number(),
        gpmPerTon: z.number(),
        plusMinus: known.describe("of the volume per energy; the flow's own scale cancels"),
      })
      .nullable(),
    occupiedHours: z.object({ ...occupiedHours.shape, assumed: z.boolean() }),
    baseLoad: z
      .object({
        powerKw: z.number(),
        plusMinus: known,
        percentile: z.number(),
        hours: z.enum(["all", "unoccupied"]),
        steps: z.number().int(),
      })
      .nullable(),
    offHours: z.object({
      energyShare: z.number().nullable().describe("of all energy, 0 to 1"),
      energyKwh: z.number().nullable(),
      dayOffRatio: z
        .number()
        .nullable()
        .describe("mean power of days without occupied hours / of days with"),
    }),
    pumpWithoutDeltaT: z
      .object({
        limitK: z.number(),
        seconds: z.number(),
        runs: z.array(stretch).describe("the longest, in order of time"),
        runCount: z.number().int(),
      })
      .nullable(),
    lowDeltaT: z
      .object({ limitK: z.number(), seconds: z.number() })
      .nullable()
      .describe("time with flow below the limit; null without a limit"),
    excess: z
      .object({
        designDeltaTK: z.number(),
        minimumFlowM3PerHour: z.number().nullable(),
        volumeM3: z.number(),
        idealVolumeM3: z.number(),
        excessShare: z.number().nullable().describe("volume / ideal volume - 1"),
        leftOutS: z.number(),
      })
      .nullable()
      .describe("null without a design difference"),
    pumping: z
      .object({
        energyKwh: z.number(),
        idealEnergyKwh: z.number(),
        excessKwh: z.number(),
        kwhPerMwh: z.number().nullable().describe("electricity for each MWh of heat"),
        cubeLawHolds: z.boolean().describe("false where part of the head stays whatever the flow"),
        pricePerKwh: z.string().nullable(),
        currency: z.string(),
        excessCost: z.number().nullable(),
      })
      .nullable()
      .describe("null without the pump's curve"),
  }),
});
export type PointShape = z.infer<(typeof getPointShape)["answer"]>;

export const downloadDurationCurve = contract({
  operationId: "downloadDurationCurve",
  summary: "The duration curve as CSV, every step, from most power to least",
  tag: "Energy",
  method: "get",
  path: "/points/:pointId/duration.csv",
  params: pointId,
  query: range,
  answer: nothing,
  answerKind: "csv",
});

// A loop's pump -------------------------------------------------------------------------------
const loopId = z.object({ loopId: id });
const decimalPrice = z
  .string()
  .regex(/^\d{1,5}(\.\d{1,6})?$/, "a price with a decimal point, such as 0.187");
const pumpFields = z.object({
  controlledHead: z
    .boolean()
    .describe("part of the head stays whatever the flow: lift, or a head that a control holds"),
  staticHeadM: z.number().min(0).max(500).nullable().describe("that part; null without it"),
  designHeadM: z.number().gt(0).max(500).nullable(),
  designFlowM3PerHour: z.number().gt(0).max(10_000).nullable(),
  efficiency: z.number().gt(0).max(1).nullable().describe("pump, motor and drive together"),
  minimumFlowM3PerHour: z.number().min(0).max(10_000).nullable(),
  pricePerKwh: decimalPrice.nullable().describe("of electricity, in the site's currency"),
});
export type PumpFields = z.infer<typeof pumpFields>;
const pumpAnswer = z.object({
  pump: pumpFields.nullable(),
  currency: z.string(),
  can: z.object({ edit: z.boolean() }),
});

export const getLoopPump = contract({
  operationId: "getLoopPump",
  summary: "The pump of a loop",
  tag: "Places",
  method: "get",
  path: "/loops/:loopId/pump",
  params: loopId,
  answer: pumpAnswer,
});
export const saveLoopPump = contract({
  operationId: "saveLoopPump",
  summary: "Set the pump of a loop",
  tag: "Places",
  method: "put",
  path: "/loops/:loopId/pump",
  params: loopId,
  body: pumpFields,
  answer: pumpAnswer,
});
export const removeLoopPump = contract({
  operationId: "removeLoopPump",
  summary: "Forget the pump of a loop",
  tag: "Places",
  method: "delete",
  path: "/loops/:loopId/pump",
  params: loopId,
  answer: nothing,
});
