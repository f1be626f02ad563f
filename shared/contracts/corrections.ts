import { z } from "zod";
import { contract, id, instant, oneLine } from "./contract";
import { fluid } from "./places";

/*
 * Corrections of readings: reversible, listed, attributed, dated, with a reason, each with its effect
 * in kWh known before it is applied. Stored readings never change; a correction is put on when they
 * are read. Spans are half-open; `to: null` is open.
 */
const span = { from: instant, to: instant.nullable() };
const channel = z.enum(["flow", "supply", "return", "power"]);

export const correctionChange = z.discriminatedUnion("kind", [
  z.object({
    kind: z.literal("exclude"),
    ...span,
    /** Only rows that meet it; null excludes the whole span. */
    rule: z
      .object({
        channel: z.enum(["flow", "supply", "return", "power", "deltaT", "signal"]),
        is: z.enum(["below", "above"]),
        value: z
          .number()
          .describe("m³/h, °C, kW, K or %; ΔT and power by size, power a meter's own"),
      })
      .nullable(),
    parts: z
      .array(z.object({ from: instant, to: instant }))
      .min(1)
      .max(5000)
      .optional()
      .describe("only these stretches of the span, ascending; the whole span where left out"),
  }),
  z.object({
    kind: z.literal("clock"),
    logFileId: id,
    /** t′ = t + offset + drift·(t − reference): what to add to the logger's time. */
    offsetS: z
      .number()
      .min(-86_400 * 366)
      .max(86_400 * 366),
    driftSPerDay: z.number().min(-3600).max(3600),
    referenceAt: instant.describe("as the logger's clock had it"),
  }),
  z.object({
    kind: z.literal("probeOffset"),
    probeId: id.describe("the offset follows the probe, whichever pipe it is on"),
    ...span,
    addK: z.number().min(-10).max(10).describe("added to what the probe read"),
    bathCheckId: id.nullable(),
  }),
  z.object({
    kind: z.literal("swapSides"),
    ...span,
    swapped: z
      .enum(["probes", "channels"])
      .default("probes")
      .describe(
        "probes: they sat on the other pipes than recorded, so a probe's offset goes to the other side with its readings; channels: the log named them the wrong way round, the probes were where they were recorded",
      ),
  }),
  z.object({ kind: z.literal("flipFlow"), ...span }),
  z.object({
    kind: z.literal("scaleByBore"),
    ...span,
    enteredBoreMm: z.number().min(10).max(1300),
    trueBoreMm: z.number().min(10).max(1300).describe("flow × (true / entered)²"),
  }),
  z.object({
    kind: z.literal("unit"),
    logFileId: id,
    channel,
    unit: z.string().max(20).describe("the unit the numbers are really in"),
  }),
  z.object({ kind: z.literal("fluid"), ...span, fluid }),
  z.object({
    kind: z.literal("split"),
    at: instant.describe(
      "the first instant of the later part; nothing is joined or averaged across",
    ),
  }),
]);
export type CorrectionChange = z.infer<typeof correctionChange>;

const registers = z.object({ heatingKwh: z.number(), coolingKwh: z.number() });
export const correctionEffect = z.object({
  from: instant,
  to: instant,
  before: registers,
  after: registers,
  /** Null in effects worked out before volume was part of them. */
  volume: z.object({ beforeM3: z.number(), afterM3: z.number() }).nullable().default(null),
  rowsChanged: z.number().int(),
});
export type CorrectionEffect = z.infer<typeof correctionEffect>;

export const correction = z.object({
  id,
  pointId: id.nullable().describe("null for a probe's offset, which may touch several points"),
  importId: id
    .nullable()
    .describe("the import whose checks it was chosen in; undoing that import withdraws it"),
  points: z.array(z.object({ id, code: z.string(), loopTag: z.string() })),
  change: correctionChange,
  reason: z.string(),
  /** `working`: its effect is being worked out; `proposed`: known, not applied. */
  state: z.enum(["working", "proposed", "applied", "withdrawn", "failed"]),
  effect: correctionEffect.nullable(),
  volumePercent: z
    .number()
    .nullable()
    .describe(
      "expanded (k = 2): how well the volume of the effect's days is known; null where unknown or unchanged",
    ),
  failure: z.object({ code: z.string(), message: z.string(), remedy: z.string() }).nullable(),
  createdAt: instant,
  createdBy: z.string(),
  appliedAt: instant.nullable(),
  appliedBy: z.string().nullable(),
  withdrawnAt: instant.nullable(),
  withdrawnBy: z.string().nullable(),
  withdrawnReason: z.string().nullable(),
  can: z.object({ apply: z.boolean(), withdraw: z.boolean() }),
});
export type Correction = z.infer<typeof correction>;

const pointId = z.object({ pointId: id });
const correctionId = z.object({ correctionId: id });
export const listCorrections = contract({
  operationId: "listCorrections",
  summary: "Corrections of a point's readings, newest first, withdrawn ones included",
  tag: "Corrections",
  method: "get",
  path: "/points/:pointId/corrections",
  params: pointId,
  answer: z.object({ items: z.array(correction), can: z.object({ create: z.boolean() }) }),
});
export const proposeCorrection = contract({
  operationId: "proposeCorrection",
  summary: "Propose a correction; its effect is worked out before it can be applied",
  tag: "Corrections",
  method: "post",
  path: "/points/:pointId/corrections",
  params: pointId,
  body: z.object({ change: correctionChange, reason: oneLine(300) }),
  answer: correction,
});
export const getCorrection = contract({
  operationId: "getCorrection",
  summary: "One correction",
  tag: "Corrections",
  method: "get",
  path: "/corrections/:correctionId",
  params: correctionId,
  answer: correction,
});
export const applyCorrection = contract({
  operationId: "applyCorrection",
  summary: "Apply a proposed correction; the energy is worked out anew in the background",
  tag: "Corrections",
  method: "post",
  path: "/corrections/:correctionId/application",
  params: correctionId,
  answer: correction,
});
export const withdrawCorrection = contract({
  operationId: "withdrawCorrection",
  summary: "Withdraw a correction; the readings count as before and it stays in the list",
  tag: "Corrections",
  method: "post",
  path: "/corrections/:correctionId/withdrawal",
  params: correctionId,
  body: z.object({ reason: oneLine(300) }),
  answer: correction,
});

// Fills ---------------------------------------------------------------------------------------
/** A proposal for time without readings, kept apart from what was measured. */
export const fillMethod = z.enum(["interpolation", "likeDays", "otherPoint"]);
export const fill = z.object({
  id,
  pointId: id,
  from: instant,
  to: instant,
  method: fillMethod,
  otherPointId: id.nullable(),
  reason: z.string(),
  heatingKwh: z.number(),
  coolingKwh: z.number(),
  volumeM3: z.number().nullable(),
  /** Time of the span that readings do not cover, which is what is filled. */
  filledS: z.number(),
  uncertaintyPercent: z.number().describe("standard, of the filled energy"),
  days: z.array(z.iso.date()).describe("like days it was taken from"),
  state: z.enum(["proposed", "approved", "withdrawn"]),
  createdAt: instant,
  createdBy: z.string(),
  approvedAt: instant.nullable(),
  approvedBy: z.string().nullable(),
  withdrawnAt: instant.nullable(),
  can: z.object({ approve: z.boolean(), withdraw: z.boolean() }),
});
export type Fill = z.infer<typeof fill>;
const fillId = z.object({ fillId: id });
export const listFills = contract({
  operationId: "listFills",
  summary: "Fills of a point, newest first",
  tag: "Corrections",
  method: "get",
  path: "/points/:pointId/fills",
  params: pointId,
  answer: z.object({ items: z.array(fill), can: z.object({ create: z.boolean() }) }),
});
export const proposeFill = contract({
  operationId: "proposeFill",
  summary: "Propose a fill for a gap: interpolation up to an hour, like days, or another point",
  tag: "Corrections",
  method: "post",
  path: "/points/:pointId/fills",
  params: pointId,
  body: z.object({
    from: instant,
    to: instant,
    method: fillMethod,
    otherPointId: id.optional(),
    reason: oneLine(300),
  }),
  answer: fill,
});
export const approveFill = contract({
  operationId: "approveFill",
  summary: "Approve a fill for use beside the measured energy",
  tag: "Corrections",
  method: "post",
  path: "/fills/:fillId/approval",
  params: fillId,
  answer: fill,
});
export const withdrawFill = contract({
  operationId: "withdrawFill",
  summary: "Withdraw a fill",
  tag: "Corrections",
  method: "post",
  path: "/fills/:fillId/withdrawal",
  params: fillId,
  answer: fill,
});

// Results -------------------------------------------------------------------------------------
/** One state of a point's energy: what it came from and what it said by day. */
export const energyResult = z.object({
  id,
  revision: z.number().int(),
  calculatedAt: instant,
  cause: z.enum([
    "import",
    "undo",
    "correction",
    "withdrawal",
    "pointChanged",
    "loopChanged",
    "engineChanged",
    "other",
  ]),
  isCurrent: z.boolean(),
  engineVersion: z.number().int(),
  point: z.object({
    meterSide: z.enum(["supply", "return"]),
    version: z.string().describe("changes with whatever of point and loop the energy depends on"),
  }),
  loop: z.object({
    service: z.enum(["chilled", "hot", "changeover"]),
    fluid,
    absoluteMPa: z.number(),
    pressureAssumed: z.boolean(),
    flowCutOffM3PerHour: z.number().nullable(),
    deltaTCutOffK: z.number().nullable(),
  }),
  files: z.array(z.object({ id, name: z.string(), sha256: z.string(), rows: z.number().int() })),
  corrections: z.array(z.object({ id, kind: z.string() })),
  heatingKwh: z.number().nullable(),
  coolingKwh: z.number().nullable(),
});
export type EnergyResult = z.infer<typeof energyResult>;
export const listEnergyResults = contract({
  operationId: "listEnergyResults",
  summary: "Every state a point's energy has had, newest first",
  tag: "Corrections",
  method: "get",
  path: "/points/:pointId/results",
  params: pointId,
  answer: z.object({ items: z.array(energyResult) }),
});
export const getEnergyResult = contract({
  operationId: "getEnergyResult",
  summary: "An earlier state of a point's energy, by local day",
  tag: "Corrections",
  method: "get",
  path: "/results/:resultId",
  params: z.object({ resultId: id }),
  answer: z.object({
    result: energyResult,
    days: z.array(
      z.object({
        date: z.iso.date(),
        heatingKwh: z.number(),
        coolingKwh: z.number(),
        volumeM3: z.number(),
        coveredS: z.number(),
      }),
    ),
  }),
});
