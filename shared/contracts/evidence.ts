import { z } from "zod";
import { BUDGET_TERM_KINDS } from "../domain/uncertainty/point-evidence";
import { contract, id, instant, oneLine, page, pageQuery } from "./contract";
import { loopService } from "./places";

/*
 * The evidence behind a point's figures: instruments with their certificates, same-bath checks of
 * probe pairs, and installations. An installation is dated, belongs to one point, and is superseded
 * rather than overwritten, so that every earlier figure keeps the evidence it had.
 */
const day = z.iso.date();
const notes = z.string().trim().max(2000).nullable();
const serial = oneLine(60).describe("as on the plate");

// Instruments ---------------------------------------------------------------------------------
export const instrumentKind = z.enum([
  "flowMeter",
  "probe",
  "logger",
  "permanentMeter",
  "referenceThermometer",
  "thicknessGauge",
]);
export type InstrumentKind = z.infer<typeof instrumentKind>;

const certificateFields = z.object({
  number: oneLine(80),
  laboratory: oneLine(120).nullable(),
  accredited: z.boolean().nullable(),
  issuedOn: day,
  dueOn: day.nullable(),
  /** Expanded uncertainty: % of flow for flow meters, K for thermometers, mm for gauges. */
  expanded: z.number().gt(0).max(100),
  k: z.number().min(1).max(4).default(2),
});
export const certificateState = z
  .enum(["inDate", "dueSoon", "lapsed", "openEnded"])
  .describe("dueSoon: within 30 days; openEnded: it names no day to be renewed by");
export type CertificateState = z.infer<typeof certificateState>;
export const certificate = certificateFields.extend({
  id,
  state: certificateState,
  recordedBy: z.string(),
  withdrawnAt: instant.nullable(),
  withdrawnReason: z.string().nullable(),
});
export type Certificate = z.infer<typeof certificate>;
const instrumentFields = z.object({
  kind: instrumentKind,
  serial,
  label: oneLine(40).nullable().describe("what people here call it, such as FM-05"),
  make: oneLine(120).nullable().describe("maker and model, as the user writes it"),
  range: oneLine(80).nullable().describe("what it may be used for, such as DN 50 to 200"),
  probeClass: z.enum(["AA", "A", "B"]).nullable().describe("IEC 60751 class, probes only"),
  outOfService: oneLine(200).nullable().describe("why it must not be used; null while it may"),
  notes,
});
/** A point an instrument was or is installed on. */
export const placement = z.object({
  installationId: id,
  siteId: id,
  siteName: z.string(),
  loopId: id,
  loopTag: z.string(),
  service: loopService,
  pointId: id,
  pointCode: z.string(),
  zone: z.string(),
  startsAt: instant,
  endsAt: instant.nullable().describe("null while it is there"),
});
export type Placement = z.infer<typeof placement>;
export const instrument = instrumentFields.extend({
  id,
  certificates: z.array(certificate).describe("newest first; withdrawn ones last"),
  /** What its calibration comes to today; `none` where no certificate counts. */
  calibration: z.enum([...certificateState.options, "none"]),
  placements: z.array(placement).describe("newest first"),
  archivedAt: instant.nullable(),
  can: z.object({ edit: z.boolean() }),
});
export type Instrument = z.infer<typeof instrument>;
const instrumentId = z.object({ instrumentId: id });

export const listInstruments = contract({
  operationId: "listInstruments",
  summary: "Instruments of the organisation with their certificates",
  tag: "Evidence",
  method: "get",
  path: "/instruments",
  query: pageQuery.extend({
    kind: instrumentKind.optional(),
    archived: z.stringbool().default(false).describe("archived ones too"),
  }),
  answer: page(instrument).extend({
    today: day.describe("the day calibration is judged by, UTC"),
    can: z.object({ create: z.boolean() }),
  }),
});
export const createInstrument = contract({
  operationId: "createInstrument",
  summary: "Add an instrument; its serial is unique within its kind",
  tag: "Evidence",
  method: "post",
  path: "/instruments",
  body: instrumentFields.partial().required({ kind: true, serial: true }),
  answer: instrument,
});
export const getInstrument = contract({
  operationId: "getInstrument",
  summary: "One instrument",
  tag: "Evidence",
  method: "get",
  path: "/instruments/:instrumentId",
  params: instrumentId,
  answer: instrument,
});
export const updateInstrument = contract({
  operationId: "updateInstrument",
  summary: "Change an instrument",
  tag: "Evidence",
  method: "patch",
  path: "/instruments/:instrumentId",
  params: instrumentId,
  body: instrumentFields
    .omit({ kind: true })
    .partial()
    .extend({ archived: z.boolean().optional() }),
  answer: instrument,
});
export const addCertificate = contract({
  operationId: "addCertificate",
  summary: "Record a certificate of an instrument",
  tag: "Evidence",
  method: "post",
  path: "/instruments/:instrumentId/certificates",
  params: instrumentId,
  body: certificateFields.partial({ laboratory: true, accredited: true, dueOn: true }),
  answer: instrument,
});
export const withdrawCertificate = contract({
  operationId: "withdrawCertificate",
  summary: "Take a certificate out of use; it stays readable",
  tag: "Evidence",
  method: "post",
  path: "/certificates/:certificateId/withdrawal",
  params: z.object({ certificateId: id }),
  body: z.object({ reason: oneLine(300) }),
  answer: instrument,
});

// Same-bath checks ----------------------------------------------------------------------------
const bathC = z.number().min(-50).max(200);
const bathReading = z.object({ firstC: bathC, secondC: bathC });
const bathCheckFields = z.object({
  firstProbeId: id,
  secondProbeId: id,
  checkedOn: day,
  /** Standard uncertainty the bath itself leaves: its gradient and the reading of it, K. */
  bathUncertaintyK: z.number().min(0).max(1).default(0.01),
  notes,
});
export const bathCheck = bathCheckFields.extend({
  id,
  firstSerial: serial,
  secondSerial: serial,
  readings: z.array(bathReading),
  bathC: z.number(),
  pairs: z.number().int(),
  meanDifferenceK: z.number().describe("first − second"),
  deviationK: z.number(),
  residualK: z.number().describe("standard uncertainty of the pair after the check"),
  driftK: z.number().nullable().describe("against the check before; null with one"),
  verdicts: z.array(
    z.object({
      code: z.string(),
      weight: z.enum(["fine", "look", "stop"]),
      values: z.record(z.string(), z.union([z.string(), z.number()])),
    }),
  ),
  replacesId: id.nullable(),
  supersededAt: instant.nullable().describe("set where another check stands in its place"),
  recordedAt: instant,
  recordedBy: z.string(),
  can: z.object({ edit: z.boolean() }),
});
export type BathCheck = z.infer<typeof bathCheck>;

export const listBathChecks = contract({
  operationId: "listBathChecks",
  summary: "Same-bath checks, newest first",
  tag: "Evidence",
  method: "get",
  path: "/bath-checks",
  query: pageQuery.extend({
    probeId: id.optional(),
    superseded: z.stringbool().default(false).describe("replaced ones too"),
  }),
  answer: page(bathCheck).extend({ can: z.object({ create: z.boolean() }) }),
});
export const createBathCheck = contract({
  operationId: "createBathCheck",
  summary: "Record a same-bath check of two probes from its paired readings",
  tag: "Evidence",
  method: "post",
  path: "/bath-checks",
  body: bathCheckFields.partial({ bathUncertaintyK: true, notes: true }).extend({
    readings: z.array(bathReading).min(2).max(500).describe("ten or more are asked for"),
    replaces: id.optional().describe("the check this one corrects; it stays readable"),
  }),
  answer: bathCheck,
});
export const getBathCheck = contract({
  operationId: "getBathCheck",
  summary: "One same-bath check",
  tag: "Evidence",
  method: "get",
  path: "/bath-checks/:bathCheckId",
  params: z.object({ bathCheckId: id }),
  answer: bathCheck,
});

// Installations -------------------------------------------------------------------------------
export const fitting = z.enum([
  "none",
  "bend",
  "twoBendsInPlane",
  "twoBendsOutOfPlane",
  "tee",
  "reducer",
  "valveOpen",
  "valveThrottled",
  "pump",
]);
const probeOnPipe = z.object({
  probeId: id,
  mounting: z.enum(["pocket", "surface"]),
  depthMm: z.number().min(20).max(300).nullable(),
  insulated: z.boolean(),
});
/** What a permanent heat meter's plate says; EN 1434 classes. */
const meterPlate = z.object({
  accuracyClass: z.union([z.literal(1), z.literal(2), z.literal(3)]),
  permanentFlowM3PerHour: z.number().gt(0).max(10_000).nullable().default(null).describe("q_p"),
  minimumDeltaTK: z
    .number()
    .gt(0)
    .max(20)
    .nullable()
    .default(null)
    .describe("least ΔT it is made for, K"),
  certificate: z
    .object({
      number: oneLine(60),
      expandedPercent: z.number().gt(0).max(100).describe("of energy"),
      k: z.number().min(1).max(4).default(2),
    })
    .nullable()
    .default(null)
    .describe("of this very meter; counts before the class"),
});
const probeInDocument = probeOnPipe.omit({ probeId: true });
export const installationFields = z.object({
  /** From when this evidence speaks for the point's readings; the end is open or the next one's start. */
  startsAt: instant,
  endsAt: instant.nullable(),
  flowMeterId: id.nullable(),
  loggerId: id.nullable(),
  flowDriftPercent: z.number().min(0).max(10).nullable(),
  flowStepLPerS: z.number().min(0).max(100).nullable(),
  pipe: z
    .object({
      circumferenceMm: z.number().min(45).max(4100).nullable(),
      outsideDiameterMm: z.number().min(15).max(1300).nullable(),
      wallReadingsMm: z.array(z.number().min(0.5).max(40)).min(1).max(24),
      liningMm: z.number().min(0).max(25),
      outsideDiameterUncertaintyMm: z.number().gt(0).max(10).default(0.2),
      gaugeUncertaintyMm: z.number().gt(0).max(2).default(0.05),
    })
    .nullable(),
  /** Where a permanent meter gives power or energy by itself; records from before have none. */
  meterPlate: meterPlate.nullable().default(null),
  /** The bore typed into the flow meter; null where the meter shows water speed only or nobody looked. */
  enteredBoreMm: z.number().min(10).max(1300).nullable(),
  straightRun: z
    .object({
      upstreamM: z.number().min(0).max(500),
      downstreamM: z.number().min(0).max(500),
      nearestFitting: fitting,
    })
    .nullable(),
  zero: z
    .object({
      flowStopped: z.boolean(),
      readingMPerS: z.number().min(-1).max(1).nullable(),
      remainingMPerS: z.number().min(0).max(1).nullable(),
      action: z.enum(["none", "setOnMeter", "corrected"]),
    })
    .nullable(),
  /** What the meter shows with water moving as usual: for the checks of speed and Reynolds number. */
  shownFlowLPerS: z.number().min(-10_000).max(10_000).nullable(),
  soundSpeed: z
    .object({
      displayedMPerS: z.number().min(1000).max(2000),
      fluidC: z.number().min(-20).max(150),
    })
    .nullable(),
  remountPercent: z.number().min(0).max(50).nullable(),
  probes: z.object({ supply: probeOnPipe, return: probeOnPipe }).nullable(),
  mountingK: z.number().min(0).max(10).nullable(),
  temperatureStepK: z.number().min(0).max(5).nullable(),
  /** Null: the newest standing check of the two probes at the installation's start. */
  bathCheckId: id.nullable(),
  clocks: z
    .array(
      z.object({
        loggerSerial: serial,
        startOffsetS: z.number().min(-86_400).max(86_400).nullable(),
        endOffsetS: z.number().min(-86_400).max(86_400).nullable(),
      }),
    )
    .max(6),
  noise: z
    .object({
      flowPercent: z.number().min(0).max(50).nullable(),
      deltaTK: z.number().min(0).max(5).nullable(),
      autocorrelation: z.number().gt(-1).lt(1).nullable(),
    })
    .nullable(),
  fluidTestedOn: day.nullable(),
  /** Terms of the budget somebody set by hand, each with why. */
  edits: z
    .array(
      z.object({
        kind: z.enum(BUDGET_TERM_KINDS),
        value: z.number().min(0).max(1000),
        reason: oneLine(300),
      }),
    )
    .max(BUDGET_TERM_KINDS.length),
  notes,
});
export type InstallationFields = z.infer<typeof installationFields>;

/** What is kept as one document: all of it but what queries ask for. */
export const installationDocument = installationFields
  .omit({ startsAt: true, endsAt: true, flowMeterId: true, loggerId: true, bathCheckId: true })
  .extend({ probes: z.object({ supply: probeInDocument, return: probeInDocument }).nullable() });
export type InstallationDocument = z.infer<typeof installationDocument>;

/** A condition looked at, in words: what was found, what it means, and the term or block it adds. */
export const verdict = z.object({
  check: z.enum([
    "velocity",
    "reynolds",
    "deltaT",
    "soundSpeed",
    "straightRun",
    "zero",
    "bore",
    "bathCheck",
    "mounting",
    "certificate",
    "clock",
    "fluid",
    "completeness",
  ]),
  weight: z.enum(["fine", "look", "stop"]),
  code: z.string().describe("stable; the client has the words"),
  values: z.record(z.string(), z.union([z.string(), z.number()])),
  /** What a failed check does to the figures. */
  adds: z
    .discriminatedUnion("kind", [
      z.object({ kind: z.literal("term"), term: z.enum(BUDGET_TERM_KINDS) }),
      z.object({ kind: z.literal("block"), blocks: z.enum(["use", "billing"]) }),
    ])
    .nullable(),
});
export type Verdict = z.infer<typeof verdict>;

export const budgetTerm = z.object({
  kind: z.enum(BUDGET_TERM_KINDS),
  nature: z.enum(["systematic", "random"]),
  actsOn: z.enum(["flow", "deltaT", "heat"]),
  given: z.number(),
  unit: z.enum(["%", "K", "m/s", "mm", "L/s"]),
  distribution: z.enum(["normal", "rectangular", "standard"]),
  k: z.number().nullable(),
  standard: z.number(),
  origin: z.object({
    from: z.enum(["evidence", "default", "edited"]),
    code: z.string(),
    values: z.record(z.string(), z.union([z.string(), z.number()])),
  }),
});

/** A budget put to the point's usual state, largest term first. */
const sizedBudget = z.object({
  terms: z.array(
    budgetTerm.extend({
      percent: z.number().nullable().describe("standard, of heat; null where it cannot be put"),
    }),
  ),
  expandedPercent: z.number().nullable().describe("of heat, k = 2, for one reading at this state"),
  at: z.object({
    deltaTK: z.number(),
    deltaTFrom: z.enum(["design", "assumed"]),
    velocityMPerS: z.number(),
    velocityFrom: z.enum(["shown", "design", "assumed"]),
  }),
});
export type SizedBudget = z.infer<typeof sizedBudget>;

const instrumentName = z.object({ id, serial, label: z.string().nullable(), kind: instrumentKind });
/** What follows from an installation's fields, kept or not. */
const workedOut = z.object({
  bore: z
    .object({
      outsideDiameterMm: z.number(),
      wallMeanMm: z.number(),
      wallDeviationMm: z.number().nullable(),
      insideDiameterMm: z.number(),
      uncertaintyMm: z.number().describe("standard"),
      /** (true bore / entered bore)², by which the meter's flow reads low or high. */
      flowFactor: z.number().nullable(),
    })
    .nullable(),
  /** The flow shown put right by the bore, L/s; null where either is not known. */
  correctedFlowLPerS: z.number().nullable(),
  /** The zero's reading or half-width as flow in this pipe, L/s. */
  zeroLPerS: z.number().nullable(),
  /** A permanent meter's power and energy by its plate alone; null without one. */
  plateTerm: z
    .object({ term: budgetTerm, expandedPercent: z.number().describe("of energy, k = 2") })
    .nullable(),
  /** Measured bore, else the bore of the point's own pipe, mm. */
  boreUsedMm: z.number().nullable(),
  bathCheckUsed: bathCheck
    .pick({
      id: true,
      checkedOn: true,
      firstSerial: true,
      secondSerial: true,
      meanDifferenceK: true,
      residualK: true,
      driftK: true,
    })
    .nullable(),
  instruments: z.object({
    flowMeter: instrumentName.nullable(),
    logger: instrumentName.nullable(),
    supplyProbe: instrumentName.nullable(),
    returnProbe: instrumentName.nullable(),
  }),
  /** A clamp-on meter or a probe on the pipe's surface: not for billing unless agreement and law allow. */
  indicativeOnly: z.boolean(),
  verdicts: z.array(verdict),
  budget: sizedBudget,
});

export const installation = installationFields.extend({
  ...workedOut.shape,
  id,
  pointId: id,
  version: z.number().int().describe("1, 2, … as it was corrected"),
  supersededAt: instant.nullable().describe("set where a later version stands in its place"),
  supersedesId: id.nullable(),
  withdrawnAt: instant.nullable(),
  withdrawnBy: z.string().nullable(),
  withdrawnReason: z.string().nullable(),
  recordedAt: instant,
  recordedBy: z.string(),
  reason: z.string().nullable().describe("why it was corrected"),
  can: z.object({ edit: z.boolean() }),
});
export type Installation = z.infer<typeof installation>;

const pointId = z.object({ pointId: id });
export const listInstallations = contract({
  operationId: "listInstallations",
  summary: "How a point was measured over time, newest first; superseded versions on request",
  tag: "Evidence",
  method: "get",
  path: "/points/:pointId/installations",
  params: pointId,
  query: z.object({
    superseded: z.stringbool().default(false).describe("superseded and withdrawn ones too"),
  }),
  answer: z.object({
    items: z.array(installation),
    /** The budget of times no installation speaks for. */
    defaultBudget: sizedBudget,
    can: z.object({ create: z.boolean() }),
  }),
});
export const createInstallation = contract({
  operationId: "createInstallation",
  summary: "Record an installation, or correct one by a version that supersedes it",
  tag: "Evidence",
  method: "post",
  path: "/points/:pointId/installations",
  params: pointId,
  body: installationFields
    .partial()
    .required({ startsAt: true })
    .extend({
      supersedes: id.optional(),
      reason: oneLine(300).optional().describe("needed with `supersedes`"),
    }),
  answer: installation,
});
/** The same verdicts and budget before anything is kept: what the form shows while it is filled in. */
export const tryInstallation = contract({
  operationId: "tryInstallation",
  summary: "Verdicts and budget of an installation that is not kept",
  tag: "Evidence",
  method: "post",
  path: "/points/:pointId/installations/try",
  params: pointId,
  body: installationFields.partial().required({ startsAt: true }),
  answer: workedOut,
});
export type WorkedOutInstallation = z.infer<typeof workedOut>;
export const getInstallation = contract({
  operationId: "getInstallation",
  summary: "One installation, in whatever version",
  tag: "Evidence",
  method: "get",
  path: "/installations/:installationId",
  params: z.object({ installationId: id }),
  answer: installation,
});
export const withdrawInstallation = contract({
  operationId: "withdrawInstallation",
  summary: "Take an installation out of use; it stays readable",
  tag: "Evidence",
  method: "post",
  path: "/installations/:installationId/withdrawal",
  params: z.object({ installationId: id }),
  body: z.object({ reason: oneLine(300) }),
  answer: installation,
});
