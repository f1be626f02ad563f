import type { RegisterTotals } from "@shared/domain/energy/totals";
import { waterSeconds } from "@shared/domain/energy/totals";
import type { EnergyRow } from "@server/queries/energy/energy-rows";
import type { RegisterName } from "@server/queries/energy/loads";

/** Temperatures weighted by the register's volume, and the ends of what was read. */
export interface WaterMeans {
  readonly supplyC: number | null;
  readonly returnC: number | null;
  readonly flowM3PerHour: readonly [least: number, greatest: number] | null;
  readonly powerKw: readonly [least: number, greatest: number] | null;
}

/**
 * Means by flow, from quarter-hours or days: θ̄ = Σ V·θ / Σ V, with θ the mean over each row's time. Within
 * a row flow and temperature are taken as unrelated, which the check by hand shows.
 */
export function waterMeans(rows: readonly EnergyRow[], register: RegisterName): WaterMeans {
  let volume = 0;
  let supply = 0;
  let back = 0;
  let flow: [number, number] | null = null;
  let power: [number, number] | null = null;
  for (const { totals } of rows) {
    const { meanSupplyC, meanReturnC } = totals;
    const own: RegisterTotals = totals[register];
    if (meanSupplyC !== null && meanReturnC !== null && waterSeconds(totals) > 0) {
      volume += own.volumeM3;
      supply += own.volumeM3 * meanSupplyC;
      back += own.volumeM3 * meanReturnC;
    }
    flow = widened(flow, totals.minFlowM3PerHour, totals.maxFlowM3PerHour);
    power = widened(power, totals.minPowerKw, totals.maxPowerKw);
  }
  return {
    supplyC: volume > 0 ? supply / volume : null,
    returnC: volume > 0 ? back / volume : null,
    flowM3PerHour: flow,
    powerKw: power,
  };
}

function widened(
  range: [number, number] | null,
  least: number | null,
  greatest: number | null,
): [number, number] | null {
  if (least === null || greatest === null) return range;
  return range ? [Math.min(range[0], least), Math.max(range[1], greatest)] : [least, greatest];
}
