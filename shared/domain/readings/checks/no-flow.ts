import { flowAtVelocityM3PerHour } from "../../pipes/bore";
import { UNPROVEN_ZERO_M_PER_S } from "../../uncertainty/zero-term";

/** What tells flow from no flow at a point. */
export interface NoFlowLimits {
  /** Null where nobody knows it: then only a flow of exactly 0 is none. */
  readonly boreMm: number | null;
  /** Half-width of what the meter may show while nothing flows, m/s; ±0.010 unless given. */
  readonly zeroUncertaintyMPerS?: number;
}

/**
 * The flow, m³/h, below which a meter's reading cannot be told from none.
 *
 * Example: ±0.010 m/s in a bore of 102.26 mm → 0.295668 m³/h.
 */
export function noFlowBelowM3PerHour({ boreMm, zeroUncertaintyMPerS }: NoFlowLimits): number {
  return boreMm === null
    ? 0
    : flowAtVelocityM3PerHour(zeroUncertaintyMPerS ?? UNPROVEN_ZERO_M_PER_S, boreMm);
}
