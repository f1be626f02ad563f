import type { z } from "zod";
import type {
  EnergyAnswer,
  EnergyTotals as TotalsAnswer,
  energyBasis,
  loadCard,
} from "@shared/contracts/energy";
import type { PlusMinus } from "@shared/contracts/plus-minus";
import {
  deltaTMeans,
  waterSeconds,
  type EnergyTotals,
  type RegisterTotals,
} from "@shared/domain/energy/totals";
import type { FilledTotals } from "@server/readings/energy-fills";
import { instantText } from "@server/database/conversions";
import type { EnergyPoint } from "@server/queries/energy/energy-point";
import type { EnergyRow } from "@server/queries/energy/energy-rows";
import type { Load } from "@server/queries/energy/loads";
import { fluidBlock, liquidC } from "@server/readings/fluid-block";

/** Rounds to so many decimals: more than any meter resolves, fewer than a double prints. */
export function rounded(value: number, decimals: number): number {
  const scale = 10 ** decimals;
  const scaled = value * scale;
  const whole = Math.round(scaled);
  // Far from a half the quotient is the double that the text would be read as, for a tenth of the
  // time; near one, and beyond what doubles count in ones, the text decides.
  const isClear = Math.abs(scaled) < 2 ** 40 && Math.abs(Math.abs(scaled - whole) - 0.5) > 1e-3;
  return isClear ? whole / scale : Number(value.toFixed(decimals));
}

export function roundedOrNull(value: number | null, decimals: number): number | null {
  return value === null || Number.isNaN(value) ? null : rounded(value, decimals);
}

/** A sum over nothing is unknown, not zero. */
function figureOrNull(value: number, energyS: number): number | null {
  return energyS > 0 ? rounded(value, 6) : null;
}

function presentRegister(
  register: RegisterTotals,
  energyS: number,
  { waterS, meterOnlyS }: { waterS: number; meterOnlyS: number },
): TotalsAnswer["heating"] {
  const means = deltaTMeans(register, meterOnlyS);
  return {
    energyKwh: figureOrNull(register.energyKwh, energyS),
    volumeM3: figureOrNull(register.volumeM3, waterS),
    runningS: rounded(register.runningS, 3),
    flowWeightedDeltaTK: roundedOrNull(means.flowWeightedK, 6),
    energyWeightedDeltaTK: roundedOrNull(means.energyWeightedK, 6),
    timeMeanDeltaTK: roundedOrNull(means.timeMeanK, 6),
  };
}

/**
 * `expectedRows` are those due by the loggers' own steps; null where nobody counted them. `energyS`
 * are the seconds energy was worked out for, where readings cover more than that.
 */
export function presentTotals(
  totals: EnergyTotals,
  expectedS: number,
  expectedRows: number | null,
  filled: FilledTotals | null,
  energyS: number = totals.coveredS,
): TotalsAnswer {
  const { meterOnlyS } = totals;
  const water = {
    meterOnlyS,
    waterS: energyS > 0 ? waterSeconds({ coveredS: energyS, meterOnlyS }) : 0,
  };
  return {
    heating: presentRegister(totals.heating, energyS, water),
    cooling: presentRegister(totals.cooling, energyS, water),
    volumeM3: figureOrNull(totals.volumeM3, water.waterS),
    suppressedKwh: figureOrNull(totals.suppressedKwh, energyS),
    suppressedS: rounded(totals.suppressedS, 3),
    coveredS: rounded(totals.coveredS, 3),
    expectedS: rounded(expectedS, 3),
    coverage: expectedS > 0 ? rounded(Math.min(1, totals.coveredS / expectedS), 6) : null,
    rows: {
      measured: totals.measuredRows,
      excluded: totals.excludedRows,
      noReading: totals.noReadingRows,
      expected: expectedRows,
    },
    apportioned: totals.apportioned,
    filled: filled && {
      heatingKwh: rounded(filled.heatingKwh, 6),
      coolingKwh: rounded(filled.coolingKwh, 6),
      heatingExpandedKwh: rounded(filled.heatingExpandedKwh, 6),
      coolingExpandedKwh: rounded(filled.coolingExpandedKwh, 6),
      volumeM3: roundedOrNull(filled.volumeM3, 6),
      filledS: rounded(filled.filledS, 3),
      approvedOnly: filled.approvedOnly,
    },
  };
}

export function presentBasis({
  point,
  settings,
  readings,
}: EnergyPoint): z.output<typeof energyBasis> {
  return {
    engineVersion: readings.engineVersion,
    pressure: { absoluteMPa: settings.pressure.pressureMPa, assumed: settings.pressure.assumed },
    meterSide: point.meterSide,
    fluid: settings.loopFluid,
    liquidC: liquidC(settings.fluid),
    // A point without readings yet has no state of its own: its loop's fluid already decides.
    blockedBy: readings.blockedBy ?? fluidBlock(settings.fluid),
    meansOnly: readings.meansOnly,
    rowsAgainstRegister: readings.againstRows,
    recalculating: readings.recalculating,
  };
}

function longer({ heating, cooling }: EnergyTotals): RegisterTotals {
  return heating.runningS > cooling.runningS ? heating : cooling;
}

export function presentColumns(rows: readonly EnergyRow[]): NonNullable<EnergyAnswer["columns"]> {
  const covered = (of: (totals: EnergyTotals) => number | null, decimals: number) =>
    rows.map(({ totals }) => (totals.coveredS > 0 ? roundedOrNull(of(totals), decimals) : null));
  return {
    startMs: rows.map((row) => row.startMs),
    lengthS: rows.map((row) => (row.endMs - row.startMs) / 1000),
    coveredS: rows.map(({ totals }) => rounded(totals.coveredS, 3)),
    heatingKwh: covered((totals) => totals.heating.energyKwh, 4),
    coolingKwh: covered((totals) => totals.cooling.energyKwh, 4),
    volumeM3: covered((totals) => (waterSeconds(totals) > 0 ? totals.volumeM3 : null), 4),
    meanSupplyC: covered((totals) => totals.meanSupplyC, 3),
    meanReturnC: covered((totals) => totals.meanReturnC, 3),
    flowWeightedDeltaTK: covered((totals) => deltaTMeans(longer(totals)).flowWeightedK, 4),
    suppressedKwh: rows.map(({ totals }) => rounded(totals.suppressedKwh, 4)),
    minPowerKw: covered((totals) => totals.minPowerKw, 3),
    maxPowerKw: covered((totals) => totals.maxPowerKw, 3),
  };
}

export function presentLoad(load: Load, plusMinus: PlusMinus | null): z.input<typeof loadCard> {
  return {
    from: instantText(new Date(load.startMs)),
    to: instantText(new Date(load.endMs)),
    supplyC: roundedOrNull(load.supplyC, 3),
    returnC: roundedOrNull(load.returnC, 3),
    flowM3PerHour: roundedOrNull(load.flowM3PerHour, 4),
    deltaTK: roundedOrNull(load.deltaTK, 3),
    powerKw: rounded(load.powerKw, 4),
    plusMinus,
    register: load.register,
  };
}
