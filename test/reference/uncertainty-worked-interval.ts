import { waterAtPressure } from "@shared/domain/fluids/water-at-pressure";
import type { BudgetInput } from "@shared/domain/uncertainty/budget-from-evidence";
import type { PointEvidence } from "@shared/domain/uncertainty/point-evidence";

/**
 * One reading of a chilled loop, worked through by hand: the meter on the return, 8.000 L/s, 6.90 to
 * 12.80 °C, water at 1.6 MPa, everything about the installation on record.
 */
export const WORKED_EVIDENCE: PointEvidence = {
  meterPlate: null,
  flowMeter: {
    serial: "F-1",
    certificate: {
      number: "C-1",
      issuedOn: "2026-01-12",
      dueOn: "2027-01-12",
      expanded: 1,
      k: 2,
    },
    driftPercent: 0.5,
    stepLPerS: 0.01,
  },
  pipe: {
    circumferenceMm: 359.1,
    outsideDiameterMm: null,
    wallReadingsMm: [5.62, 5.71, 5.66, 5.69],
    liningMm: 0,
    outsideDiameterUncertaintyMm: 0.2,
    gaugeUncertaintyMm: 0.05,
  },
  straightRun: { upstreamM: 0.92, downstreamM: 0.61, nearestFitting: "bend" },
  zero: { flowStopped: true, readingMPerS: 0.012, remainingMPerS: 0.01, action: "setOnMeter" },
  soundSpeed: { displayedMPerS: 1449, fluidC: 11.2 },
  remountPercent: 0.4,
  probes: {
    supply: {
      serial: "T-1",
      probeClass: "B",
      mounting: "surface",
      depthMm: null,
      insulated: true,
    },
    return: {
      serial: "T-2",
      probeClass: "B",
      mounting: "surface",
      depthMm: null,
      insulated: true,
    },
    mountingK: 0.1,
    stepK: 0.01,
  },
  bathCheck: {
    checkedOn: "2026-06-02",
    bathC: 0.02,
    firstSerial: "T-1",
    secondSerial: "T-2",
    pairs: 12,
    meanDifferenceK: 0.14,
    deviationK: 0.012,
    residualK: 0.03,
    driftK: 0.03,
  },
  clocks: [{ loggerSerial: "L-1", startOffsetS: 4, endOffsetS: 6 }],
  noise: { flowPercent: 0.8, deltaTK: 0.02, autocorrelation: 0.6 },
  fluidTestedOn: null,
  edits: [],
};

export const WORKED_INPUT: BudgetInput = {
  evidence: WORKED_EVIDENCE,
  pipe: { outsideDiameterMm: 114.3, wallMm: 6.02, liningMm: 0 },
  fluid: waterAtPressure(1.6),
  fluidHeatPercent: 0,
  meterSide: "return",
  onDate: "2026-06-20",
  state: { supplyC: 6.9, returnC: 12.8, velocityMPerS: 0.960771 },
  intervalS: 300,
};

export const WORKED_STATE = {
  figure: "power",
  value: 197.798,
  flowM3PerHour: 28.8,
  velocityMPerS: 0.960771,
  deltaTK: 5.9,
} as const;
