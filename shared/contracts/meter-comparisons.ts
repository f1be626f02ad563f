import { z } from "zod";
import { REGISTER_PROBLEMS } from "../domain/readings/register-advance";
import { AGREEMENT_CODES, STAND_IN_CODES } from "../domain/uncertainty/codes";
import { UNDECIDED_REASONS } from "../domain/uncertainty/compare-meters";
import { contract, id, instant, nothing, oneLine, page, pageQuery } from "./contract";

/*
 * Two meters over one period of a site, and energy that stands in for a meter that was away. What is
 * saved never changes: a corrected one supersedes it, and it can be withdrawn with a reason.
 */
const percent = z.number().gt(0).max(100).describe("expanded (k = 2), %");
const read = z.number().min(0).max(1e12);

const reads = {
  opening: read,
  closing: read,
  multiplier: z.number().gt(0).max(1e6).default(1),
  digits: z
    .number()
    .int()
    .min(1)
    .max(12)
    .nullable()
    .default(null)
    .describe("places before the decimal mark; needed where the register rolled over"),
  rolledOver: z
    .boolean()
    .default(false)
    .describe("somebody says it passed its highest read once; a fall is never taken by its size"),
};
export const energyRegister = z.object({
  ...reads,
  unit: z.enum(["kWh", "MWh", "MJ", "GJ", "kBtu", "MMBtu", "ton-h"]).default("kWh"),
});
export const volumeRegister = z.object({
  ...reads,
  unit: z.enum(["m3", "L", "US gal", "ft3"]).default("m3"),
});
export const registerProblem = z.enum(REGISTER_PROBLEMS);

/** How well a meter's figures are known: by its class, or as somebody states. */
export const meterClaim = z.discriminatedUnion("kind", [
  z.object({
    kind: z.literal("class"),
    meterClass: z.union([z.literal(1), z.literal(2), z.literal(3)]),
    flowRatio: z.number().gt(0).max(2).describe("mean flow ÷ permanent flow q_p"),
    meanDeltaTK: z.number().gt(0).max(150).describe("the mean ΔT the limits are put to, K"),
    deltaTMinK: z.number().gt(0).max(20).default(3).describe("least ΔT the meter is made for, K"),
    flowCapPercent: z
      .union([z.literal(3.5), z.literal(5)])
      .default(5)
      .describe("most the flow part may be, %: some editions cap class 1 at 3.5"),
  }),
  z.object({
    kind: z.literal("stated"),
    expandedPercent: percent.nullable().describe("of energy; null: nobody states one"),
    volumePercent: percent.nullable().default(null),
    deltaTPercent: percent.nullable().default(null),
  }),
]);
export type MeterClaim = z.infer<typeof meterClaim>;

export const meterSide = z.discriminatedUnion("kind", [
  z.object({
    kind: z.literal("point"),
    pointId: id,
    register: z.enum(["heating", "cooling"]),
    claim: meterClaim
      .nullable()
      .default(null)
      .describe("of a permanent meter logged here; null: the ± of the point's evidence"),
  }),
  z.object({
    kind: z.literal("register"),
    serial: oneLine(60).describe("as on the plate"),
    energy: energyRegister,
    volume: volumeRegister.nullable().default(null),
    deltaTK: z
      .number()
      .gt(0)
      .max(150)
      .nullable()
      .default(null)
      .describe("mean ΔT of the period as this meter itself gives it; null where it does not"),
    claim: meterClaim,
  }),
  z.object({
    kind: z.literal("typed"),
    name: oneLine(60),
    energyKwh: z.number().min(0).max(1e12),
    expandedPercent: percent.nullable(),
    volumeM3: z.number().min(0).max(1e12).nullable().default(null),
    volumePercent: percent.nullable().default(null),
    deltaTK: z.number().gt(0).max(150).nullable().default(null),
    deltaTPercent: percent.nullable().default(null),
  }),
]);
export type MeterSide = z.infer<typeof meterSide>;

export const standInInput = z.object({
  outageHours: z.number().gt(0).max(100_000),
  coveredHours: z.number().min(0).max(100_000),
  coveredKwh: z.number().min(0).max(1e12),
  coveredPercent: percent.nullable().default(null),
  degreeHours: z
    .object({ covered: z.number().min(0).max(1e7), missing: z.number().min(0).max(1e7) })
    .nullable()
    .default(null)
    .describe("K·h; null: hours alone scale the estimate"),
  estimatePercent: percent.nullable().default(null).describe("how well the estimate is known"),
  consentBy: oneLine(120)
    .nullable()
    .default(null)
    .describe("who agreed that substituted energy may be billed; null: nobody yet"),
});
export type StandInInput = z.infer<typeof standInInput>;

const meterComparisonInput = z.object({
  title: oneLine(120),
  from: z.union([instant, z.iso.date()]),
  to: z.union([instant, z.iso.date()]).describe("exclusive; dates are days of the site's zone"),
  first: meterSide.describe("the meter in question, such as the portable one"),
  second: meterSide.describe("what it is compared with, such as the permanent one"),
  standIn: standInInput.nullable().default(null),
  notes: z.string().trim().max(2000).nullable().default(null),
});
export type MeterComparisonInput = z.output<typeof meterComparisonInput>;
export type MeterComparisonBody = z.input<typeof meterComparisonInput>;

// What comes of it --------------------------------------------------------------------------
const known = z.object({
  value: z.number(),
  expanded: z.number().nullable().describe("in the figure's unit, k = 2"),
  percent: z.number().nullable(),
});
export type KnownFigure = z.infer<typeof known>;

const figureAgreement = z.object({
  difference: z.number().describe("first − second"),
  differencePercent: z.number().nullable().describe("of the second"),
  en: z.number().nullable(),
  code: z.enum(AGREEMENT_CODES),
  ratio: z
    .object({ value: z.number(), expanded: z.number().nullable() })
    .nullable()
    .describe("first ÷ second with its interval, k = 2"),
});
export type FigureAgreement = z.infer<typeof figureAgreement>;

const classLimits = z.object({
  meterClass: z.number().int(),
  flowRatio: z.number(),
  meanDeltaTK: z.number(),
  deltaTMinK: z.number(),
  flowCapPercent: z.number(),
  flowPercent: z.number(),
  pairPercent: z.number(),
  calculatorPercent: z.number(),
  totalPercent: z.number().describe("greatest error allowed, ±%"),
  expandedPercent: z.number().describe("2 × total ÷ √3"),
});

const comparedSide = z.object({
  kind: z.enum(["point", "register", "typed"]),
  name: z.string(),
  energyKwh: known,
  volumeM3: known.nullable(),
  deltaTK: known.nullable(),
  limits: classLimits.nullable().describe("where its ± comes from its class"),
  point: z
    .object({
      pointId: id,
      pointCode: z.string(),
      loopId: id,
      loopTag: z.string(),
      register: z.enum(["heating", "cooling"]),
      coverage: z.number().describe("share of the period with readings, 0 to 1"),
      basis: z.enum(["evidence", "partlyDefaults", "defaults"]).nullable(),
      revision: z.number().int().describe("state of the point's readings it was worked out from"),
    })
    .nullable(),
});
export type ComparedSide = z.infer<typeof comparedSide>;

const flowBand = z.object({
  fromM3PerHour: z.number(),
  toM3PerHour: z.number().nullable().describe("exclusive; null: no upper end"),
  quarterHours: z.number().int(),
  first: known,
  second: known,
  agreement: figureAgreement,
});
export type FlowBandAnswer = z.infer<typeof flowBand>;

const standInPart = z.object({
  code: z.enum(STAND_IN_CODES),
  energyKwh: z.number(),
  expandedKwh: z.number().nullable(),
  hours: z.number(),
});
export const standInResult = z.object({
  parts: z.array(standInPart).describe("never added without their labels"),
  totalKwh: z.number(),
  expandedKwh: z.number().nullable(),
  estimatedPercent: z.number().nullable().describe("of the total"),
});
export type StandInResult = z.infer<typeof standInResult>;

export const comparisonCaution = z.enum([
  "indicative",
  "periodUnder24h",
  "oneLoadOnly",
  "partsNotCompared",
  "classAssumesWithinLimits",
  "deltaTBelowMinimum",
  "rolloverAsStated",
  "commonTimeOnly",
  "coverageBelow99",
  "coverageBelow95",
  "defaultsOnly",
  "recalculating",
  "consentMissing",
  "consentRecorded",
]);
export type ComparisonCaution = z.infer<typeof comparisonCaution>;

export const meterComparisonResult = z.object({
  hours: z.number(),
  first: comparedSide,
  second: comparedSide,
  energy: figureAgreement,
  volume: figureAgreement.nullable(),
  deltaT: figureAgreement.nullable(),
  verdict: z.enum(AGREEMENT_CODES),
  because: z.array(z.enum(UNDECIDED_REASONS)).describe("why nothing can be said"),
  errorsCancel: z.boolean().describe("energy agrees while volume or ΔT does not"),
  byFlow: z
    .object({
      quarterHours: z.number().int().describe("with readings of both"),
      bands: z.array(flowBand),
      compensating: z.boolean(),
      line: z
        .object({ slope: z.number(), intercept: z.number() })
        .nullable()
        .describe("first flow = intercept + slope · second flow, m³/h by quarter-hour"),
    })
    .nullable()
    .describe("two metering points only"),
  standIn: standInResult.nullable(),
  cautions: z.array(comparisonCaution),
});
export type MeterComparisonResult = z.infer<typeof meterComparisonResult>;

const about = {
  id,
  siteId: id,
  siteName: z.string(),
  zone: z.string(),
  title: z.string(),
  from: instant,
  to: instant,
  recordedAt: instant,
  recordedBy: z.string(),
  state: z.enum(["stands", "superseded", "withdrawn"]),
};
export const meterComparisonLine = z.object({
  ...about,
  first: z.object({ name: z.string(), energyKwh: known }),
  second: z.object({ name: z.string(), energyKwh: known }),
  verdict: z.enum(AGREEMENT_CODES),
  errorsCancel: z.boolean(),
  en: z.number().nullable(),
  hasStandIn: z.boolean(),
});
export type MeterComparisonLine = z.infer<typeof meterComparisonLine>;

export const meterComparison = z.object({
  ...about,
  input: meterComparisonInput,
  result: meterComparisonResult,
  notes: z.string().nullable(),
  readingsChanged: z
    .boolean()
    .describe("a point's energy was worked out anew since, so it may come out otherwise now"),
  supersedesId: id.nullable(),
  supersededById: id.nullable(),
  withdrawnAt: instant.nullable(),
  withdrawnBy: z.string().nullable(),
  withdrawnReason: z.string().nullable(),
  can: z.object({ edit: z.boolean() }),
});
export type MeterComparison = z.infer<typeof meterComparison>;

const siteId = z.object({ siteId: id });
const meterComparisonId = z.object({ meterComparisonId: id });
export const listMeterComparisons = contract({
  operationId: "listMeterComparisons",
  summary: "Comparisons of two meters, newest first",
  tag: "Comparisons",
  method: "get",
  path: "/meter-comparisons",
  query: pageQuery.extend({
    siteId: id.optional(),
    superseded: z.stringbool().default(false).describe("superseded and withdrawn ones too"),
  }),
  answer: page(meterComparisonLine).extend({ can: z.object({ create: z.boolean() }) }),
});
export const tryMeterComparison = contract({
  operationId: "tryMeterComparison",
  summary: "What a comparison would come to; nothing is kept",
  tag: "Comparisons",
  method: "post",
  path: "/sites/:siteId/meter-comparisons/trial",
  params: siteId,
  body: meterComparisonInput,
  answer: meterComparisonResult,
});
export const createMeterComparison = contract({
  operationId: "createMeterComparison",
  summary: "Save a comparison; with `supersedes`, in the place of another",
  tag: "Comparisons",
  method: "post",
  path: "/sites/:siteId/meter-comparisons",
  params: siteId,
  body: meterComparisonInput.extend({ supersedes: id.optional() }),
  answer: meterComparison,
});
export const getMeterComparison = contract({
  operationId: "getMeterComparison",
  summary: "A saved comparison, as it was worked out when it was saved",
  tag: "Comparisons",
  method: "get",
  path: "/meter-comparisons/:meterComparisonId",
  params: meterComparisonId,
  answer: meterComparison,
});
export const withdrawMeterComparison = contract({
  operationId: "withdrawMeterComparison",
  summary: "Take a comparison out of use; it stays readable with the reason",
  tag: "Comparisons",
  method: "post",
  path: "/meter-comparisons/:meterComparisonId/withdrawal",
  params: meterComparisonId,
  body: z.object({ reason: oneLine(300) }),
  answer: meterComparison,
});
export const downloadMeterComparison = contract({
  operationId: "downloadMeterComparison",
  summary: "A saved comparison as CSV",
  tag: "Comparisons",
  method: "get",
  path: "/meter-comparisons/:meterComparisonId/comparison.csv",
  params: meterComparisonId,
  answer: nothing,
  answerKind: "csv",
});
