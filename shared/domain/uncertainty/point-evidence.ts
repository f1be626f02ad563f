import type { MeterPlate } from "./meter-plate";

/**
 * What is known about how a point was measured: one installation, as it stands in the record.
 *
 * Unknown is `null`. Everything here is as read on site or from a certificate; what follows from it
 * is worked out in `budget-from-evidence`. Dates are calendar days, YYYY-MM-DD.
 */
export interface PointEvidence {
  /** Of a permanent heat meter that gives power or energy by itself. */
  readonly meterPlate: MeterPlate | null;
  readonly flowMeter: FlowMeterEvidence | null;
  readonly pipe: PipeEvidence | null;
  readonly straightRun: StraightRunEvidence | null;
  readonly zero: ZeroEvidence | null;
  readonly soundSpeed: SoundSpeedEvidence | null;
  /** Spread between two mountings of the same sensors, % of flow. */
  readonly remountPercent: number | null;
  readonly probes: ProbePairEvidence | null;
  readonly bathCheck: BathCheckEvidence | null;
  readonly clocks: readonly ClockEvidence[];
  readonly noise: NoiseEvidence | null;
  /** When the fluid was last tested; null for plain water nobody tested. */
  readonly fluidTestedOn: string | null;
  /** Terms somebody set by hand, each with why. */
  readonly edits: readonly TermEdit[];
}

export interface FlowMeterEvidence {
  readonly serial: string;
  readonly certificate: CertificateEvidence | null;
  /** Half-width since the certificate, % of flow. */
  readonly driftPercent: number | null;
  /** Least step the meter shows or logs, L/s. */
  readonly stepLPerS: number | null;
}

export interface CertificateEvidence {
  readonly number: string;
  readonly issuedOn: string;
  readonly dueOn: string | null;
  /** Expanded uncertainty: % of flow for a flow meter, K for a probe. */
  readonly expanded: number;
  readonly k: number;
}

export interface PipeEvidence {
  /** One of the two is given; the circumference wins. */
  readonly circumferenceMm: number | null;
  readonly outsideDiameterMm: number | null;
  readonly wallReadingsMm: readonly number[];
  readonly liningMm: number;
  /** Standard uncertainties. */
  readonly outsideDiameterUncertaintyMm: number;
  readonly gaugeUncertaintyMm: number;
}

export type Fitting =
  | "none"
  | "bend"
  | "twoBendsInPlane"
  | "twoBendsOutOfPlane"
  | "tee"
  | "reducer"
  | "valveOpen"
  | "valveThrottled"
  | "pump";

export interface StraightRunEvidence {
  readonly upstreamM: number;
  readonly downstreamM: number;
  readonly nearestFitting: Fitting;
}

export interface ZeroEvidence {
  /** Whether flow was proven stopped; a reading on a flowing pipe is no zero. */
  readonly flowStopped: boolean;
  readonly readingMPerS: number | null;
  /** Half-width that remains after it was dealt with. */
  readonly remainingMPerS: number | null;
  readonly action: "none" | "setOnMeter" | "corrected";
}

export interface SoundSpeedEvidence {
  readonly displayedMPerS: number;
  readonly fluidC: number;
}

export type ProbeClass = "AA" | "A" | "B";
export type ProbeMounting = "pocket" | "surface";

export interface ProbeEvidence {
  readonly serial: string;
  /** IEC 60751 class, which bounds one probe where no check of the pair exists. */
  readonly probeClass: ProbeClass | null;
  readonly mounting: ProbeMounting;
  readonly depthMm: number | null;
  readonly insulated: boolean;
}

export interface ProbePairEvidence {
  readonly supply: ProbeEvidence;
  readonly return: ProbeEvidence;
  /** Half-width of what mounting adds to ΔT, K. */
  readonly mountingK: number | null;
  /** Least step of a logged temperature, K. */
  readonly stepK: number | null;
}

/** Both probes in one stirred bath: their difference belongs to the serial numbers. */
export interface BathCheckEvidence {
  readonly checkedOn: string;
  readonly bathC: number;
  /** Serials in the order of the difference: first − second. */
  readonly firstSerial: string;
  readonly secondSerial: string;
  readonly pairs: number;
  readonly meanDifferenceK: number;
  /** Sample deviation of the paired differences. */
  readonly deviationK: number;
  /** Standard uncertainty of the pair after the check: what the bath and its reading leave. */
  readonly residualK: number;
  /** Change of the mean difference against the check before, K; null with one check. */
  readonly driftK: number | null;
}

export interface ClockEvidence {
  readonly loggerSerial: string;
  /** Logger − reference, s, at start and end. */
  readonly startOffsetS: number | null;
  readonly endOffsetS: number | null;
}

export interface NoiseEvidence {
  readonly flowPercent: number | null;
  readonly deltaTK: number | null;
  /** Lag-one autocorrelation of the readings' noise, −1 < ρ < 1. */
  readonly autocorrelation: number | null;
}

/** The term's half-width or expanded value is replaced, keeping its unit and distribution. */
export interface TermEdit {
  readonly kind: BudgetTermKind;
  readonly value: number;
  readonly reason: string;
}

/** Every term a budget may hold. */
export const BUDGET_TERM_KINDS = [
  "certificate",
  "drift",
  "zero",
  "bore",
  "profile",
  "remount",
  "density",
  "enthalpy",
  "probePair",
  "mounting",
  "pairDrift",
  "fluid",
  "flowNoise",
  "flowStep",
  "deltaTNoise",
  "deltaTStep",
  "alignment",
  "meterLimits",
  "filled",
] as const;
export type BudgetTermKind = (typeof BUDGET_TERM_KINDS)[number];
