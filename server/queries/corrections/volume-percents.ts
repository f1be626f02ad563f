import { INTERVAL_MS } from "@shared/domain/energy/interval-energy";
import type { Database } from "@server/database/connect";
import type { Scope } from "@server/database/scoped";
import type { Correction } from "@server/models/correction";
import { loadEnergyPoint } from "@server/queries/energy/energy-point";
import { loadRangePlusMinus } from "@server/queries/workings/range-plus-minus";

/**
 * How well the volume of each correction's days is known, expanded %, by the correction's id. Worked
 * out as it is read, like every ±; left out where the volume stays as it is, where no single point is
 * touched, and where nobody knows.
 */
export async function volumePercents(
  context: { readonly database: Database; readonly scope: Scope },
  corrections: readonly Correction[],
): Promise<Map<string, number>> {
  const found = new Map<string, number>();
  for (const { id, pointId, effect } of corrections) {
    const volume = effect?.volume ?? null;
    if (pointId === null || !effect || !volume || volume.beforeM3 === volume.afterM3) continue;
    const startMs = Math.floor(Date.parse(effect.from) / INTERVAL_MS) * INTERVAL_MS;
    const endMs = Math.ceil(Date.parse(effect.to) / INTERVAL_MS) * INTERVAL_MS;
    if (!(endMs > startMs)) continue;
    const energyPoint = await loadEnergyPoint(context, pointId);
    const range = { startMs, endMs, dates: null };
    const { volume: known } = await loadRangePlusMinus(context, energyPoint, range);
    if (known?.percent != null) found.set(id, known.percent);
  }
  return found;
}
