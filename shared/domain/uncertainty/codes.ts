/*
 * Every code this part of the domain gives out, with the names of the values its sentence may use.
 * Screens and paper hold the words; a code that is not here does not compile.
 */

/** Why a term of a budget has its size. */
export const ORIGIN_CODES = {
  edited: ["reason", "before"],
  certificateInDate: ["serial", "number", "expandedPercent", "k", "issuedOn"],
  certificateLapsed: ["serial", "number", "expandedPercent", "k", "dueOn", "factor"],
  certificateMissing: ["expandedPercent", "k"],
  driftStated: ["serial", "halfWidthPercent"],
  driftAssumed: ["halfWidthPercent"],
  zeroSet: ["halfWidthMPerS"],
  zeroReadingLeft: ["readingMPerS", "halfWidthMPerS"],
  zeroUnproven: ["halfWidthMPerS"],
  zeroWithoutBore: ["halfWidthMPerS", "speedMPerS", "halfWidthPercent"],
  boreMeasured: ["outsideDiameterMm", "wallMeanMm", "wallReadings", "boreMm"],
  boreOneWallReading: ["outsideDiameterMm", "wallMeanMm", "boreMm", "wallTolerancePercent"],
  boreFromTable: ["boreMm", "wallTolerancePercent", "outsideTolerancePercent"],
  boreUnknown: ["halfWidthPercent"],
  profileFromRun: ["upstreamBores", "downstreamBores", "advisedBores", "fitting"],
  profileShortRun: ["upstreamBores", "downstreamBores", "advisedBores", "fitting"],
  profileLowReynolds: ["reynolds", "addedPercent"],
  profileUnknownRun: ["halfWidthPercent"],
  remountMeasured: ["percent"],
  remountNotTried: ["percent"],
  densityFormula: ["formulaPercent", "temperatureK", "expansionPerK"],
  enthalpyFormula: ["percent"],
  pairFromBath: ["firstSerial", "secondSerial", "checkedOn", "residualK"],
  pairNotCorrected: ["firstSerial", "secondSerial", "checkedOn", "residualK", "meanDifferenceK"],
  pairLargeDifference: ["firstSerial", "secondSerial", "checkedOn", "residualK", "meanDifferenceK"],
  pairFewReadings: ["firstSerial", "secondSerial", "checkedOn", "residualK", "pairs", "factor"],
  pairFromClass: ["supplyClass", "returnClass", "supplyC", "returnC"],
  pairClassAssumed: ["supplyClass", "returnClass", "supplyC", "returnC"],
  mountingStated: ["halfWidthK"],
  mountingPockets: ["halfWidthK"],
  mountingSurface: ["halfWidthK"],
  mountingUnequal: ["halfWidthK"],
  mountingUninsulated: ["halfWidthK"],
  mountingUnknown: ["halfWidthK"],
  pairDriftMeasured: ["driftK", "halfWidthK"],
  pairDriftAssumed: ["halfWidthK"],
  pairDriftOldCheck: ["checkedOn", "days", "halfWidthK"],
  fluidSpread: ["percent"],
  fluidTestOld: ["percent", "factor", "testedOn"],
  fluidNotTested: ["percent", "factor"],
  flowNoiseMeasured: ["percent"],
  flowNoiseAssumed: ["percent"],
  flowStepStated: ["stepLPerS"],
  flowStepAssumed: ["stepLPerS"],
  deltaTNoiseMeasured: ["standardK"],
  deltaTNoiseAssumed: ["standardK"],
  deltaTStepStated: ["stepK"],
  deltaTStepAssumed: ["stepK"],
  alignmentAssumed: ["percent"],
  alignmentClockError: ["offsetS", "intervalS", "percent"],
  meterClassLeastState: [
    "meterClass",
    "flowPercent",
    "pairPercent",
    "calculatorPercent",
    "totalPercent",
  ],
  meterClassByPower: [
    "meterClass",
    "flowPercent",
    "pairPercent",
    "calculatorPercent",
    "totalPercent",
    "leastDeltaTK",
  ],
  meterOwnCertificate: ["number", "expandedPercent", "k"],
  filledShare: ["sharePercent", "filledPercent"],
} as const;
export type OriginCode = keyof typeof ORIGIN_CODES;

/** What a look at the measuring conditions found. */
export const VERDICT_CODES = {
  velocityFine: ["velocityMPerS", "leastMPerS"],
  velocityLow: ["velocityMPerS", "leastMPerS"],
  reynoldsFine: ["reynolds", "least"],
  reynoldsLow: ["reynolds", "least"],
  deltaTFine: ["deltaTK", "standardK", "times"],
  deltaTSmall: ["deltaTK", "standardK", "times"],
  soundSpeedPlausible: ["displayedMPerS", "expectedMPerS", "deviationPercent", "limitPercent"],
  soundSpeedImplausible: ["displayedMPerS", "expectedMPerS", "deviationPercent", "limitPercent"],
  straightRunFine: ["upstreamBores", "downstreamBores", "advisedUpstream", "advisedDownstream"],
  straightRunUpstreamShort: ["upstreamBores", "advisedUpstream"],
  straightRunDownstreamShort: ["downstreamBores", "advisedDownstream"],
  straightRunUnknown: [],
  zeroProven: ["halfWidthMPerS"],
  zeroReadingLeft: ["readingMPerS"],
  zeroUnproven: ["halfWidthMPerS"],
  boreMeasured: ["boreMm", "uncertaintyMm", "wallReadings"],
  boreFewWallReadings: ["boreMm", "wallReadings", "advised"],
  boreWallSpread: ["spreadPercent", "limitPercent"],
  boreNotMeasured: [],
  boreEnteredDiffers: ["enteredBoreMm", "boreMm", "flowPercent"],
  bathCheckFine: ["checkedOn", "pairs", "meanDifferenceK"],
  bathCheckMissing: [],
  bathCheckOtherProbes: ["firstSerial", "secondSerial"],
  bathCheckFewPairs: ["pairs", "least"],
  bathCheckOld: ["checkedOn", "days", "most"],
  bathCheckMeanLarge: ["meanDifferenceK", "limitK"],
  bathCheckDrift: ["driftK", "limitK"],
  bathCheckNotCorrected: ["meanDifferenceK"],
  mountingFine: [],
  mountingUnequal: [],
  mountingUninsulated: [],
  mountingUnknown: [],
  certificateInDate: ["number", "dueOn"],
  certificateOpenEnded: ["number", "issuedOn"],
  certificateDueSoon: ["number", "dueOn", "days"],
  certificateLapsed: ["number", "dueOn"],
  certificateMissing: [],
  clockFine: ["offsetS", "limitS"],
  clockOff: ["offsetS", "limitS"],
  clockUnchecked: [],
  fluidTested: ["testedOn", "days"],
  fluidTestOld: ["testedOn", "days", "most"],
  fluidNotTested: [],
  completenessFine: ["percent"],
  completenessFilled: ["percent", "leastPercent"],
  completenessLow: ["percent", "leastPercent"],
} as const;
export type VerdictCode = keyof typeof VERDICT_CODES;

/** What two meters' figures say about each other. */
export const AGREEMENT_CODES = ["agree", "disagree", "inconclusive"] as const;
export type AgreementCode = (typeof AGREEMENT_CODES)[number];

/** Labels of energy that stands in for a meter's. */
export const STAND_IN_CODES = [
  "substitutedPortable",
  "estimatedDegreeHours",
  "estimatedTime",
] as const;
export type StandInCode = (typeof STAND_IN_CODES)[number];

/** Values of a code's sentence; a name that does not belong to the code does not compile. */
export type OriginValues<C extends OriginCode> = Readonly<
  Record<(typeof ORIGIN_CODES)[C][number], string | number>
>;
export type VerdictValues<C extends VerdictCode> = Readonly<
  Record<(typeof VERDICT_CODES)[C][number], string | number>
>;
