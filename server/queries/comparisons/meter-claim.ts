import type { ComparedSide, KnownFigure, MeterClaim } from "@shared/contracts/meter-comparisons";
import { meterClassUncertainty } from "@shared/domain/uncertainty/permanent-meter";

/** How well a meter is known, %, as its class or its user says. */
export interface ClaimedPercents {
  readonly energy: number | null;
  readonly volume: number | null;
  readonly deltaT: number | null;
  readonly limits: ComparedSide["limits"];
}

export function claimedPercents(claim: MeterClaim): ClaimedPercents {
  if (claim.kind === "stated")
    return {
      energy: claim.expandedPercent,
      volume: claim.volumePercent,
      deltaT: claim.deltaTPercent,
      limits: null,
    };
  const { meterClass, flowRatio, meanDeltaTK, deltaTMinK, flowCapPercent } = claim;
  const found = meterClassUncertainty({
    meterClass,
    flowRatio,
    deltaTK: meanDeltaTK,
    deltaTMinK,
    flowCapPercent,
  });
  if (found === null) throw new Error("a claim passed its contract and has no limits");
  return {
    energy: found.energyPercent,
    volume: found.volumePercent,
    deltaT: found.deltaTPercent,
    limits: {
      meterClass,
      flowRatio,
      meanDeltaTK,
      deltaTMinK,
      flowCapPercent,
      ...found.limits,
      expandedPercent: found.energyPercent,
    },
  };
}

/** A figure with its ± from a percentage of it. */
export function knownTo(value: number, percent: number | null): KnownFigure {
  return {
    value,
    expanded: percent === null ? null : (Math.abs(value) * percent) / 100,
    percent,
  };
}
